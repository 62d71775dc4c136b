import { truncationBound } from '../numeric/grunwald-letnikov';
import type { RouteName, Settings } from '../recording/settings';
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
  readonly heartRoute: RouteName;
  readonly undoLead: boolean;
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

/** Reads what was typed: settings (null while something is wrong) and what is wrong, by field. */
export function readSettings(draft: SettingsDraft): {
  readonly settings: Settings | null;
  readonly errors: SettingErrors;
} {
  const errors: Partial<Record<SettingKey, string>> = {};
  const values = {} as Record<SettingKey, number>;
  for (const { key, bounds } of SETTING_FIELDS) {
    const read = readNumber(draft.texts[key], bounds);
    if (read.ok) values[key] = read.value;
    else errors[key] = read.error;
  }
  for (const [low, high] of ASCENDING)
    if (!errors[low] && !errors[high] && !(values[high] > values[low]))
      errors[high] = `Must be above ${numberText(values[low])}.`;
  if (!errors.epochStep && !errors.epochLength && values.epochStep > values.epochLength)
    errors.epochStep = 'The step cannot be longer than the epoch.';
  if (Object.keys(errors).length > 0) return { settings: null, errors };
  return { settings: settingsOf(draft, values), errors };
}

const share = (percent: number): number => Number((percent / 100).toPrecision(12));

function settingsOf(draft: SettingsDraft, v: Readonly<Record<SettingKey, number>>): Settings {
  return {
    slowRoute: draft.slowRoute,
    heartRoute: draft.heartRoute,
    slowBandCpm: [v.slowLow, v.slowHigh],
    heartBandHz: [v.heartLow, v.heartHigh],
    fractional: {
      order: v.order,
      memoryS: v.memory,
      slowWindowMs: v.slowWindow,
      heartWindowMs: v.heartWindow,
      polynomialOrder: v.polynomial,
      undoLead: draft.undoLead,
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

/** What the fixed memory of the derivative leaves out at most, in words; '' while order or memory cannot be read. */
export function truncationWords(draft: SettingsDraft): string {
  const value = (key: SettingKey) => {
    const bounds = SETTING_FIELDS.find((one) => one.key === key)?.bounds;
    const read = bounds ? readNumber(draft.texts[key], bounds) : null;
    return read?.ok ? read.value : null;
  };
  const order = value('order');
  const memory = value('memory');
  if (order === null || memory === null) return '';
  if (order === 0 || order === 1) return 'At this order nothing older than one sample enters.';
  const bound = truncationBound(order, memory);
  const size = bound >= 0.1 ? bound.toFixed(2) : bound.toPrecision(2);
  return `What is older than ${numberText(memory)} s is left out. At worst, for a lead that stands still at 1 µV, the derivative is off by ${size} µV per second to the power ${numberText(order)}; the mean is removed first, and a wave that swings about zero loses far less.`;
}
