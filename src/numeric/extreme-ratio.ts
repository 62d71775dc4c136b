/**
 * What a stretch adds to two sums, by what is decided of the decisions that reach it: entry m of each table is that where
 * decision k of `decisions` is taken one way for a 0 and the other for a 1 in bit k of m.
 */
export interface DecidedCell {
  /** Numbers of the decisions; one that reaches several cells reaches neighbours only. At most 12. */
  readonly decisions: readonly number[];
  readonly above: Float64Array;
  readonly below: Float64Array;
}

export interface TwoSums {
  readonly above: number;
  readonly below: number;
}

/** What is best so far, by what was decided of the last cell's decisions. */
interface Reached {
  readonly decisions: readonly number[];
  readonly score: Float64Array;
  readonly above: Float64Array;
  readonly below: Float64Array;
}

const START: Reached = {
  decisions: [],
  score: new Float64Array(1),
  above: new Float64Array(1),
  below: new Float64Array(1),
};

/** The bits of a mask at some places, put side by side. */
function bitsAt(mask: number, places: readonly number[]): number {
  let bits = 0;
  for (let i = 0; i < places.length; i += 1) if (mask & (1 << places[i])) bits |= 1 << i;
  return bits;
}

/** For what two cells share, the best that was reached with each way of deciding it. */
function handedOn({ decisions, score }: Reached, shared: readonly number[]): Int32Array {
  const places = shared.map((one) => decisions.indexOf(one));
  const best = new Int32Array(1 << shared.length).fill(-1);
  for (let mask = 0; mask < score.length; mask += 1) {
    const key = bitsAt(mask, places);
    if (best[key] < 0 || score[mask] > score[best[key]]) best[key] = mask;
  }
  return best;
}

/** One cell further: sums and score (sign times above less lambda times below) of the best way to each of its masks. */
function step(before: Reached, cell: DecidedCell, lambda: number, sign: 1 | -1): Reached {
  const shared = cell.decisions.filter((one) => before.decisions.includes(one));
  const places = shared.map((one) => cell.decisions.indexOf(one));
  const best = handedOn(before, shared);
  const size = cell.above.length;
  const reached = {
    decisions: cell.decisions,
    score: new Float64Array(size),
    above: new Float64Array(size),
    below: new Float64Array(size),
  };
  for (let mask = 0; mask < size; mask += 1) {
    const from = best[bitsAt(mask, places)];
    const [above, below] = [cell.above[mask], cell.below[mask]];
    reached.score[mask] = before.score[from] + sign * (above - lambda * below);
    reached.above[mask] = before.above[from] + above;
    reached.below[mask] = before.below[from] + below;
  }
  return reached;
}

function bestSums(cells: readonly DecidedCell[], lambda: number, sign: 1 | -1): TwoSums {
  const last = cells.reduce<Reached>((before, cell) => step(before, cell, lambda, sign), START);
  let best = 0;
  for (let mask = 1; mask < last.score.length; mask += 1)
    if (last.score[mask] > last.score[best]) best = mask;
  return { above: last.above[best], below: last.below[best] };
}

const MOST_ROUNDS = 100;

/**
 * The greatest (sign 1) or least (sign -1) ratio of two sums, `fixed` and what every cell adds, over all ways of deciding;
 * exact, by parametric search (Dinkelbach 1967) with the best way along the cells found for each ratio by dynamic programming
 * (Viterbi 1967). Cells are in order. NaN where the sum below can be no number above 0 as things stand (every mask 0).
 */
export function extremeRatio(fixed: TwoSums, cells: readonly DecidedCell[], sign: 1 | -1): number {
  const ratio = ({ above, below }: TwoSums) => (fixed.above + above) / (fixed.below + below);
  let best = ratio({
    above: cells.reduce((sum, cell) => sum + cell.above[0], 0),
    below: cells.reduce((sum, cell) => sum + cell.below[0], 0),
  });
  for (let round = 0; round < MOST_ROUNDS && Number.isFinite(best); round += 1) {
    const next = ratio(bestSums(cells, best, sign));
    if (!(sign * (next - best) > 1e-12 * Math.abs(best))) return best;
    best = next;
  }
  return best;
}
