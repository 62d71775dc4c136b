import { firstAtOrAfter } from './first-at-or-after';

function quantileOfSorted(sorted: Float64Array, count: number, q: number): number {
  if (count === 0) return Number.NaN;
  const at = q * (count - 1);
  const whole = Math.floor(at);
  const low = sorted[whole];
  return whole === at ? low : low + (at - whole) * (sorted[whole + 1] - low);
}

/**
 * Quantile q (0 to 1) of the window of odd length about each sample, as long as x. At the ends the
 * window holds what is there; NaN is left out, and a window of NaN gives NaN.
 * With `every` above 1 only each every-th sample enters and is evaluated, and values between are
 * on straight lines: for long windows, where that is all the detail there is. Cost per evaluated
 * sample: a binary search and a block move of window / every numbers.
 */
export function runningQuantile(
  x: Float64Array,
  window: number,
  q: number,
  every = 1,
): Float64Array {
  if (!Number.isInteger(window) || window < 1 || window % 2 !== 1)
    throw new Error(`window must be an odd whole number of samples, not ${window}`);
  if (!Number.isInteger(every) || every < 1)
    throw new Error(`every must be a whole number from 1 on, not ${every}`);
  if (every === 1) return runEach(x, (window - 1) / 2, q);
  const few = new Float64Array(Math.ceil(x.length / every));
  for (let i = 0; i < few.length; i++) few[i] = x[i * every];
  const values = runEach(few, Math.round((window - 1) / 2 / every), q);
  return linesBetween(values, every, x.length);
}

/** Median of the window of odd length about each sample; see runningQuantile. */
export function runningMedian(x: Float64Array, window: number, every = 1): Float64Array {
  return runningQuantile(x, window, 0.5, every);
}

function runEach(x: Float64Array, half: number, q: number): Float64Array {
  const sorted = new Float64Array(2 * half + 2);
  const y = new Float64Array(x.length);
  let count = 0;
  const insert = (value: number): void => {
    if (Number.isNaN(value)) return;
    const place = firstAtOrAfter(sorted, value, count);
    sorted.copyWithin(place + 1, place, count);
    sorted[place] = value;
    count += 1;
  };
  const remove = (value: number): void => {
    if (Number.isNaN(value)) return;
    const place = firstAtOrAfter(sorted, value, count);
    sorted.copyWithin(place, place + 1, count);
    count -= 1;
  };
  for (let i = 0; i < Math.min(half, x.length); i++) insert(x[i]);
  for (let i = 0; i < x.length; i++) {
    if (i + half < x.length) insert(x[i + half]);
    if (i - half - 1 >= 0) remove(x[i - half - 1]);
    y[i] = quantileOfSorted(sorted, count, q);
  }
  return y;
}

function linesBetween(values: Float64Array, every: number, length: number): Float64Array {
  const y = new Float64Array(length);
  for (let i = 0; i < length; i++) {
    const at = Math.floor(i / every);
    const next = Math.min(at + 1, values.length - 1);
    const part = (i - at * every) / every;
    y[i] = part === 0 ? values[at] : values[at] + part * (values[next] - values[at]);
  }
  return y;
}
