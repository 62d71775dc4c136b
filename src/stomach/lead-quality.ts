import { convolveSame, highPassTaps, lowPassTaps } from '../numeric/fir';
import { median } from '../numeric/statistics';
import { coveredSeconds, type Interval } from '../recording/span';
import type { Hertz } from '../units/rate';
import type { Seconds } from '../units/time';
import { keptSamples } from './kept-samples';

/** Unrest is what lies above the stomach's band, drift what lies below it. */
const UNREST_FROM_HZ = 0.2;
const DRIFT_WINDOW_S = 60;
const UNREST_WINDOW_S = 10;
const DRIFT_TO_HZ = 0.5 / 60;
/** A change between neighbouring seconds that is this many times the usual one, and at least so large. */
const STEP_TIMES = 8;
const STEP_LEAST_UV = 100;
const STEP_COST_S = 30;
/** Disturbance that halves the score. */
const HALF_SCORE_UV = 100;

export interface LeadQuality {
  /** 0 to 1, higher is better; for comparing leads of one study. */
  readonly score: number;
  readonly keptShare: number;
  /** Median over 10 s of the rms above 12 cpm. */
  readonly unrestUv: number;
  /** Median change in a minute of what lies below 0.5 cpm. */
  readonly driftUvPerMin: number;
  readonly steps: number;
  readonly reason: string;
}

/** Median over windows of the rms of kept samples; NaN where no window is at least half kept. */
function medianRms(x: Float64Array, kept: Uint8Array, length: number): number {
  const levels: number[] = [];
  for (let from = 0; from + length <= x.length; from += length) {
    let squares = 0;
    let count = 0;
    for (let i = from; i < from + length; i++) {
      if (kept[i] === 0) continue;
      squares += x[i] * x[i];
      count += 1;
    }
    if (2 * count >= length) levels.push(Math.sqrt(squares / count));
  }
  return median(levels);
}

/** Absolute differences between samples `lag` apart, both kept and nothing spoiled between. */
function changes(x: Float64Array, kept: Uint8Array, lag: number): Float64Array {
  const found: number[] = [];
  let run = 0;
  for (let i = 0; i < x.length; i++) {
    run = kept[i] === 1 ? run + 1 : 0;
    if (run > lag) found.push(Math.abs(x[i] - x[i - lag]));
  }
  return Float64Array.from(found);
}

/** Places where the lead jumps within a second, far beyond what it usually does. */
function countSteps(x: Float64Array, kept: Uint8Array, rateHz: Hertz): number {
  const lag = Math.max(1, Math.round(rateHz));
  const usual = median(changes(x, kept, lag));
  const least = Math.max(STEP_LEAST_UV, STEP_TIMES * usual);
  let steps = 0;
  let run = 0;
  let quietFrom = 0;
  for (let i = 0; i < x.length; i++) {
    run = kept[i] === 1 ? run + 1 : 0;
    if (run <= lag || i < quietFrom || Math.abs(x[i] - x[i - lag]) < least) continue;
    steps += 1;
    quietFrom = i + 10 * lag;
  }
  return steps;
}

/** The lead with everything not kept replaced by the last kept value, so that it does not leak into what is. */
function held(signal: Float64Array, kept: Uint8Array): Float64Array {
  let last = signal.find((_, i) => kept[i] === 1) ?? 0;
  return signal.map((value, i) => {
    if (kept[i] === 1) last = value;
    return last;
  });
}

const uv = (value: number) => (Number.isNaN(value) ? 'not known' : `${value.toFixed(1)} µV`);

function describe(quality: Omit<LeadQuality, 'reason'>): string {
  const { keptShare, unrestUv, driftUvPerMin, steps } = quality;
  if (!(keptShare > 0)) return 'nothing of it is kept';
  const jumps = steps === 0 ? 'no steps' : steps === 1 ? '1 step' : `${steps} steps`;
  return (
    `${Math.round(100 * keptShare)} % kept, unrest ${uv(unrestUv)} above 12 cpm, ` +
    `drift ${uv(driftUvPerMin)} a minute, ${jumps}`
  );
}

function disturbance(slice: Float64Array, kept: Uint8Array, rateHz: Hertz) {
  const x = held(slice, kept);
  const above = Math.min(UNREST_FROM_HZ, 0.3 * rateHz);
  const fast = convolveSame(
    x,
    highPassTaps({ rateHz, stopHz: 0.8 * above, passHz: 1.2 * above, attenuationDb: 40 }),
    'reflect-odd',
  );
  const slow = convolveSame(
    x,
    lowPassTaps({
      rateHz,
      passHz: 0.4 * DRIFT_TO_HZ,
      stopHz: 1.6 * DRIFT_TO_HZ,
      attenuationDb: 40,
    }),
    'reflect-odd',
  );
  return {
    unrestUv: medianRms(fast, kept, Math.round(UNREST_WINDOW_S * rateHz)),
    driftUvPerMin: median(changes(slow, kept, Math.round(DRIFT_WINDOW_S * rateHz))),
    steps: countSteps(x, kept, rateHz),
  };
}

/**
 * How well a lead serves for the stomach in one phase, without looking at its rhythm: the share kept,
 * unrest above 12 cpm, drift below 0.5 cpm, and steps. The score is the kept share (each step costs
 * 30 s), halved by a disturbance of 100 uV (root of the sum of squares of unrest and drift a
 * minute); a rule of this program. `recorded` is the anti-aliased 4 Hz lead from the study's start.
 */
export function leadQuality(
  recorded: Float64Array,
  rateHz: Hertz,
  spoiled: readonly Interval[],
  phase: { readonly fromS: Seconds; readonly toS: Seconds },
): LeadQuality {
  const from = Math.max(0, Math.ceil(phase.fromS * rateHz));
  const to = Math.min(recorded.length, Math.floor(phase.toS * rateHz));
  const kept = keptSamples(recorded, rateHz, spoiled).subarray(from, to);
  const count = kept.reduce((sum, one) => sum + one, 0);
  const lengthS = phase.toS - phase.fromS;
  const spoiledS = coveredSeconds(spoiled, phase.fromS, phase.toS);
  const keptShare = Math.max(0, Math.min(count / rateHz, lengthS - spoiledS) / lengthS);
  if (!(count > UNREST_WINDOW_S * rateHz)) {
    const nothing = {
      score: 0,
      keptShare,
      unrestUv: Number.NaN,
      driftUvPerMin: Number.NaN,
      steps: 0,
    };
    return { ...nothing, reason: describe({ ...nothing, keptShare: 0 }) };
  }
  const found = disturbance(recorded.subarray(from, to), kept, rateHz);
  const drift = Number.isNaN(found.driftUvPerMin) ? 0 : found.driftUvPerMin;
  const disturbedUv = Math.hypot(found.unrestUv, drift);
  const left = Math.max(0, keptShare - (found.steps * STEP_COST_S) / lengthS);
  const quality = { ...found, keptShare, score: left / (1 + disturbedUv / HALF_SCORE_UV) };
  return { ...quality, reason: describe(quality) };
}
