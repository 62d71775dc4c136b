import { createStore, type StoreApi } from 'zustand/vanilla';
import type { Phase } from '../recording/phase';

/** A window in time, in seconds from the start of the recording. */
export interface TimeWindow {
  readonly fromS: number;
  readonly toS: number;
}

/** What a drag on the panes does. */
export type Tool = 'look' | 'exclude';

/** What is picked out: beats by their ticks, or one spoiled span. */
export type Selection =
  | { readonly kind: 'none' }
  /** `anchor`: the end that stays while the selection grows or shrinks, where it does. */
  | { readonly kind: 'beats'; readonly ticks: readonly number[]; readonly anchor?: number }
  | { readonly kind: 'span'; readonly id: number };

/** Where an edge is being moved to, and what stands at that time where it was snapped to something. */
export interface Moved {
  readonly atS: number;
  readonly snap: string | null;
}

/** A stretch being drawn or dragged that is no edit yet: a new spoiled span (`spanId` null) or an old one's new place. */
export interface Draft extends TimeWindow {
  readonly spanId: number | null;
  readonly moved: Moved;
}

/** Phases as they would be while one of their borders is moved. */
export interface PhaseDraft {
  readonly phases: readonly Phase[];
  readonly moved: Moved;
}

/** Beats that finding them again in a stretch would change, before it is taken. */
export interface BeatPreview extends TimeWindow {
  readonly gained: readonly number[];
  readonly lost: readonly number[];
  readonly moved: readonly (readonly [fromTick: number, toTick: number])[];
}

/** The doubt in front as the panes draw it. */
export interface DoubtMark extends TimeWindow {
  /** What is proposed, in a word or two: "insert?". */
  readonly words: string;
  /** Times of the proposed act; empty where it is about the whole stretch. */
  readonly atS: readonly number[];
  /** True where pins stand in the place of the words. */
  readonly onPins: boolean;
}

/** Where the panes look; no part of the session and never undone. */
export interface ViewState {
  readonly durationS: number;
  readonly minutes: TimeWindow;
  /** Always lies inside `minutes`. */
  readonly seconds: TimeWindow;
  readonly cursorS: number | null;
  /** uV from the middle to the edge of a trace row, by row key; absent: fitted. */
  readonly gainsUv: Readonly<Record<string, number>>;
  /** Key of the trace row that gain keys act on. */
  readonly selectedRow: string | null;
  /** Ends of the spectrogram's level scale in dB, the same for the whole study; null: fitted. */
  readonly levelsDb: readonly [low: number, high: number] | null;
  readonly selection: Selection;
  readonly draft: Draft | null;
  readonly doubt: DoubtMark | null;
  readonly preview: BeatPreview | null;
  readonly phaseDraft: PhaseDraft | null;
  /** True while the borders of phases stand in Whole study to be moved by keys. */
  readonly bordersShown: boolean;
  readonly tool: Tool;
  /** Leads that Minutes draws; null: as many as fit the height of the page. */
  readonly leadsShown: 'all' | 'reported' | null;
  readonly identityHidden: boolean;
}

export type ViewStore = StoreApi<ViewState>;

export const MINUTES_WIDTH_S = 1200;
export const SECONDS_WIDTH_S = 10;
const LEAST_SECONDS_S = 1;
const LEAST_MINUTES_S = 60;

export const createViewStore = (): ViewStore =>
  createStore<ViewState>()(() => ({
    durationS: 0,
    minutes: { fromS: 0, toS: 0 },
    seconds: { fromS: 0, toS: 0 },
    cursorS: null,
    gainsUv: {},
    selectedRow: null,
    levelsDb: null,
    selection: { kind: 'none' },
    draft: null,
    doubt: null,
    preview: null,
    phaseDraft: null,
    bordersShown: false,
    tool: 'look',
    leadsShown: null,
    identityHidden: false,
  }));

/** A window of the given width around a centre, pushed inside [0, durationS]; width is cut to what there is. */
export function windowInside(centreS: number, widthS: number, durationS: number): TimeWindow {
  const width = Math.min(widthS, durationS);
  const fromS = Math.min(Math.max(0, centreS - width / 2), durationS - width);
  return { fromS, toS: fromS + width };
}

const widthOf = (window: TimeWindow): number => window.toS - window.fromS;
const centreOf = (window: TimeWindow): number => (window.fromS + window.toS) / 2;

/** Begins to look at a study: its first 20 min and the 10 s in their middle. */
export function lookAtStudy(store: ViewStore, durationS: number): void {
  const minutes = windowInside(0, MINUTES_WIDTH_S, durationS);
  store.setState({
    durationS,
    minutes,
    seconds: windowInside(centreOf(minutes), SECONDS_WIDTH_S, durationS),
    cursorS: null,
    gainsUv: {},
    selectedRow: null,
    levelsDb: null,
    selection: { kind: 'none' },
    draft: null,
    doubt: null,
    preview: null,
    phaseDraft: null,
    bordersShown: false,
    tool: 'look',
  });
}

/** Moves the Seconds window; Minutes follows only as far as it must to keep it inside. */
export function lookAtSeconds(store: ViewStore, centreS: number, widthS?: number): void {
  const { seconds, minutes, durationS } = store.getState();
  const width = Math.max(LEAST_SECONDS_S, widthS ?? widthOf(seconds));
  const next = windowInside(
    centreS,
    Math.min(width, Math.max(LEAST_MINUTES_S, widthOf(minutes))),
    durationS,
  );
  const shift = Math.min(0, next.fromS - minutes.fromS) + Math.max(0, next.toS - minutes.toS);
  const around = { fromS: minutes.fromS + shift, toS: minutes.toS + shift };
  store.setState({ seconds: next, minutes: shift === 0 ? minutes : around });
}

/** Moves or widens the Minutes window; Seconds is pushed inside it. */
export function lookAtMinutes(store: ViewStore, centreS: number, widthS?: number): void {
  const { seconds, minutes, durationS } = store.getState();
  const width = Math.max(LEAST_MINUTES_S, widthS ?? widthOf(minutes));
  const next = windowInside(centreS, width, durationS);
  const secondsWidth = Math.min(widthOf(seconds), widthOf(next));
  const fromS = Math.min(Math.max(next.fromS, seconds.fromS), next.toS - secondsWidth);
  const still =
    Math.abs(fromS - seconds.fromS) < 1e-9 && Math.abs(secondsWidth - widthOf(seconds)) < 1e-9;
  store.setState({
    minutes: next,
    seconds: still ? seconds : { fromS, toS: fromS + secondsWidth },
  });
}

/** Lets the rows of drawn signals be fitted anew: by another route they have another size. Recorded rows keep their gains. */
export function forgetDrawnGains(view: ViewStore): void {
  const isDrawn = (key: string) => key.includes(':slow-wave:') || key.includes(':heartbeat:');
  view.setState(({ gainsUv }) => ({
    gainsUv: Object.fromEntries(Object.entries(gainsUv).filter(([key]) => !isDrawn(key))),
  }));
}
