import type { Settings } from '../recording/settings';
import type { Difference } from './difference';

type Row = readonly [what: string, words: (settings: Settings) => string];

const range = ([low, high]: readonly [number, number], unit: string) => `${low}–${high} ${unit}`;
const percent = (share: number) => `${Math.round(1e6 * share) / 1e4} %`;

/** Every setting by the name the person knows it by, and how its value is written. */
const ROWS: readonly Row[] = [
  ['route of the slow wave', (s) => s.slowRoute],
  ['route of the heartbeat', (s) => s.heartRoute],
  ['band of the slow wave', (s) => range(s.slowBandCpm, 'cpm')],
  [
    'weights within that band',
    (s) => (s.slowGain === 'fitted' ? 'by how far each stands out' : 'all alike'),
  ],
  [
    'breathing in the drawn wave',
    (s) => (s.breathingOut === 'never' ? 'left in' : 'taken out where that helps'),
  ],
  ['band of the heartbeat', (s) => range(s.heartBandHz, 'Hz')],
  ['derivative order', (s) => String(s.fractional.order)],
  ['memory', (s) => `${s.fractional.memoryS} s`],
  ['slow window', (s) => `${s.fractional.slowWindowMs} ms`],
  ['heart window', (s) => `${s.fractional.heartWindowMs} ms`],
  ['polynomial order', (s) => String(s.fractional.polynomialOrder)],
  ['lead in time of the drawn wave', (s) => (s.fractional.undoLead ? 'undone' : 'left')],
  ['average heartbeat, before R', (s) => `${s.beatAverage.beforeMs} ms`],
  ['average heartbeat, after R', (s) => `${s.beatAverage.afterMs} ms`],
  ['beats of an average', (s) => String(s.beatAverage.beats)],
  [
    'limits of the rhythm',
    ({ rhythmBands: { lowCpm, normoLowCpm, normoHighCpm, highCpm } }) =>
      `${[lowCpm, normoLowCpm, normoHighCpm, highCpm].join('-')} cpm`,
  ],
  ['epoch', (s) => `${s.epoch.lengthS} s`],
  ['step of the epochs', (s) => `${s.epoch.stepS} s`],
  ['most of an epoch that may be spoiled', (s) => percent(s.epoch.maxSpoiled)],
  ['false alarm', (s) => percent(s.epoch.falseAlarm)],
  ['segment of variability', (s) => `${s.variability.segmentS} s`],
  ['LF', (s) => range(s.variability.lfHz, 'Hz')],
  ['HF', (s) => range(s.variability.hfHz, 'Hz')],
  ['least share of NN', (s) => percent(s.variability.minNnShare)],
];

/** The settings that differ, each by its name. */
export function settingDifferences(before: Settings, after: Settings): readonly Difference[] {
  return ROWS.flatMap(([what, words]) => {
    const [from, to] = [words(before), words(after)];
    return from === to ? [] : [{ what, from, to, place: null }];
  });
}
