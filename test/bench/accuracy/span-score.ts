import {
  coveredSeconds,
  type Interval,
  joinIntervals,
  type Span,
  withoutIntervals,
} from '../../../src/recording/span';
import type { StudyTruth } from '../../../src/simulate/simulate-study';

/** What lies this near to a spoiled stretch is neither: it has no sharp edge. */
const MARGIN_S = 1;
/** A step that lasts longer than this settles slowly, which leaves the heart alone. */
const POP_S = 3;

/** Seconds that were spoiled, how many of them were proposed, and how many that were clean. */
export interface SpanScore {
  readonly heart: { readonly ofS: number; readonly foundS: number; readonly wrongS: number };
  readonly stomach: { readonly ofS: number; readonly foundS: number; readonly wrongS: number };
}

const secondsOf = (intervals: readonly Interval[]) =>
  joinIntervals(intervals).reduce((sum, { fromS, toS }) => sum + toS - fromS, 0);

/**
 * The proposed spans of a study of one lead against where it was spoiled. For the stomach, talk and muscle bursts lie far
 * above its band and are not looked for; for the heart, the slow settling of a step is not.
 */
export function spanScore(spans: readonly Span[], { spoiled }: StudyTruth): SpanScore {
  const near = spoiled.map(({ fromS, toS }) => ({ fromS: fromS - MARGIN_S, toS: toS + MARGIN_S }));
  const scoreOf = (organ: 'heart' | 'stomach') => {
    const proposed = spans.filter(({ target }) => target === 'both' || target === organ);
    const meant = joinIntervals(
      spoiled.filter(({ cause, fromS, toS }) =>
        organ === 'heart'
          ? cause !== 'step' || toS - fromS < POP_S
          : cause !== 'talk' && cause !== 'burst',
      ),
    );
    return {
      ofS: secondsOf(meant),
      foundS: meant.reduce((sum, { fromS, toS }) => sum + coveredSeconds(proposed, fromS, toS), 0),
      wrongS: secondsOf(withoutIntervals(proposed, near)),
    };
  };
  return { heart: scoreOf('heart'), stomach: scoreOf('stomach') };
}
