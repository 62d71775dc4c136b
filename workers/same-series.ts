import type { BeatList } from '../src/recording/beat';
import type { BreathingSeries } from '../src/recording/heart-series';
import type { ReviewInputs } from './analysis-api';

/** True where both lists hold the same beats. */
export function sameBeats(a: BeatList, b: BeatList): boolean {
  return (
    sameArray(a.ticks, b.ticks) &&
    sameArray(a.classes, b.classes) &&
    sameArray(a.origins, b.origins)
  );
}

/** True where both series say the same, NaN being equal to itself. */
export const sameBreathing = (a: BreathingSeries, b: BreathingSeries): boolean =>
  a.from === b.from && sameArray(a.centresS, b.centresS) && sameArray(a.perMinute, b.perMinute);

/** True where both give the same results, whatever their edits: some edits reach no figure. */
export function sameReview(a: ReviewInputs, b: ReviewInputs): boolean {
  const rest = ({ roles, phases, settings, spans }: ReviewInputs) =>
    JSON.stringify([roles, phases, settings, spans]);
  return sameBeats(a.beats, b.beats) && rest(a) === rest(b);
}

function sameArray(a: ArrayLike<number>, b: ArrayLike<number>): boolean {
  if (a.length !== b.length) return false;
  for (let i = 0; i < a.length; i += 1) if (!Object.is(a[i], b[i])) return false;
  return true;
}
