import { filtered, type MatchScore, type ReadyStretch, scoreOf } from './match-score';

/** A route of two factors, each a response at a stretch's groups by one setting. */
export interface TwoFactors {
  readonly derivative: (order: number) => { readonly re: Float64Array; readonly im: Float64Array };
  readonly smoothing: (windowMs: number) => Float64Array;
}

/**
 * Scores of all pairs of an order and a window, row by row: each factor is computed once, and no cell takes a transform.
 * Yields the share that is done.
 */
export function* scoreMapInSteps(
  stretch: ReadyStretch,
  { derivative, smoothing }: TwoFactors,
  orders: readonly number[],
  windowsMs: readonly number[],
): Generator<number, readonly (readonly MatchScore[])[]> {
  const gains: Float64Array[] = [];
  for (const windowMs of windowsMs) {
    gains.push(smoothing(windowMs));
    yield 0;
  }
  const rows: (readonly MatchScore[])[] = [];
  for (const order of orders) {
    const { re, im } = derivative(order);
    const by = filtered(stretch.products, re, im);
    rows.push(gains.map((gain) => scoreOf(stretch, by, gain)));
    yield rows.length / orders.length;
  }
  return rows;
}
