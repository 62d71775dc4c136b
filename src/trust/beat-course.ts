import { convolveSame } from '../numeric/fir';
import { gaussianEnvelope } from '../numeric/gaussian-band';
import { inPieces } from '../numeric/in-pieces';
import { onGrid } from '../numeric/on-grid';
import type { Hertz } from '../units/rate';
import type { Seconds } from '../units/time';

/** A hole between two values that is longer than this stays a hole: a missed beat, an early one with its pause. */
const LONGEST_S: Seconds = 3;
/**
 * Spread of the Gaussian mean that is taken off: what is slower than about half a cycle a minute goes with it, a wave of
 * 1.2 cpm keeps all but 0.1 % of its height.
 */
const SLOW_SPREAD_S: Seconds = 30;

export interface CourseGrid {
  readonly firstS: Seconds;
  readonly rateHz: Hertz;
  readonly length: number;
}

const PIECE_S: Seconds = 1800;

/** x less its own Gaussian mean over the samples that are there; NaN stays NaN. Yields the part that is done. */
export function* withoutSlowCourse(
  x: Float64Array,
  rateHz: Hertz,
): Generator<number, Float64Array> {
  const out = new Float64Array(x.length);
  const margin = Math.ceil(4 * SLOW_SPREAD_S * rateHz) + 1;
  yield* inPieces(x.length, Math.ceil(PIECE_S * rateHz), margin, (piece) => {
    const rest = restOfPiece(x.subarray(piece.from, piece.to), rateHz);
    out.set(rest.subarray(piece.coreFrom - piece.from, piece.coreTo - piece.from), piece.coreFrom);
  });
  return out;
}

function restOfPiece(x: Float64Array, rateHz: Hertz): Float64Array {
  const envelope = gaussianEnvelope(rateHz, SLOW_SPREAD_S);
  const there = x.map((value) => (Number.isNaN(value) ? 0 : 1));
  const values = x.map((value) => (Number.isNaN(value) ? 0 : value));
  const weights = convolveSame(there, envelope, 'zero');
  const sums = convolveSame(values, envelope, 'zero');
  return x.map((value, i) => (Number.isNaN(value) ? value : value - sums[i] / weights[i]));
}

/**
 * The course of something told beat by beat (RR, R height) on an even grid, by straight lines between values at ascending
 * times, less its own slow course. NaN in holes and outside the values.
 */
export function beatCourse(
  timesS: Float64Array,
  values: Float64Array,
  grid: CourseGrid,
): Generator<number, Float64Array> {
  return withoutSlowCourse(onGrid(timesS, values, grid, LONGEST_S), grid.rateHz);
}

/**
 * What beats of one area (uV s) would put into a lead at a low rate, in uV: a pulse at each time, shared out between the two
 * samples about it so that its harmonics near multiples of the rate fold to almost nothing. `sizes` scale each beat.
 */
export function beatPulses(
  timesS: Float64Array,
  sizes: Float64Array,
  areaUvS: number,
  { firstS, rateHz, length }: CourseGrid,
): Float64Array {
  const out = new Float64Array(length);
  for (let k = 0; k < timesS.length; k += 1) {
    const place = (timesS[k] - firstS) * rateHz;
    const left = Math.floor(place);
    const height = areaUvS * sizes[k] * rateHz;
    if (left >= 0 && left < length) out[left] += (1 - (place - left)) * height;
    if (left + 1 >= 0 && left + 1 < length) out[left + 1] += (place - left) * height;
  }
  return out;
}
