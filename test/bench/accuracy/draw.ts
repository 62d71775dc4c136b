import { createRandom } from '../../../src/numeric/random';

/** Chance for the making of studies, the same for the same seed. */
export interface Draw {
  between(low: number, high: number): number;
  whole(low: number, high: number): number;
  pick<T>(options: readonly T[]): T;
  chance(share: number): boolean;
}

export function createDraw(seed: number): Draw {
  const random = createRandom(seed);
  const between = (low: number, high: number) => low + (high - low) * random.uniform();
  return {
    between,
    whole: (low, high) => low + random.below(high - low + 1),
    pick: (options) => options[random.below(options.length)],
    chance: (share) => random.uniform() < share,
  };
}
