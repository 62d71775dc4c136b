import { positivePredictivity, sensitivity } from '../../heart/score';
import { type Measured, median } from '../measured';
import { FAMILIES, type Family } from './families';
import type { HeartScore } from './heart-score';
import type { RhythmScore } from './rhythm-score';
import type { SlowWaveScore } from './slow-wave-score';

export interface Scored {
  readonly family: Family;
  readonly heart: HeartScore;
  /** Null where the study has no slow wave. */
  readonly slow: SlowWaveScore | null;
  readonly rhythm: RhythmScore;
  /** Error of the fed-to-fasting power ratio, percent; null where the study has no slow wave. */
  readonly ratioPct: number | null;
}

const PART = 'accuracy';
const line = (
  what: string,
  value: number,
  unit: string,
  decimals: number,
  budget = '',
  note = '',
): Measured => ({
  part: PART,
  what,
  value,
  unit,
  decimals,
  budget,
  note,
});

const sum = (values: readonly number[]) => values.reduce((total, one) => total + one, 0);
const worst = (values: readonly number[]) =>
  values.reduce((most, one) => (Math.abs(one) > Math.abs(most) ? one : most), 0);
const meanSize = (values: readonly number[]) => sum(values.map(Math.abs)) / values.length;

function heartLines(scores: readonly HeartScore[]): readonly Measured[] {
  const pool = {
    truePositive: sum(scores.map(({ beats }) => beats.truePositive)),
    falseNegative: sum(scores.map(({ beats }) => beats.falseNegative)),
    falsePositive: sum(scores.map(({ beats }) => beats.falsePositive)),
  };
  const classShare = (name: 'N' | 'S' | 'V') => {
    const of = sum(scores.map(({ classes }) => classes[name].of));
    const right = sum(scores.map(({ classes }) => classes[name].right));
    return line(
      `class ${name} given to those of it`,
      (100 * right) / of,
      '%',
      2,
      '',
      `${right} of ${of}`,
    );
  };
  const segments = scores.flatMap((one) => one.segments);
  const clean = segments.filter((one) => one.clean);
  const overFloor = clean.map(({ rmssdPct, rmssdMs, floorMs }) =>
    Math.abs(rmssdPct) <= 1 || Math.abs(rmssdMs) <= floorMs ? 0 : rmssdPct,
  );
  const spreadOf = (pick: (one: (typeof segments)[number]) => number, from = clean) =>
    `mean ${meanSize(from.map(pick)).toFixed(2)} %; ${from.length} segments`;
  return [
    line(
      'heartbeat sensitivity, gross',
      sensitivity(pool),
      '%',
      3,
      '100',
      `${pool.falseNegative} missed of ${pool.truePositive + pool.falseNegative}`,
    ),
    line(
      'heartbeat positive predictivity, gross',
      positivePredictivity(pool),
      '%',
      3,
      '100',
      `${pool.falsePositive} false`,
    ),
    classShare('N'),
    classShare('S'),
    classShare('V'),
    line(
      'timing of N beats, median study',
      median(scores.map((one) => one.timingSdMs)),
      'ms',
      2,
      '',
      `worst ${Math.max(...scores.map((one) => one.timingSdMs)).toFixed(2)} ms`,
    ),
    line(
      'SDNN of clean segments, worst',
      worst(clean.map((one) => one.sdnnPct)),
      '%',
      2,
      '1',
      spreadOf((one) => one.sdnnPct),
    ),
    line(
      'RMSSD of clean segments beyond 1 % and the floor, worst',
      worst(overFloor),
      '%',
      2,
      '0',
      spreadOf((one) => one.rmssdPct),
    ),
    line(
      'LF of clean segments, worst',
      worst(clean.map((one) => one.lfPct)),
      '%',
      2,
      '2',
      spreadOf((one) => one.lfPct),
    ),
    line(
      'HF of clean segments, worst',
      worst(clean.map((one) => one.hfPct)),
      '%',
      2,
      '2',
      spreadOf((one) => one.hfPct),
    ),
    line(
      'SDNN of all segments, worst',
      worst(segments.map((one) => one.sdnnPct)),
      '%',
      2,
      '10',
      spreadOf((one) => one.sdnnPct, segments),
    ),
    line(
      'RMSSD of all segments, worst',
      worst(segments.map((one) => one.rmssdPct)),
      '%',
      2,
      '10',
      spreadOf((one) => one.rmssdPct, segments),
    ),
    line(
      'LF of all segments, worst',
      worst(segments.map((one) => one.lfPct)),
      '%',
      2,
      '10',
      spreadOf((one) => one.lfPct, segments),
    ),
    line(
      'HF of all segments, worst',
      worst(segments.map((one) => one.hfPct)),
      '%',
      2,
      '10',
      spreadOf((one) => one.hfPct, segments),
    ),
    line('clean segments withheld', sum(scores.map((one) => one.withheld)), '', 0, '0'),
  ];
}

function slowLines(
  family: string,
  scores: readonly SlowWaveScore[],
  budget: string,
): readonly Measured[] {
  const gaps = scores.map(({ drawnDb, bestDb }) => bestDb - drawnDb);
  return [
    line(
      `slow wave below the best filter: ${family}`,
      median(gaps),
      'dB',
      2,
      budget,
      `${Math.min(...gaps).toFixed(1)} to ${Math.max(...gaps).toFixed(1)}; best ${median(scores.map((one) => one.bestDb)).toFixed(1)} dB, raw ${median(scores.map((one) => one.rawDb)).toFixed(1)} dB`,
    ),
  ];
}

function rhythmLines(name: string, scores: readonly RhythmScore[]): readonly Measured[] {
  const errors = scores.flatMap((one) => one.dfErrors);
  const of = (key: 'steady' | 'right' | 'changing' | 'mixed' | 'silent' | 'falseRhythm') =>
    sum(scores.map((one) => one[key]));
  const what: Record<string, number> = {};
  for (const one of scores)
    for (const [key, count] of Object.entries(one.what)) what[key] = (what[key] ?? 0) + count;
  return [
    line(
      `DF error, mean: ${name}`,
      meanSize(errors),
      'cpm',
      3,
      '0.03',
      `worst ${worst(errors).toFixed(3)}; ${errors.length} epochs`,
    ),
    line(
      `band agreement: ${name}`,
      (100 * of('right')) / of('steady'),
      '%',
      1,
      '98',
      Object.entries(what)
        .map(([key, count]) => `${count} ${key}`)
        .join(', '),
    ),
    line(
      `mixed among changing: ${name}`,
      (100 * of('mixed')) / of('changing'),
      '%',
      0,
      '',
      `${of('changing')} epochs`,
    ),
    line(
      `false rhythm without a wave: ${name}`,
      (100 * of('falseRhythm')) / of('silent'),
      '%',
      1,
      '5',
      `${of('silent')} epochs`,
    ),
  ];
}

function ratioLines(name: string, scored: readonly Scored[]): readonly Measured[] {
  const errors = scored.flatMap(({ ratioPct }) => (ratioPct === null ? [] : [ratioPct]));
  return [
    line(
      `fed-to-fasting power ratio, median error: ${name}`,
      median(errors.map(Math.abs)),
      '%',
      2,
      '5',
      `worst ${worst(errors).toFixed(1)} %; ${errors.length} studies`,
    ),
  ];
}

/** The lines of the table. */
export function linesOf(scored: readonly Scored[]): readonly Measured[] {
  const waves = (of: readonly Scored[]) => of.flatMap(({ slow }) => (slow ? [slow] : []));
  return [
    ...heartLines(scored.map(({ heart }) => heart)),
    ...slowLines('all', waves(scored), '1'),
    ...FAMILIES.flatMap((family) =>
      slowLines(family, waves(scored.filter((one) => one.family === family)), '2'),
    ),
    ...rhythmLines(
      'all',
      scored.map(({ rhythm }) => rhythm),
    ),
    ...ratioLines('all', scored),
    ...FAMILIES.flatMap((family) =>
      ratioLines(
        family,
        scored.filter((one) => one.family === family),
      ),
    ),
    ...FAMILIES.flatMap((family) =>
      rhythmLines(
        family,
        scored.filter((one) => one.family === family).map(({ rhythm }) => rhythm),
      ),
    ),
  ];
}
