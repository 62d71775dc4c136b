import type {
  BreathingOut,
  HeartRouteName,
  RouteName,
  Settings,
  SlowGain,
} from '../recording/settings';
import { type NumberBounds, numberText, readNumber } from './number-field';

export type SettingKey =
  | 'slowLow'
  | 'slowHigh'
  | 'heartLow'
  | 'heartHigh'
  | 'order'
  | 'memory'
  | 'slowWindow'
  | 'heartWindow'
  | 'polynomial'
  | 'averageBefore'
  | 'averageAfter'
  | 'averageBeats'
  | 'bandLow'
  | 'normoLow'
  | 'normoHigh'
  | 'bandHigh'
  | 'epochLength'
  | 'epochStep'
  | 'maxSpoiled'
  | 'falseAlarm'
  | 'segment'
  | 'lfLow'
  | 'lfHigh'
  | 'hfLow'
  | 'hfHigh'
  | 'minNn';

interface SettingField {
  readonly key: SettingKey;
  readonly label: string;
  readonly bounds: NumberBounds;
  readonly get: (settings: Settings) => number;
}

const field = (
  key: SettingKey,
  label: string,
  [least, most, unit]: readonly [number, number, string],
  get: (settings: Settings) => number,
  whole = false,
): SettingField => ({ key, label, bounds: { least, most, unit, whole }, get });

/** Every number among the settings: how it is called, its bounds and where it stands. Percent are typed, shares stored. */
export const SETTING_FIELDS: readonly SettingField[] = [
  field('slowLow', 'from', [0.1, 60, 'cpm'], (s) => s.slowBandCpm[0]),
  field('slowHigh', 'to', [0.2, 110, 'cpm'], (s) => s.slowBandCpm[1]),
  field('heartLow', 'from', [0.05, 20, 'Hz'], (s) => s.heartBandHz[0]),
  field('heartHigh', 'to', [5, 120, 'Hz'], (s) => s.heartBandHz[1]),
  field('order', 'Derivative order', [0, 1, ''], (s) => s.fractional.order),
  field('memory', 'Memory', [1, 600, 's'], (s) => s.fractional.memoryS),
  field('slowWindow', 'Slow window', [20, 20000, 'ms'], (s) => s.fractional.slowWindowMs),
  field('heartWindow', 'Heart window', [4, 1000, 'ms'], (s) => s.fractional.heartWindowMs),
  field('polynomial', 'Polynomial', [1, 4, ''], (s) => s.fractional.polynomialOrder, true),
  field('averageBefore', 'Before R', [50, 600, 'ms'], (s) => s.beatAverage.beforeMs, true),
  field('averageAfter', 'After R', [100, 1000, 'ms'], (s) => s.beatAverage.afterMs, true),
  field('averageBeats', 'Beats averaged', [4, 1000, ''], (s) => s.beatAverage.beats, true),
  field('bandLow', 'brady from', [0.1, 20, 'cpm'], (s) => s.rhythmBands.lowCpm),
  field('normoLow', 'normo from', [0.2, 20, 'cpm'], (s) => s.rhythmBands.normoLowCpm),
  field('normoHigh', 'tachy from', [0.3, 20, 'cpm'], (s) => s.rhythmBands.normoHighCpm),
  field('bandHigh', 'to', [0.4, 20, 'cpm'], (s) => s.rhythmBands.highCpm),
  field('epochLength', 'Epoch', [60, 1200, 's'], (s) => s.epoch.lengthS, true),
  field('epochStep', 'Step', [5, 1200, 's'], (s) => s.epoch.stepS, true),
  field('maxSpoiled', 'Spoiled, most', [0, 90, '%'], (s) => 100 * s.epoch.maxSpoiled),
  field('falseAlarm', 'False alarm', [0.01, 50, '%'], (s) => 100 * s.epoch.falseAlarm),
  field('segment', 'Segment', [60, 3600, 's'], (s) => s.variability.segmentS, true),
  field('lfLow', 'LF from', [0.003, 1, 'Hz'], (s) => s.variability.lfHz[0]),
  field('lfHigh', 'LF to', [0.003, 1, 'Hz'], (s) => s.variability.lfHz[1]),
  field('hfLow', 'HF from', [0.003, 2, 'Hz'], (s) => s.variability.hfHz[0]),
  field('hfHigh', 'HF to', [0.003, 2, 'Hz'], (s) => s.variability.hfHz[1]),
  field('minNn', 'NN, least', [0, 100, '%'], (s) => 100 * s.variability.minNnShare),
];

/** Settings as they are being typed. */
export interface SettingsDraft {
  readonly slowRoute: RouteName;
  readonly heartRoute: HeartRouteName;
  readonly undoLead: boolean;
  readonly slowGain: SlowGain;
  readonly breathingOut: BreathingOut;
  readonly texts: Readonly<Record<SettingKey, string>>;
}

export type SettingErrors = Readonly<Partial<Record<SettingKey, string>>>;

export function settingsDraft(settings: Settings): SettingsDraft {
  const texts = Object.fromEntries(
    SETTING_FIELDS.map(({ key, get }) => [key, numberText(get(settings))]),
  ) as Record<SettingKey, string>;
  return {
    slowRoute: settings.slowRoute,
    heartRoute: settings.heartRoute,
    undoLead: settings.fractional.undoLead,
    slowGain: settings.slowGain,
    breathingOut: settings.breathingOut,
    texts,
  };
}

/** Pairs of which the second must be above the first. */
const ASCENDING: readonly (readonly [SettingKey, SettingKey])[] = [
  ['slowLow', 'slowHigh'],
  ['heartLow', 'heartHigh'],
  ['bandLow', 'normoLow'],
  ['normoLow', 'normoHigh'],
  ['normoHigh', 'bandHigh'],
  ['lfLow', 'lfHigh'],
  ['hfLow', 'hfHigh'],
];

type RouteChoice = Pick<SettingsDraft, 'slowRoute' | 'heartRoute'>;

/** Fields that serve a route: each group acts, and is offered, only where its route is chosen. */
const ROUTE_GROUPS: readonly {
  readonly keys: readonly SettingKey[];
  readonly acts: (chosen: RouteChoice) => boolean;
}[] = [
  { keys: ['slowLow', 'slowHigh'], acts: ({ slowRoute }) => slowRoute !== 'fractional' },
  { keys: ['heartLow', 'heartHigh'], acts: ({ heartRoute }) => heartRoute === 'band' },
  {
    keys: ['order', 'memory', 'polynomial'],
    acts: ({ slowRoute, heartRoute }) => slowRoute === 'fractional' || heartRoute === 'fractional',
  },
  {
    keys: ['averageBefore', 'averageAfter', 'averageBeats'],
    acts: ({ slowRoute }) => slowRoute === 'beat-average',
  },
  { keys: ['slowWindow'], acts: ({ slowRoute }) => slowRoute === 'fractional' },
  { keys: ['heartWindow'], acts: ({ heartRoute }) => heartRoute === 'fractional' },
];

/** True where a field has an effect under the chosen routes. */
export function settingActs(key: SettingKey, chosen: RouteChoice): boolean {
  return ROUTE_GROUPS.every(({ keys, acts }) => !keys.includes(key) || acts(chosen));
}

/**
 * Reads what was typed: settings (null while something is wrong) and what is wrong, by field. Fields that the chosen routes
 * do not use cannot be wrong: where they make no sense, what was in force `before` stays in them.
 */
export function readSettings(
  draft: SettingsDraft,
  before: Settings,
): { readonly settings: Settings | null; readonly errors: SettingErrors } {
  const typed = readTexts(draft.texts);
  const kept = settingsDraft(before).texts;
  const resting = ROUTE_GROUPS.filter(
    ({ keys, acts }) => !acts(draft) && keys.some((key) => typed.errors[key]),
  ).flatMap(({ keys }) => keys);
  const texts = { ...draft.texts, ...Object.fromEntries(resting.map((key) => [key, kept[key]])) };
  const { values, errors } = resting.length > 0 ? readTexts(texts) : typed;
  if (Object.keys(errors).length > 0) return { settings: null, errors };
  return { settings: settingsOf(draft, values), errors };
}

function readTexts(texts: SettingsDraft['texts']): {
  readonly values: Record<SettingKey, number>;
  readonly errors: SettingErrors;
} {
  const errors: Partial<Record<SettingKey, string>> = {};
  const values = {} as Record<SettingKey, number>;
  for (const { key, bounds } of SETTING_FIELDS) {
    const read = readNumber(texts[key], bounds);
    if (read.ok) values[key] = read.value;
    else errors[key] = read.error;
  }
  for (const [low, high] of ASCENDING)
    if (!errors[low] && !errors[high] && !(values[high] > values[low]))
      errors[high] = `Must be above ${numberText(values[low])}.`;
  if (!errors.epochStep && !errors.epochLength && values.epochStep > values.epochLength)
    errors.epochStep = 'The step cannot be longer than the epoch.';
  return { values, errors };
}

const share = (percent: number): number => Number((percent / 100).toPrecision(12));

function settingsOf(draft: SettingsDraft, v: Readonly<Record<SettingKey, number>>): Settings {
  return {
    slowRoute: draft.slowRoute,
    heartRoute: draft.heartRoute,
    slowBandCpm: [v.slowLow, v.slowHigh],
    slowGain: draft.slowGain,
    breathingOut: draft.breathingOut,
    heartBandHz: [v.heartLow, v.heartHigh],
    fractional: {
      order: v.order,
      memoryS: v.memory,
      slowWindowMs: v.slowWindow,
      heartWindowMs: v.heartWindow,
      polynomialOrder: v.polynomial,
      undoLead: draft.undoLead,
    },
    beatAverage: {
      beforeMs: v.averageBefore,
      afterMs: v.averageAfter,
      beats: v.averageBeats,
    },
    rhythmBands: {
      lowCpm: v.bandLow,
      normoLowCpm: v.normoLow,
      normoHighCpm: v.normoHigh,
      highCpm: v.bandHigh,
    },
    epoch: {
      lengthS: v.epochLength,
      stepS: v.epochStep,
      maxSpoiled: share(v.maxSpoiled),
      falseAlarm: share(v.falseAlarm),
    },
    variability: {
      segmentS: v.segment,
      lfHz: [v.lfLow, v.lfHigh],
      hfHz: [v.hfLow, v.hfHigh],
      minNnShare: share(v.minNn),
    },
  };
}
