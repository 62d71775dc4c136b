import { filtered, type MatchScore, type ReadyStretch, scoreOf } from './match-score';

/** A map to be filled: rows by derivative, columns by smoothing, whose responses are those at the stretch's groups. */
export interface MapResponses {
  readonly derivatives: readonly { readonly re: Float64Array; readonly im: Float64Array }[];
  readonly smoothings: readonly Float64Array[];
}

/** Scores of all cells, row by row; yields the share that is done after each row. No cell takes a transform. */
export function* scoreMapInSteps(
  stretch: ReadyStretch,
  { derivatives, smoothings }: MapResponses,
): Generator<number, readonly (readonly MatchScore[])[]> {
  const rows: (readonly MatchScore[])[] = [];
  for (const { re, im } of derivatives) {
    const by = filtered(stretch.products, re, im);
    rows.push(smoothings.map((gain) => scoreOf(stretch, by, gain)));
    yield rows.length / derivatives.length;
  }
  return rows;
}
