import { coverageOf } from '../recording/adequacy';
import { lostOn } from '../recording/lost';
import { type Phase, phasesOrWhole } from '../recording/phase';
import type { Gap } from '../recording/recording';
import type { Roles } from '../recording/roles';
import type { Span } from '../recording/span';
import type { Seconds } from '../units/time';

/** How long a phase is, and how much of it is kept for each organ. */
export interface TimeLeft {
  readonly phase: string;
  readonly lengthS: Seconds;
  /** Kept on the reported lead. */
  readonly stomachS: Seconds;
  /** Kept on the heart lead; null where there is none. */
  readonly heartS: Seconds | null;
}

/** What the count of time left is made from. */
export interface TimeLeftInput {
  readonly phases: readonly Phase[];
  readonly spans: readonly Span[];
  readonly roles: Roles;
  readonly gaps: readonly Gap[];
  readonly durationS: Seconds;
}

/** Time left in each phase, from phases, spans and gaps alone; `kept` of the figures is the same time. */
export function timeLeft({
  phases,
  spans,
  roles,
  gaps,
  durationS,
}: TimeLeftInput): readonly TimeLeft[] {
  const { slow, reported, heart } = roles;
  const lostStomach = lostOn(slow[reported], 'stomach', spans, gaps);
  const lostHeart = heart && lostOn(heart, 'heart', spans, gaps);
  return phasesOrWhole(phases, durationS).map(({ name, fromS, toS }) => ({
    phase: name,
    lengthS: toS - fromS,
    stomachS: coverageOf(lostStomach, fromS, toS).keptS,
    heartS: lostHeart && coverageOf(lostHeart, fromS, toS).keptS,
  }));
}

/** Minutes with one decimal, as the figures are given. */
export const minutesText = (seconds: Seconds): string => (seconds / 60).toFixed(1);

/** "fasting 30.0 min, left for the stomach 27.0, for the heart 28.1". */
export function leftWords({ phase, lengthS, stomachS, heartS }: TimeLeft): string {
  const heart = heartS === null ? '' : `, for the heart ${minutesText(heartS)}`;
  return `${phase} ${minutesText(lengthS)} min, left for the stomach ${minutesText(stomachS)}${heart}`;
}

/** Those that differ between before and after; all of them where none does. */
export function changedLeft(
  before: readonly TimeLeft[],
  after: readonly TimeLeft[],
): readonly TimeLeft[] {
  const same = (a: TimeLeft, b: TimeLeft | undefined) =>
    a.lengthS === b?.lengthS && a.stomachS === b.stomachS && a.heartS === b.heartS;
  const changed = after.filter((one, i) => !same(one, before[i]));
  return changed.length > 0 ? changed : after;
}
