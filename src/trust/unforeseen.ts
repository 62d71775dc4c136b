import { burg } from '../numeric/burg';
import { convolveSame, lowPassTaps } from '../numeric/fir';
import { medianAbsoluteDeviation } from '../numeric/statistics';
import type { Seconds } from '../units/time';

/** Changes over this long are foretold; what is quicker is the heart's. */
const STEP_S: Seconds = 0.5;
const PASS_HZ = 0.3;
const STOP_HZ = 0.9;
const ATTENUATION_DB = 50;
/** Steps that foretell the next one: 16 s, four breaths. */
const ORDER = 32;
/** Changes beyond this many spreads teach no more than one of that size. */
const MOST_SPREADS = 8;
/** Fewer changes than this foretell nothing. */
const FEWEST = 10 * ORDER;

/** How much of each half second's change nothing about it foretells, in uV. */
export interface Unforeseen {
  readonly sizeUv: Float64Array;
  /** Columns from one value to the next. */
  readonly every: number;
}

/** The track with what is missing held at the value before it (after it, at the start). */
function held(track: Float64Array): Float64Array {
  const first = track.find((value) => !Number.isNaN(value)) ?? 0;
  const out = track.slice();
  for (let i = 0; i < out.length; i += 1)
    if (Number.isNaN(out[i])) out[i] = i > 0 ? out[i - 1] : first;
  return out;
}

/** What a prediction from the values before each one (or after it, `side` -1) leaves; 0 where there are too few. */
function errors(x: Float64Array, coefficients: Float64Array, side: 1 | -1): Float64Array {
  return x.map((value, i) => {
    const far = i - side * coefficients.length;
    if (far < 0 || far >= x.length) return 0;
    let sum = value;
    for (let k = 0; k < coefficients.length; k += 1) sum += coefficients[k] * x[i - side * (k + 1)];
    return sum;
  });
}

/**
 * What an autoregressive model of the lead's own changes (Burg 1975) cannot foretell from either side: next to nothing of
 * slow waves, breathing and drift, all of a pop, a cough or an edge. `mean` is each column's; beside NaN nothing is told.
 * Null where columns are too few or too far apart. Takes a rest now and then.
 */
export function* unforeseen(
  mean: Float64Array,
  columnS: Seconds,
): Generator<void, Unforeseen | null> {
  const every = Math.round(STEP_S / columnS);
  const rateHz = 1 / columnS;
  if (every < 2 || mean.length < FEWEST * every) return null;
  const taps = lowPassTaps({
    rateHz,
    passHz: PASS_HZ,
    stopHz: STOP_HZ,
    attenuationDb: ATTENUATION_DB,
  });
  const smooth = convolveSame(held(mean), taps, 'reflect-odd');
  yield;
  const changes = new Float64Array(Math.floor(smooth.length / every));
  for (let i = 1; i < changes.length; i += 1)
    changes[i] = smooth[i * every] - smooth[(i - 1) * every];
  const most = MOST_SPREADS * 1.4826 * medianAbsoluteDeviation(changes);
  const { coefficients } = burg(
    changes.map((change) => Math.max(-most, Math.min(most, change))),
    ORDER,
  );
  yield;
  const before = errors(changes, coefficients, 1);
  const after = errors(changes, coefficients, -1);
  yield;
  const reach = Math.ceil(taps.length / 2);
  const sizeUv = changes.map((_, i) => {
    const at = i * every;
    const near = mean.subarray(Math.max(0, at - reach), at + reach);
    return near.some(Number.isNaN) ? 0 : Math.min(Math.abs(before[i]), Math.abs(after[i]));
  });
  return { sizeUv, every };
}
