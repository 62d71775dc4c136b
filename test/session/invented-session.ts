import { beatsOf } from '../../src/recording/beat';
import { EMPTY_PROTOCOL } from '../../src/recording/protocol';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import type { Span } from '../../src/recording/span';
import type { SessionState, Signature } from '../../src/session/document';
import { secondsToTicks } from '../../src/units/ticks';

export const RATE_HZ = 250;
export const AT = '2026-03-01T10:00:00Z';

/** An invented study of 90 minutes with ten beats from 0:21:06.4 on and two spans. */
export function inventedState(): SessionState {
  return {
    study: {
      code: 'INV-7',
      sha256: null,
      quickKey: '1234-abcd',
      sizeBytes: 1_000_000,
      start: '2026-03-01T09:00:00',
      durationS: 5400,
      channelLabels: ['EGG1', 'EGG2', 'Resp'],
      invented: true,
    },
    protocol: { ...EMPTY_PROTOCOL, meal: 'soup', kcal: 300 },
    roles: {
      slow: [{ kind: 'difference', plus: 0, minus: 1 }],
      reported: 0,
      heart: { kind: 'channel', channel: 1 },
      breath: null,
    },
    leadChoice: 'least spoiled in the fasting phase',
    phases: [
      { name: 'fasting', fromS: 0, toS: 1800 },
      { name: 'fed', fromS: 2400, toS: 5400 },
    ],
    settings: DEFAULT_SETTINGS,
    beats: beatsOf(
      Array.from({ length: 10 }, (_, i) => ({
        tick: secondsToTicks(1266.4 + i * 0.8, RATE_HZ),
        beatClass: i === 4 ? ('V' as const) : ('N' as const),
        origin: 'detected' as const,
      })),
    ),
    spans: [span(3, 1080, 1120), span(5, 60, 61.5)],
    events: [{ id: 1, atS: 1800, text: 'drank 200 ml' }],
    symptoms: [],
    doubts: [],
    bookmarks: [],
    notes: '',
    conclusion: '',
    signed: [],
  };
}

export function span(id: number, fromS: number, toS: number): Span {
  return {
    id,
    fromS,
    toS,
    lead: null,
    target: 'both',
    cause: 'talk',
    origin: 'drawn',
    note: '',
  };
}

export function signature(edit: number): Signature {
  return {
    meaning: 'read',
    name: 'A. Reader',
    atUtc: AT,
    edit,
    program: 'Bicadence 0.1.0',
    sha256: null,
    reason: '',
    settings: DEFAULT_SETTINGS,
    findings: {
      edit,
      phases: [
        {
          name: 'fasting',
          phase: 'fasting',
          fromS: 0,
          toS: 1800,
          keptStomachS: 1758.5,
          keptHeartS: 1758.5,
          adequacyStomach: 'enough',
          adequacyHeart: 'limited',
          figures: {
            rmssd_ms: { kind: 'number', value: 42.485, basis: '5 pairs', marks: [] },
            time_normo_pct: { kind: 'count', count: 5, of: 7, what: 'epochs', marks: ['short'] },
            lf_ms2: { kind: 'withheld', reason: 'under 2 min' },
          },
        },
      ],
      changes: [
        {
          key: 'rmssd_ms',
          from: 'fasting',
          to: 'fed',
          value: { kind: 'withheld', reason: 'no fed' },
        },
      ],
      seen: [{ fromS: 10, toS: 14, text: 'a pause over 3 s' }],
      warnings: [{ about: 'stomach', text: 'filters unknown' }],
    },
    notes: 'calm',
    conclusion: 'regular',
  };
}
