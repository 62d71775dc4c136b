import type { Adequacy } from '../recording/findings';
import { coveredSeconds, type Interval } from '../recording/span';
import type { Seconds } from '../units/time';

/** Clean minutes below which percentages become counts, and below which there are none. */
const COUNTS_BELOW_S = 15 * 60;
const NOTHING_BELOW_S = 10 * 60;
/** Lost shares above which a phase is limited, and above which it carries no percentages. */
const LIMITED_ABOVE = 0.3;
const NOTHING_ABOVE = 0.5;
const ROUNDING = 1e-9;

/** What is left of a phase for the stomach, and how its percentages of time are given. */
export interface StomachCoverage {
  readonly keptS: Seconds;
  /** Kept over all seconds, 0 to 1. */
  readonly coverage: number;
  readonly adequacy: Adequacy;
  readonly percentages: 'percent' | 'count' | 'withheld';
  /** Why percentages are withheld; empty where they are not. */
  readonly reason: string;
  /** Marks to print beside every figure of the phase. */
  readonly marks: readonly string[];
}

const percent = (share: number) => 100 - Math.round(100 * (1 - share));

function reasonToWithhold(keptS: Seconds, lost: number): string | null {
  if (lost > NOTHING_ABOVE + ROUNDING) return `${percent(lost)} % of the phase is lost (over 50 %)`;
  if (keptS < NOTHING_BELOW_S - ROUNDING)
    return `${(keptS / 60).toFixed(1)} clean minutes (under 10)`;
  return null;
}

/**
 * Coverage of a phase or a part of it: seconds that no spoiled or missing stretch covers. Over 30 %
 * lost is limited; over 50 % lost, or under 10 clean minutes, carries no percentages; under 15 clean
 * minutes carries counts (common practice; field-notes 2.5).
 */
export function stomachCoverage(
  phase: { readonly fromS: Seconds; readonly toS: Seconds },
  spoiled: readonly Interval[],
): StomachCoverage {
  const lengthS = Math.max(0, phase.toS - phase.fromS);
  const keptS = lengthS - coveredSeconds(spoiled, phase.fromS, phase.toS);
  const coverage = lengthS > 0 ? keptS / lengthS : 0;
  const reason = reasonToWithhold(keptS, 1 - coverage);
  const limited = 1 - coverage > LIMITED_ABOVE + ROUNDING;
  const counted = keptS < COUNTS_BELOW_S - ROUNDING ? 'count' : 'percent';
  return {
    keptS,
    coverage,
    adequacy: reason ? 'not-reportable' : limited ? 'limited' : 'enough',
    percentages: reason ? 'withheld' : counted,
    reason: reason ?? '',
    marks: limited ? [`limited: ${percent(1 - coverage)} % of the phase is lost`] : [],
  };
}
