import { median, medianInPlace } from '../numeric/statistics';
import type { Energy, Levels } from './energy-pass';
import { logRatio, type RhythmAt, rhythmOf } from './rhythm-path';

const SHORTEST_RR_S = 0.3;
const LONGEST_RR_S = 2;
const WINDOW_S = 20;
const STEP_S = 10;
/** Looks between two rests. */
const LOOKS_A_STEP = 30;
const FIRST_SPREAD = 0.15;
const LEAST_SPREAD = 0.06;
const MOST_SPREAD = 0.3;
/** An interval is unusual where its logarithm is farther off than so many spreads. */
const UNUSUAL_SPREADS = 3;
const LEAST_UNUSUAL = 0.05;
const MOST_UNUSUAL = 0.12;
/** Beats to each side that tell how often intervals are unusual. */
const WIDE_NEIGHBOURS = 40;
/** Beats to each side that tell the usual interval. */
const NEIGHBOURS = 8;

/**
 * The usual RR interval before any beat is known: the lag, from 0.3 to 2 s, at which the QRS energy of 20 s is most like
 * itself; of lags nearly as good the shortest, so that two intervals are not taken for one. Takes a rest now and then.
 */
export function* rhythmFromEnergy(
  energy: Energy,
  levels: Levels,
): Generator<void, (timeS: number) => RhythmAt> {
  const { envelope, envelopeHz } = energy;
  const steps = Math.max(1, Math.ceil(envelope.length / (STEP_S * envelopeHz)));
  const rr = new Float64Array(steps);
  const part = new Float64Array(Math.round(WINDOW_S * envelopeHz));
  for (let k = 0; k < steps; k += 1) {
    const centre = Math.min(levels.beat.length - 1, Math.floor((k + 0.5) * STEP_S));
    const limit = 1.2 * levels.beat[centre];
    const from = Math.round((k + 0.5) * STEP_S * envelopeHz) - (part.length >> 1);
    let sum = 0;
    for (let i = 0; i < part.length; i += 1) {
      const value = envelope[from + i];
      part[i] = value >= 0 ? Math.min(limit, value) : 0;
      sum += part[i];
    }
    for (let i = 0; i < part.length; i += 1) part[i] -= sum / part.length;
    rr[k] = bestLag(part, envelopeHz) / envelopeHz;
    if (k % LOOKS_A_STEP === 0) yield;
  }
  const rhythms = Array.from(rr, (_, k) =>
    rhythmOf(median(rr.subarray(Math.max(0, k - 2), k + 3)), FIRST_SPREAD, MOST_UNUSUAL),
  );
  return (timeS) => rhythms[Math.min(steps - 1, Math.max(0, Math.floor(timeS / STEP_S)))];
}

/** Lag in samples of the best autocorrelation. */
function bestLag(x: Float64Array, rateHz: number): number {
  const shortest = Math.round(SHORTEST_RR_S * rateHz);
  const longest = Math.min(x.length - 1, Math.round(LONGEST_RR_S * rateHz));
  const likeness = new Float64Array(longest + 2);
  let greatest = 0;
  for (let lag = shortest - 1; lag <= longest + 1; lag += 1) {
    let sum = 0;
    for (let i = lag; i < x.length; i += 2) sum += x[i] * x[i - lag];
    likeness[lag] = sum / (x.length - lag);
    if (lag >= shortest && lag <= longest) greatest = Math.max(greatest, likeness[lag]);
  }
  for (let lag = shortest; lag <= longest; lag += 1) {
    const crest = likeness[lag] >= likeness[lag - 1] && likeness[lag] >= likeness[lag + 1];
    if (crest && likeness[lag] > 0.8 * greatest) return lag;
  }
  return Math.round(0.8 * rateHz);
}

/** Beats looked at between two rests. */
const BEATS_A_STEP = 2000;

/** The usual RR interval and its spread near each beat, from the beats found so far (ascending, s). Takes a rest now and then. */
export function* rhythmFromBeats(
  timesS: ArrayLike<number>,
  before: (timeS: number) => RhythmAt,
): Generator<void, (timeS: number) => RhythmAt> {
  const count = timesS.length;
  if (count < NEIGHBOURS) return before;
  const usual = new Float64Array(count);
  const spread = new Float64Array(count);
  const few = new Float64Array(2 * NEIGHBOURS);
  for (let i = 0; i < count; i += 1) {
    const first = Math.max(1, i - NEIGHBOURS + 1);
    const last = Math.min(count - 1, i + NEIGHBOURS);
    let n = 0;
    for (let j = first; j <= last; j += 1) few[n++] = timesS[j] - timesS[j - 1];
    usual[i] = Math.min(LONGEST_RR_S, Math.max(SHORTEST_RR_S, medianInPlace(few, n)));
    for (let j = first, k = 0; j <= last; j += 1, k += 1)
      few[k] = Math.abs(logRatio(timesS[j] - timesS[j - 1], usual[i]));
    const measured = 1.5 * medianInPlace(few, n);
    spread[i] = Math.min(MOST_SPREAD, Math.max(LEAST_SPREAD, measured));
    if (i % BEATS_A_STEP === BEATS_A_STEP - 1) yield;
  }
  const unusual = unusualShares(timesS, usual, spread);
  const rhythms = Array.from(usual, (rrS, i) => rhythmOf(rrS, spread[i], unusual[i]));
  let at = 0;
  return (timeS) => {
    while (at > 0 && timesS[at] > timeS) at -= 1;
    while (at < count - 1 && timesS[at + 1] <= timeS) at += 1;
    return rhythms[at];
  };
}

/** Share of unusual intervals about each beat. */
function unusualShares(
  timesS: ArrayLike<number>,
  usual: Float64Array,
  spread: Float64Array,
): Float64Array {
  const count = usual.length;
  const sums = new Float64Array(count + 1);
  for (let i = 0; i < count; i += 1) {
    const off = i > 0 ? Math.abs(logRatio(timesS[i] - timesS[i - 1], usual[i])) : 0;
    sums[i + 1] = sums[i] + (off > UNUSUAL_SPREADS * spread[i] ? 1 : 0);
  }
  return usual.map((_, i) => {
    const first = Math.max(0, i - WIDE_NEIGHBOURS);
    const last = Math.min(count, i + WIDE_NEIGHBOURS);
    const share = (sums[last] - sums[first]) / (last - first);
    return Math.min(MOST_UNUSUAL, Math.max(LEAST_UNUSUAL, share));
  });
}
