/** Least and greatest values over stretches of time; `timesS` are the stretches' middles, NaN where a stretch is empty. */
export interface MinMaxColumns {
  readonly timesS: Float64Array;
  readonly low: Float32Array;
  readonly high: Float32Array;
}

/**
 * Columns of samples at a constant rate, for drawing [fromS, toS) in `columns` equal parts. `samples[0]` stands at
 * `firstSample / rateHz` seconds. Where the stretch holds no more samples than columns, the samples themselves come back (low
 * equal to high, one on either side of the stretch included so that a line reaches its edges). NaN samples are left out; a
 * column of nothing but NaN is NaN.
 */
export function minMaxColumns(
  samples: ArrayLike<number>,
  rateHz: number,
  firstSample: number,
  fromS: number,
  toS: number,
  columns: number,
): MinMaxColumns {
  const first = Math.max(0, Math.floor(fromS * rateHz) - firstSample);
  const end = Math.min(samples.length, Math.ceil(toS * rateHz) + 1 - firstSample);
  if (end - first <= columns) return samplesAsColumns(samples, rateHz, firstSample, first, end);
  const out = emptyColumns(fromS, toS, columns);
  const widthS = (toS - fromS) / columns;
  let from = sampleAtOrAfter(fromS, rateHz, firstSample);
  for (let column = 0; column < columns; column += 1) {
    const to = sampleAtOrAfter(fromS + (column + 1) * widthS, rateHz, firstSample);
    let low = Number.POSITIVE_INFINITY;
    let high = Number.NEGATIVE_INFINITY;
    for (let i = Math.max(0, from); i < Math.min(samples.length, to); i += 1) {
      const value = samples[i];
      if (value < low) low = value;
      if (value > high) high = value;
    }
    setColumn(out, column, low, high);
    from = to;
  }
  return out;
}

/** Columns whose values are still to be set; times in the middle of each. */
export function emptyColumns(fromS: number, toS: number, columns: number): MinMaxColumns {
  const widthS = (toS - fromS) / columns;
  return {
    timesS: Float64Array.from({ length: columns }, (_, i) => fromS + (i + 0.5) * widthS),
    low: new Float32Array(columns),
    high: new Float32Array(columns),
  };
}

export function setColumn(out: MinMaxColumns, column: number, low: number, high: number): void {
  out.low[column] = low <= high ? low : Number.NaN;
  out.high[column] = low <= high ? high : Number.NaN;
}

function sampleAtOrAfter(seconds: number, rateHz: number, firstSample: number): number {
  return Math.ceil(seconds * rateHz - 1e-9) - firstSample;
}

function samplesAsColumns(
  samples: ArrayLike<number>,
  rateHz: number,
  firstSample: number,
  first: number,
  end: number,
): MinMaxColumns {
  const count = Math.max(0, end - first);
  const values = Float32Array.from({ length: count }, (_, i) => samples[first + i]);
  return {
    timesS: Float64Array.from({ length: count }, (_, i) => (firstSample + first + i) / rateHz),
    low: values,
    high: values.slice(),
  };
}
