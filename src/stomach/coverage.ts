import { coverageOf, keptPercent } from '../recording/adequacy';
import type { Adequacy } from '../recording/findings';
import type { Interval } from '../recording/span';
import type { Seconds } from '../units/time';

/** Clean minutes below which percentages of time become counts, and below which there are none. */
const COUNTS_BELOW_S = 15 * 60;
const NOTHING_BELOW_S = 10 * 60;
const ROUNDING_S = 1e-6;

/** What is left of a phase for the stomach, and how its percentages are given. */
export interface StomachCoverage {
  readonly keptS: Seconds;
  /** As for every lead, and not reportable also under 10 clean minutes. */
  readonly adequacy: Adequacy;
  /** Percentages of time. */
  readonly percentages: 'percent' | 'count' | 'withheld';
  /** Why percentages of time are withheld; empty where they are not. */
  readonly reason: string;
  /** Why no figure in percent of whatever kind is given: over half of the phase is lost; null where it is not. */
  readonly overHalfLost: string | null;
  /** Marks to print beside every figure of the phase. */
  readonly marks: readonly string[];
}

/**
 * Coverage of a phase or a part of it, with what is spoiled or missing taken away. Beside the adequacy of every lead
 * (`recording/adequacy`): over 50 % lost carries no figure in percent; under 15 clean minutes percentages of time are counts,
 * under 10 there are none (common practice; field-notes 2.5).
 */
export function stomachCoverage(
  phase: { readonly fromS: Seconds; readonly toS: Seconds },
  spoiled: readonly Interval[],
): StomachCoverage {
  const { keptS, adequacy } = coverageOf(spoiled, phase.fromS, phase.toS);
  const lost = `${100 - keptPercent(keptS, phase.toS - phase.fromS)} % of the phase is lost`;
  const overHalfLost = adequacy === 'not-reportable' ? `${lost} (over 50 %)` : null;
  const tooShort =
    keptS < NOTHING_BELOW_S - ROUNDING_S
      ? `${(Math.floor(keptS / 6) / 10).toFixed(1)} clean minutes (under 10)`
      : null;
  const reason = overHalfLost ?? tooShort;
  const counted = keptS < COUNTS_BELOW_S - ROUNDING_S ? 'count' : 'percent';
  return {
    keptS,
    adequacy: reason === null ? adequacy : 'not-reportable',
    percentages: reason === null ? counted : 'withheld',
    reason: reason ?? '',
    overHalfLost,
    marks: adequacy === 'enough' ? [] : [`limited: ${lost}`],
  };
}
