import { createStore, type StoreApi } from 'zustand/vanilla';
import type {
  Analysis,
  Columns,
  ColumnsRequest,
  HeartResults,
  PlacedBeat,
  SeparationFacts,
} from '../../workers/analysis-api';
import type { Findings } from '../recording/findings';
import type { BreathingSeries } from '../recording/heart-series';
import type { Recording } from '../recording/recording';
import type { SlowWaveRhythm } from '../recording/rhythm';
import type { RoleReasons, Roles } from '../recording/roles';

/** Long work that the person can watch and stop. */
export interface Progress {
  readonly step: string;
  readonly done: number;
  readonly stop: () => void;
}

/** What the worker has found, as the panes read it. Only the study's controller writes here. */
export interface AnalysisState {
  readonly recording: Recording | null;
  /** False while the file itself must be chosen again: figures stand, traces cannot be drawn. */
  readonly fileAtHand: boolean;
  /** Roles to draw the first picture by, until the session begins. */
  readonly firstRoles: Roles | null;
  readonly reasons: RoleReasons | null;
  readonly separation: readonly SeparationFacts[];
  readonly stomach: readonly SlowWaveRhythm[];
  readonly heart: HeartResults | null;
  readonly breathing: BreathingSeries | null;
  readonly findings: Findings | null;
  /** Edit number the results belong to; older than the session's: show grey. */
  readonly edit: number;
  /** The last computation was stopped: the results stay older than the session until the next one. */
  readonly stopped: boolean;
  readonly progress: Progress | null;
  /** Grows when drawn signals change (study, roles, route): panes ask for columns again. */
  readonly signalVersion: number;
}

export type AnalysisStore = StoreApi<AnalysisState>;

/** Columns and beat places on demand; given to the panes by the shell. Null when superseded or failed. */
export interface SignalAccess {
  columns(request: ColumnsRequest): Promise<Columns | null>;
  placeBeat(nearS: number): Promise<PlacedBeat | null>;
}

const EMPTY: AnalysisState = {
  recording: null,
  fileAtHand: false,
  firstRoles: null,
  reasons: null,
  separation: [],
  stomach: [],
  heart: null,
  breathing: null,
  findings: null,
  edit: 0,
  stopped: false,
  progress: null,
  signalVersion: 0,
};

export const createAnalysisStore = (): AnalysisStore => createStore<AnalysisState>()(() => EMPTY);

const DRAWN = [
  'recording',
  'fileAtHand',
  'separation',
  'stomach',
  'heart',
  'signalVersion',
] as const satisfies readonly (keyof AnalysisState)[];

/** Whether two states differ in what the panes draw: news of progress alone are no reason to draw. */
export const drawsDiffer = (now: AnalysisState, before: AnalysisState): boolean =>
  DRAWN.some((part) => now[part] !== before[part]);

/** Blanks every pane, before another study is opened. */
export function blankAnalysis(store: AnalysisStore): void {
  store.setState({ ...EMPTY, signalVersion: store.getState().signalVersion + 1 });
}

/** Takes over a reply: parts that did not change stay. */
export function takeAnalysis(store: AnalysisStore, analysis: Analysis): void {
  const { edit, separation, stomach, heart, breathing, findings } = analysis;
  store.setState((before) => ({
    edit,
    breathing,
    findings,
    separation: separation ?? before.separation,
    stomach: stomach ?? before.stomach,
    heart: heart ? heart.value : before.heart,
  }));
}
