import { exp, log } from '../numeric/elementary';
import type { LeadSpectra } from './lead-spectra';

/** Where the background is read off; 0.6 cpm keeps clear of what taking off a line takes away. */
const FIT_CPM = [0.6, 15] as const;
/** Bins so far above the line (natural logarithm) are waves, not background. */
const OUTLIER_LOG = 0.45;
const ROUNDS = 6;
const MOST_EXPONENT = 3;
const FEWEST_BINS = 20;

interface Point {
  readonly x: number;
  readonly y: number;
}

interface Line {
  readonly x: number;
  readonly y: number;
  readonly slope: number;
}

function lineThrough(points: readonly Point[]): Line {
  const x = points.reduce((sum, point) => sum + point.x, 0) / points.length;
  const y = points.reduce((sum, point) => sum + point.y, 0) / points.length;
  let squares = 0;
  let product = 0;
  for (const point of points) {
    squares += (point.x - x) ** 2;
    product += (point.x - x) * (point.y - y);
  }
  const slope = squares > 0 ? product / squares : 0;
  return { x, y, slope: Math.max(-MOST_EXPONENT, Math.min(0, slope)) };
}

/**
 * The lead's own background beneath its waves, density by bin: 1/f^b (b from 0 to 3), a line through the logarithms of the
 * mean spectrum from 0.6 to 15 cpm, fitted again and again without what stands above it. Held at the lowest bin's value below.
 */
export function leadBackground({ mean, binCpm }: LeadSpectra): Float64Array {
  const all: Point[] = [];
  for (let k = Math.ceil(FIT_CPM[0] / binCpm); k < mean.length && k * binCpm < FIT_CPM[1]; k += 1)
    all.push({ x: log(k * binCpm), y: log(Math.max(1e-280, mean[k])) });
  let line = lineThrough(all);
  for (let round = 1; round < ROUNDS; round += 1) {
    const { x, y, slope } = line;
    const below = all.filter((point) => point.y - y - slope * (point.x - x) < OUTLIER_LOG);
    if (below.length < FEWEST_BINS) break;
    line = lineThrough(below);
  }
  const { x, y, slope } = line;
  return mean.map((_, k) => exp(y + slope * (log(Math.max(1, k) * binCpm) - x)));
}
