import type { Epoch, Rhythm } from '../recording/rhythm';

/** No run is taken to be so long that less than a nineteenth of the looks counts. */
const MOST_ALIKE = 0.9;

/**
 * How many independent looks the epochs of a part hold at whether the rhythm is a given one: `looks` where epochs that share
 * no sample know nothing of each other, fewer by (1 + r) / (1 - r) where runs are longer, r being how alike such neighbours are
 * (a chain of two states; Bartlett 1946 for its sum). `apartS` is the length of an epoch.
 */
export function effectiveLooks(
  epochs: readonly Pick<Epoch, 'fromS' | 'rhythm'>[],
  rhythm: Rhythm,
  looks: number,
  apartS: number,
): number {
  const is = epochs.map((epoch) => epoch.rhythm === rhythm);
  const share = is.filter(Boolean).length / is.length;
  const chance = 2 * share * (1 - share);
  let [pairs, unlike] = [0, 0];
  let next = 0;
  epochs.forEach(({ fromS }, i) => {
    while (next < epochs.length && epochs[next].fromS < fromS + apartS - 1e-6) next += 1;
    if (next >= epochs.length || epochs[next].fromS > fromS + 1.5 * apartS) return;
    pairs += 1;
    if (is[next] !== is[i]) unlike += 1;
  });
  if (!(chance > 0) || pairs === 0) return looks;
  const alike = Math.min(MOST_ALIKE, Math.max(0, 1 - unlike / pairs / chance));
  return Math.min(looks, Math.max(1, (looks * (1 - alike)) / (1 + alike)));
}
