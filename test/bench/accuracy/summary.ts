import { type Measured, median } from '../measured';
import { FAMILIES, type Family } from './families';
import { heartLines, spanLines } from './heart-lines';
import type { HeartScore } from './heart-score';
import { line, meanSize, sum, worst } from './line';
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
  const of = (key: Exclude<keyof RhythmScore, 'dfErrors' | 'what'>) =>
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
    line(
      `breathing in the band known as such: ${name}`,
      (100 * of('knownAsBreathing')) / of('breathing'),
      '%',
      1,
      '',
      `${of('breathing')} epochs`,
    ),
  ].filter(({ value }) => Number.isFinite(value));
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
    ...heartLines(scored),
    ...spanLines(scored),
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
