const NICE: readonly number[] = [1, 1.5, 2, 3, 5, 7];
const LEAST_UV = 1;
const MOST_UV = 700_000;

/** Gains a trace row can have, in uV from its middle to its edge: 1, 1.5, 2, 3, 5, 7, 10 ... 700 000. */
export const GAINS_UV: readonly number[] = [1, 10, 100, 1000, 10_000, 100_000].flatMap((decade) =>
  NICE.map((one) => one * decade),
);

/** The least gain that shows `uv` whole; the largest gain where none does. */
export function gainFor(uv: number): number {
  if (!(uv > LEAST_UV)) return LEAST_UV;
  return GAINS_UV.find((gain) => gain >= uv) ?? MOST_UV;
}

/** The next gain: `finer` shows the trace larger (fewer uV in the row), `coarser` smaller. */
export function nextGain(gainUv: number, way: 'finer' | 'coarser'): number {
  if (way === 'coarser') return GAINS_UV.find((gain) => gain > gainUv) ?? MOST_UV;
  return [...GAINS_UV].reverse().find((gain) => gain < gainUv) ?? LEAST_UV;
}

/** Columns of a trace: the least and the greatest value of each part of time; NaN where there is nothing. */
export interface LowHigh {
  readonly low: ArrayLike<number>;
  readonly high: ArrayLike<number>;
}

/** Mean of the columns' middles over [from, to); 0 where there is none. */
export function middleUv({ low, high }: LowHigh, from: number, to: number): number {
  let sum = 0;
  let count = 0;
  for (let i = from; i < to; i += 1) {
    const value = (low[i] + high[i]) / 2;
    if (!Number.isNaN(value)) {
      sum += value;
      count += 1;
    }
  }
  return count === 0 ? 0 : sum / count;
}

const COLUMNS_SHARE = 0.9;
const WINDOWS_SHARE = 0.8;
const MARGIN = 1.15;

/** The value that a share of some values do not exceed; NaN of none. Sorts in place. */
function atShare(values: number[], share: number): number {
  values.sort((a, b) => a - b);
  return values.length === 0 ? Number.NaN : values[Math.floor(share * (values.length - 1))];
}

/** How far nine columns of ten stay from `centreUv` over [from, to); NaN where there is none. */
function reachUv({ low, high }: LowHigh, from: number, to: number, centreUv: number): number {
  const reaches: number[] = [];
  for (let i = from; i < to; i += 1) {
    const far = Math.max(high[i] - centreUv, centreUv - low[i]);
    if (!Number.isNaN(far)) reaches.push(far);
  }
  return atShare(reaches, COLUMNS_SHARE);
}

/** Middle of the columns' middles over [from, to) that a short artefact does not move; 0 where there is none. */
function medianUv({ low, high }: LowHigh, from: number, to: number): number {
  const middles: number[] = [];
  for (let i = from; i < to; i += 1) {
    const middle = (low[i] + high[i]) / 2;
    if (!Number.isNaN(middle)) middles.push(middle);
  }
  return middles.length === 0 ? 0 : atShare(middles, 0.5);
}

/**
 * A gain in uV for a whole study that is looked at in windows of `perWindow` columns: with a little to spare it holds nine
 * columns of ten in four windows of five, so that spoiled stretches do not make everything else small. `centred` rows are
 * drawn about their middle in view, the others about zero. Null where there is nothing to fit.
 */
export function fittedGain(columns: LowHigh, perWindow: number, centred: boolean): number | null {
  const width = Math.max(1, Math.round(perWindow));
  const reaches: number[] = [];
  for (let from = 0; from < columns.low.length; from += width) {
    const to = Math.min(columns.low.length, from + width);
    const reach = reachUv(columns, from, to, centred ? medianUv(columns, from, to) : 0);
    if (!Number.isNaN(reach)) reaches.push(reach);
  }
  return reaches.length === 0 ? null : gainFor(MARGIN * atShare(reaches, WINDOWS_SHARE));
}
