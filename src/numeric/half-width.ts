import { blockBootstrap } from './block-bootstrap';
import { createRandom } from './random';

const REPLICATES = 200;
const RANDOM = 1;

/**
 * Half the width of the 95 % range of a statistic of `count` things in order by the moving-block bootstrap (Kuensch 1989), a
 * quick measure of how much it may move by chance; NaN where the things are fewer than `fewestBlocks` blocks.
 */
export function halfWidth(
  {
    count,
    blockLength,
    fewestBlocks,
  }: { count: number; blockLength: number; fewestBlocks: number },
  statistic: (places: Int32Array) => number,
): number {
  if (count < fewestBlocks * blockLength) return Number.NaN;
  const options = {
    count,
    blockLength,
    replicates: REPLICATES,
    random: createRandom(RANDOM),
    quantiles: [0.025, 0.975],
  };
  const [low, high] = blockBootstrap(options, statistic).values;
  return (high - low) / 2;
}
