import { type Lead, leadKey } from '../src/recording/lead';
import type { Span } from '../src/recording/span';

type Proposed = Omit<Span, 'id'>;

/** The proposed spans of a lead that spoil the heart only where the detector cannot read the beats all the same. */
export const doubtedOf = (lead: Lead, proposed: readonly Proposed[]): readonly Proposed[] =>
  proposed.filter(
    ({ lead: key, target, cause }) =>
      key === leadKey(lead) && target !== 'stomach' && (cause === 'burst' || cause === 'step'),
  );

/** Proposed spans once the detector has looked: `legible` says of each of `doubted` whether it reads the beats there. */
export function judgedSpans(
  proposed: readonly Proposed[],
  doubted: readonly Proposed[],
  legible: readonly boolean[],
): readonly Proposed[] {
  const readable = new Set(doubted.filter((_, k) => legible[k] ?? false));
  return proposed.flatMap((span): readonly Proposed[] => {
    if (!readable.has(span)) return [span];
    return span.target === 'both' ? [{ ...span, target: 'stomach' }] : [];
  });
}
