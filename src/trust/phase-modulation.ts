import { atan2, cos, sin } from '../numeric/elementary';
import { createRandom } from '../numeric/random';
import { quantile } from '../numeric/statistics';
import type { Hertz } from '../units/rate';
import type { Seconds } from '../units/time';

/** Bins of 30 degrees; the first begins at the crest of the slow wave. */
export const PHASE_BINS = 12;
/** Surrogates that chance is told from, the least shift of one, and the seed of their shifts. */
export const SURROGATES = 999;
export const LEAST_SHIFT_S: Seconds = 60;
const SEED = 20_261;

export interface ModulationInput {
  /** Radians, -pi to pi, 0 at crests. */
  readonly phase: Float64Array;
  /** 1 where the phase counts. */
  readonly usable: Uint8Array;
  /** What may follow the phase, on the same grid, its own slow course taken off; NaN where it is not known. */
  readonly course: Float64Array;
  readonly rateHz: Hertz;
}

/** How far a course follows a phase, and how far it does by chance. Depths are in the unit of the course. */
export interface Modulation {
  /** Peak of the cosine fitted to the bins' means. */
  readonly depth: number;
  /** Phase in radians, -pi to pi, at which that cosine is highest. */
  readonly peakRad: number;
  /** Peak of the wave of twice the frequency fitted to the same bins. */
  readonly secondDepth: number;
  /** Means of the course by phase, and on how many samples each stands. */
  readonly bins: readonly number[];
  readonly counts: readonly number[];
  /** Depth that 95 in 100 surrogates stay under. */
  readonly chanceDepth: number;
  /** (k + 1) / (n + 1), k of n surrogates being as deep or deeper (Phipson & Smyth 2010). */
  readonly pOfSurrogates: number;
  /**
   * The same with shifts of less than 60 s let in by their share of all, where that is larger. A depth that moves with the
   * shift as slowly as the rhythm loses itself is, by chance alone, often deepest near no shift at all: leaving out what lies
   * there makes p too small (7 to 9 % under 0.05 for 12 to 20 min of nothing).
   */
  readonly p: number;
  readonly surrogates: number;
  /**
   * How much of itself the phase finds again after the shifts, 0 to 1: near 1 the rhythm is so steady that a shift changes
   * nothing, and the test tells little.
   */
  readonly steadiness: number;
}

interface Bins {
  readonly sums: Float64Array;
  readonly counts: Float64Array;
}

const binCosine = (harmonic: number) =>
  Float64Array.from({ length: PHASE_BINS }, (_, k) => cos(harmonic * centreOf(k)));
const binSine = (harmonic: number) =>
  Float64Array.from({ length: PHASE_BINS }, (_, k) => sin(harmonic * centreOf(k)));
const centreOf = (bin: number) => (2 * Math.PI * (bin + 0.5)) / PHASE_BINS;
const COSINES = [binCosine(1), binCosine(2)] as const;
const SINES = [binSine(1), binSine(2)] as const;

/** Bin of each sample's phase, -1 where it does not count. */
function binsOf({ phase, usable }: ModulationInput): Int8Array {
  return Int8Array.from(phase, (angle, i) => {
    if (usable[i] === 0) return -1;
    const turn = angle < 0 ? angle + 2 * Math.PI : angle;
    return Math.min(PHASE_BINS - 1, Math.floor((turn * PHASE_BINS) / (2 * Math.PI)));
  });
}

/** Sums by bin with the course moved on by `shift` samples, its end put before its start. */
function binned(bin: Int8Array, course: Float64Array, shift: number, into: Bins): void {
  const { sums, counts } = into;
  sums.fill(0);
  counts.fill(0);
  const n = bin.length;
  for (let i = 0; i < n; i += 1) {
    const place = bin[i];
    if (place < 0) continue;
    const from = i + shift;
    const value = course[from < n ? from : from - n];
    if (Number.isNaN(value)) continue;
    sums[place] += value;
    counts[place] += 1;
  }
}

/** The wave of a harmonic fitted to the bins' means: its part along cosine and sine; a bin of nothing counts as 0. */
function fitted({ sums, counts }: Bins, harmonic: 0 | 1): readonly [number, number] {
  let [along, across] = [0, 0];
  for (let k = 0; k < PHASE_BINS; k += 1) {
    const value = counts[k] > 0 ? sums[k] / counts[k] : 0;
    along += value * COSINES[harmonic][k];
    across += value * SINES[harmonic][k];
  }
  return [(2 * along) / PHASE_BINS, (2 * across) / PHASE_BINS];
}

const emptyBins = (): Bins => ({
  sums: new Float64Array(PHASE_BINS),
  counts: new Float64Array(PHASE_BINS),
});

/** Length of the mean of e^i(phase(t + shift) - phase(t)) over the samples that count at both times. */
function keptPhase(cosines: Float64Array, sines: Float64Array, shift: number): number {
  const n = cosines.length;
  let [along, across, count] = [0, 0, 0];
  for (let i = 0; i < n; i += STRIDE) {
    const j = (i + shift) % n;
    if (Number.isNaN(cosines[i]) || Number.isNaN(cosines[j])) continue;
    along += cosines[i] * cosines[j] + sines[i] * sines[j];
    across += cosines[i] * sines[j] - sines[i] * cosines[j];
    count += 1;
  }
  return count > 0 ? Math.hypot(along, across) / count : 0;
}

/** Shifts of less than the least, as dense as the surrogates are on average: how many, and how many are as deep. */
function nearShifts(
  n: number,
  least: number,
  surrogates: number,
  isAsDeep: (shift: number) => boolean,
): { readonly count: number; readonly asDeep: number } {
  const count = Math.round((surrogates * 2 * least) / (n - 2 * least));
  let asDeep = 0;
  for (let k = 0; k < count; k += 1) {
    const shift = Math.round(((k + 0.5) * 2 * least) / count) - least;
    if (isAsDeep(shift < 0 ? shift + n : shift)) asDeep += 1;
  }
  return { count, asDeep };
}

/** Samples looked at between one yield and the next. */
const SAMPLES_A_TURN = 200_000;
/** Steadiness looks at every so many samples and every so many shifts; it need not be fine. */
const STRIDE = 4;
const EVERY_SHIFT = 10;

/**
 * Modulation of a course by a phase with its surrogate test: the course is moved in a circle by 60 s or more either way, so
 * that both keep their own rhythm and lose only what ties them. The shifts are the same for the same length. Yields how far
 * it is, 0 to 1. Null where the stretch holds no such shift or some bin of phase is never seen.
 */
export function* phaseModulation(
  input: ModulationInput,
  surrogates = SURROGATES,
): Generator<number, Modulation | null> {
  const { phase, usable, course, rateHz } = input;
  const n = phase.length;
  const least = Math.ceil(LEAST_SHIFT_S * rateHz);
  if (!(n > 2 * least)) return null;
  const bin = binsOf(input);
  const seen = emptyBins();
  binned(bin, course, 0, seen);
  if (seen.counts.some((count) => count === 0)) return null;
  const [along, across] = fitted(seen, 0);
  const depth = Math.hypot(along, across);
  const cosines = phase.map((angle, i) => (usable[i] === 1 ? cos(angle) : Number.NaN));
  const sines = phase.map((angle, i) => (usable[i] === 1 ? sin(angle) : Number.NaN));
  const random = createRandom(SEED);
  const depths = new Float64Array(surrogates);
  const work = emptyBins();
  const turn = Math.max(1, Math.floor(SAMPLES_A_TURN / n));
  let [asDeep, steady, looks] = [0, 0, 0];
  for (let k = 0; k < surrogates; k += 1) {
    const shift = least + random.below(n - 2 * least + 1);
    binned(bin, course, shift, work);
    depths[k] = Math.hypot(...fitted(work, 0));
    if (depths[k] >= depth) asDeep += 1;
    if (k % EVERY_SHIFT === 0) {
      steady += keptPhase(cosines, sines, shift);
      looks += 1;
    }
    if (k % turn === 0) yield k / surrogates;
  }
  const pOfSurrogates = (asDeep + 1) / (surrogates + 1);
  const near = nearShifts(n, least, surrogates, (shift) => {
    binned(bin, course, shift, work);
    return Math.hypot(...fitted(work, 0)) >= depth;
  });
  return {
    depth,
    peakRad: atan2(across, along),
    secondDepth: Math.hypot(...fitted(seen, 1)),
    bins: Array.from(seen.sums, (sum, k) => sum / seen.counts[k]),
    counts: Array.from(seen.counts),
    chanceDepth: quantile(depths, 0.95),
    pOfSurrogates,
    p: Math.max(pOfSurrogates, (asDeep + near.asDeep + 1) / (surrogates + near.count + 1)),
    surrogates,
    steadiness: steady / looks,
  };
}
