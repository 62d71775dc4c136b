import * as v from 'valibot';
import { DOUBT_ENDINGS, type SettledDoubt } from '../recording/doubt';
import type { Findings } from '../recording/findings';
import type { Phase } from '../recording/phase';
import type { Protocol } from '../recording/protocol';
import type { Roles } from '../recording/roles';
import {
  BREATHING_OUT,
  HEART_ROUTES,
  type Settings,
  SLOW_GAINS,
  SLOW_ROUTES,
} from '../recording/settings';
import { type Interval, SPAN_CAUSES, SPAN_TARGETS, type Span } from '../recording/span';
import type { Bookmark, Signature, StudyIdentity, Symptom, TimedNote } from './document';

/** A schema of what a type of the program holds; the compiler fails when the two part. */
type SchemaOf<T> = v.GenericSchema<unknown, T>;

export const text = v.string();
export const number = v.pipe(v.number(), v.finite());
export const whole = v.pipe(v.number(), v.safeInteger());
const pair = v.strictTuple([number, number]);
const numberOrNull = v.nullable(number);

export const study: SchemaOf<StudyIdentity> = v.strictObject({
  code: text,
  sha256: v.nullable(text),
  quickKey: text,
  sizeBytes: number,
  start: v.nullable(text),
  durationS: number,
  channelLabels: v.array(text),
  invented: v.boolean(),
});

export const protocol: SchemaOf<Protocol> = v.strictObject({
  meal: text,
  kcal: numberOrNull,
  ml: numberOrNull,
  minutes: numberOrNull,
  partEatenPercent: numberOrNull,
  fastHours: numberOrNull,
  posture: text,
  medicines: text,
  implants: text,
});

const lead = v.variant('kind', [
  v.strictObject({ kind: v.literal('channel'), channel: whole }),
  v.strictObject({ kind: v.literal('difference'), plus: whole, minus: whole }),
]);

export const roles: SchemaOf<Roles> = v.strictObject({
  slow: v.array(lead),
  reported: whole,
  heart: v.nullable(lead),
  breath: v.nullable(lead),
});

export const phases: SchemaOf<readonly Phase[]> = v.array(
  v.strictObject({ name: text, fromS: number, toS: number }),
);

export const events: SchemaOf<readonly TimedNote[]> = v.array(
  v.strictObject({ id: whole, atS: number, text }),
);

export const symptoms: SchemaOf<readonly Symptom[]> = v.array(
  v.strictObject({ id: whole, atS: number, text, score: number }),
);

const interval: SchemaOf<Interval> = v.strictObject({ fromS: number, toS: number });

export const bookmarks: SchemaOf<readonly Bookmark[]> = v.array(
  v.strictObject({
    id: whole,
    minutes: interval,
    seconds: interval,
    rows: v.array(text),
    note: text,
  }),
);

export const settledDoubt: SchemaOf<SettledDoubt> = v.strictObject({
  id: text,
  ending: v.picklist(DOUBT_ENDINGS),
  tick: v.nullable(whole),
});

export const span: SchemaOf<Span> = v.strictObject({
  id: whole,
  fromS: number,
  toS: number,
  lead: v.nullable(text),
  target: v.picklist(SPAN_TARGETS),
  cause: v.picklist(SPAN_CAUSES),
  origin: v.picklist(['proposed', 'drawn']),
  note: text,
});

export const settings: SchemaOf<Settings> = v.strictObject({
  slowRoute: v.picklist(SLOW_ROUTES),
  heartRoute: v.picklist(HEART_ROUTES),
  slowBandCpm: pair,
  slowGain: v.picklist(SLOW_GAINS),
  breathingOut: v.picklist(BREATHING_OUT),
  heartBandHz: pair,
  fractional: v.strictObject({
    order: number,
    memoryS: number,
    slowWindowMs: number,
    heartWindowMs: number,
    polynomialOrder: number,
    undoLead: v.boolean(),
  }),
  beatAverage: v.strictObject({ beforeMs: number, afterMs: number, beats: number }),
  rhythmBands: v.strictObject({
    lowCpm: number,
    normoLowCpm: number,
    normoHighCpm: number,
    highCpm: number,
  }),
  epoch: v.strictObject({ lengthS: number, stepS: number, maxSpoiled: number, falseAlarm: number }),
  variability: v.strictObject({ segmentS: number, lfHz: pair, hfHz: pair, minNnShare: number }),
});

const marks = v.array(text);
const figure = v.variant('kind', [
  v.strictObject({ kind: v.literal('number'), value: number, basis: v.nullable(text), marks }),
  v.strictObject({ kind: v.literal('count'), count: number, of: number, what: text, marks }),
  v.strictObject({ kind: v.literal('withheld'), reason: text }),
]);

const adequacy = v.picklist(['enough', 'limited', 'not-reportable']);

const findings: SchemaOf<Findings> = v.strictObject({
  edit: whole,
  phases: v.array(
    v.strictObject({
      name: text,
      phase: text,
      fromS: number,
      toS: number,
      keptStomachS: number,
      keptHeartS: number,
      adequacyStomach: adequacy,
      adequacyHeart: adequacy,
      figures: v.record(text, figure),
    }),
  ),
  changes: v.array(v.strictObject({ key: text, from: text, to: text, value: figure })),
  seen: v.array(v.strictObject({ fromS: number, toS: number, text })),
  warnings: v.array(v.strictObject({ about: v.picklist(['stomach', 'heart', 'study']), text })),
});

export const signature: SchemaOf<Signature> = v.strictObject({
  meaning: v.picklist(['prepared', 'read', 'amended']),
  name: text,
  atUtc: text,
  edit: whole,
  program: text,
  sha256: v.nullable(text),
  reason: text,
  settings,
  findings,
  notes: text,
  conclusion: text,
});
