import { type BeatClass, beatsOf } from '../../src/recording/beat';
import type { Lead } from '../../src/recording/lead';
import { EMPTY_PROTOCOL } from '../../src/recording/protocol';
import type { Recording } from '../../src/recording/recording';
import type { Roles } from '../../src/recording/roles';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import type { Span } from '../../src/recording/span';
import { createAnalysisStore, type SignalAccess } from '../../src/review/analysis-store';
import { type PaneCommands, paneCommands } from '../../src/review/pane-commands';
import type { PaneStores } from '../../src/review/row-view';
import { createViewStore, lookAtStudy } from '../../src/review/view-store';
import type { SessionState } from '../../src/session/document';
import { createSessionStore } from '../../src/session/store';

export const RATE_HZ = 250;

export const channel = (index: number): Lead => ({ kind: 'channel', channel: index });

/** An invented recording of three leads at 250 Hz. */
export const recordingOf = (durationS: number): Recording => ({
  format: 'invented',
  fileName: 'invented.edf',
  sizeBytes: 1,
  identity: { code: 'X', name: null, sex: null, birthYear: null, recordingText: '' },
  start: { kind: 'unknown', raw: '' },
  durationS,
  channels: ['Lead 1-2', 'Lead 2-3', 'Lead 3-4'].map((label, index) => ({
    index,
    label,
    rateHz: RATE_HZ,
    sampleCount: durationS * RATE_HZ,
    unit: { kind: 'voltage', text: 'uV', microvoltsPerUnit: 1 },
    stepUv: 0.1,
    railsUv: null,
    transducer: '',
    prefilter: { kind: 'unknown', text: '' },
  })),
  annotations: [],
  found: [],
  gaps: [],
  invented: true,
});

export interface PaneStudy {
  readonly stores: PaneStores;
  readonly commands: PaneCommands;
  readonly said: string[];
  readonly errors: string[];
  readonly edits: string[];
  state(): SessionState;
}

const DEFAULT_ROLES: Roles = { slow: [channel(0)], reported: 0, heart: channel(1), breath: null };

/** A study of 600 s with a beat at every second from 1 to 599, and stores and acts as the page has them. */
export function paneStudy(
  signals: Partial<SignalAccess> = {},
  parts: { readonly roles?: Roles; readonly spans?: readonly Span[] } = {},
): PaneStudy {
  const durationS = 600;
  const beats = beatsOf(
    Array.from({ length: 599 }, (_, i) => ({
      tick: (i + 1) * RATE_HZ * 64,
      beatClass: 'N' as BeatClass,
      origin: 'detected' as const,
    })),
  );
  const start: SessionState = {
    study: {
      code: 'X',
      sha256: null,
      quickKey: '',
      sizeBytes: 1,
      start: null,
      durationS,
      channelLabels: [],
      invented: true,
    },
    protocol: EMPTY_PROTOCOL,
    roles: parts.roles ?? DEFAULT_ROLES,
    leadChoice: '',
    phases: [],
    settings: DEFAULT_SETTINGS,
    beats,
    spans: parts.spans ?? [],
    events: [],
    symptoms: [],
    doubts: [],
    bookmarks: [],
    notes: '',
    conclusion: '',
    signed: [],
  };
  const view = createViewStore();
  const analysis = createAnalysisStore();
  const session = createSessionStore(() => '2026-01-01T00:00:00Z');
  session.getState().begin({ start, log: [], state: start });
  session.getState().setReviewer('R');
  analysis.setState({ recording: recordingOf(durationS), fileAtHand: true });
  lookAtStudy(view, durationS);
  const stores = { view, analysis, session };
  const [said, errors, edits]: string[][] = [[], [], []];
  const nothing: SignalAccess = { columns: async () => null, placeBeat: async () => null };
  const commands = paneCommands(
    stores,
    { ...nothing, ...signals },
    {
      edit: (edit) => {
        edits.push(edit.name);
        session.getState().apply(edit);
      },
      say: (text) => void said.push(text),
      reportError: (text) => void errors.push(text),
    },
  );
  const state = () => {
    const open = session.getState().session;
    if (!open) throw new Error('no session');
    return open.state;
  };
  return { stores, commands, said, errors, edits, state };
}
