import type { Spectrogram } from '../recording/rhythm';

/** Columns of a spectrogram that follow each other at one step. */
export interface SpectrogramRun {
  readonly first: number;
  readonly count: number;
  /** Edges in time of the first and the last column. */
  readonly fromS: number;
  readonly toS: number;
}

/** Evenly spaced stretches of a spectrogram's columns: a phase boundary may break the step. */
export function spectrogramRuns({ centresS }: Pick<Spectrogram, 'centresS'>): SpectrogramRun[] {
  const step = usualStep(centresS);
  const runs: SpectrogramRun[] = [];
  let first = 0;
  for (let i = 1; i <= centresS.length; i += 1) {
    const goesOn =
      i < centresS.length && Math.abs(centresS[i] - centresS[i - 1] - step) < step / 20;
    if (goesOn) continue;
    const fromS = centresS[first] - step / 2;
    runs.push({ first, count: i - first, fromS, toS: centresS[i - 1] + step / 2 });
    first = i;
  }
  return runs;
}

/** The smallest distance between neighbouring columns; 60 s where there are not two. */
export function usualStep(centresS: ArrayLike<number>): number {
  let step = Number.POSITIVE_INFINITY;
  for (let i = 1; i < centresS.length; i += 1) step = Math.min(step, centresS[i] - centresS[i - 1]);
  return Number.isFinite(step) && step > 0 ? step : 60;
}

/** Stretches of time whose columns are not kept (all NaN), joined where they touch. */
export function missingStretches(
  spectrogram: Spectrogram,
): readonly { readonly fromS: number; readonly toS: number }[] {
  const { centresS, levelDb, binCount } = spectrogram;
  const half = usualStep(centresS) / 2;
  const missing: { fromS: number; toS: number }[] = [];
  for (let i = 0; i < centresS.length; i += 1) {
    const level = levelDb[i * binCount];
    if (!Number.isNaN(level)) continue;
    const last = missing[missing.length - 1];
    const fromS = centresS[i] - half;
    if (last && fromS - last.toS < half / 10) last.toS = centresS[i] + half;
    else missing.push({ fromS, toS: centresS[i] + half });
  }
  return missing;
}
