import type { Epoch, Rhythm } from '../recording/rhythm';

/** What one block of the stomach row says. */
export type BlockKind = Rhythm | 'spoiled';

/** Consecutive time of one kind in the stomach row. */
export interface StomachBlock {
  readonly fromS: number;
  readonly toS: number;
  readonly kind: BlockKind;
}

/** One block an epoch, `stepS` wide about the epoch's centre, in the order of the epochs. */
export function stomachBlocks(epochs: readonly Epoch[], stepS: number): readonly StomachBlock[] {
  return epochs.map((epoch) => {
    const centre = (epoch.fromS + epoch.toS) / 2;
    const kind = epoch.kept ? (epoch.rhythm ?? 'undecided') : 'spoiled';
    return { fromS: centre - stepS / 2, toS: centre + stepS / 2, kind };
  });
}

/** Neighbouring blocks of one kind joined: for strips where one block is narrower than it can be drawn. */
export function joinedBlocks(blocks: readonly StomachBlock[]): readonly StomachBlock[] {
  const joined: StomachBlock[] = [];
  for (const block of blocks) {
    const last = joined[joined.length - 1];
    if (last && last.kind === block.kind && block.fromS - last.toS < 1e-6)
      joined[joined.length - 1] = { ...last, toS: block.toS };
    else joined.push(block);
  }
  return joined;
}
