import { exp, log } from '../numeric/elementary';
import { type LogPoint, lineAt, powerLawLine } from '../numeric/power-law-line';
import type { LeadSpectra } from './lead-spectra';

/** Where the background is read off; 0.6 cpm keeps clear of what taking off a line takes away. */
const FIT_CPM = [0.6, 15] as const;
/** Bins so far above the line (natural logarithm) are waves, not background. */
const OUTLIER_LOG = 0.45;
const ROUNDS = 6;
const FEWEST_BINS = 20;

/**
 * The lead's own background beneath its waves, density by bin: 1/f^b (b from 0 to 3), a line through the logarithms of the
 * mean spectrum from 0.6 to 15 cpm, fitted again and again without what stands above it. Held at the lowest bin's value below.
 */
export function leadBackground({ mean, binCpm }: LeadSpectra): Float64Array {
  const all: LogPoint[] = [];
  for (let k = Math.ceil(FIT_CPM[0] / binCpm); k < mean.length && k * binCpm < FIT_CPM[1]; k += 1)
    all.push({ x: log(k * binCpm), y: log(Math.max(1e-280, mean[k])) });
  let line = powerLawLine(all);
  for (let round = 1; round < ROUNDS; round += 1) {
    const { meanX, meanY, slope } = line;
    const below = all.filter(({ x, y }) => y - meanY - slope * (x - meanX) < OUTLIER_LOG);
    if (below.length < FEWEST_BINS) break;
    line = powerLawLine(below);
  }
  return mean.map((_, k) => exp(lineAt(line, log(Math.max(1, k) * binCpm))));
}
