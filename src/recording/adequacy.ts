import type { Seconds } from '../units/time';
import type { Adequacy } from './findings';
import { coveredSeconds, type Interval } from './span';

/** What is left of a stretch of the study once what is spoiled or missing is taken away. */
export interface Coverage {
  readonly keptS: Seconds;
  readonly lengthS: Seconds;
  /** Kept over length, 0 to 1; 0 for a stretch without length. */
  readonly share: number;
  readonly adequacy: Adequacy;
}

const LIMITED_LOSS = 0.3;
const NOT_REPORTABLE_LOSS = 0.5;
/** Sums of times are never exact to the last bit: a loss of 30 % stays 30 %. */
const ROUNDING = 1e-9;

/**
 * What follows from the seconds kept of a phase: over 30 % lost it is limited, over 50 % not reportable
 * (both strictly; common practice, no source). A stretch without length is not reportable.
 */
export function adequacy(keptS: Seconds, lengthS: Seconds): Adequacy {
  if (!(lengthS > 0)) return 'not-reportable';
  const lost = 1 - keptS / lengthS;
  if (lost > NOT_REPORTABLE_LOSS + ROUNDING) return 'not-reportable';
  return lost > LIMITED_LOSS + ROUNDING ? 'limited' : 'enough';
}

/** Coverage of [fromS, toS) where the given stretches, overlapping or not, in any order, are lost. */
export function coverageOf(lost: readonly Interval[], fromS: Seconds, toS: Seconds): Coverage {
  const lengthS = Math.max(0, toS - fromS);
  const keptS = Math.max(0, lengthS - coveredSeconds(lost, fromS, toS));
  return {
    keptS,
    lengthS,
    share: lengthS > 0 ? keptS / lengthS : 0,
    adequacy: adequacy(keptS, lengthS),
  };
}

/** Why so little of a phase is left that its figures are limited or not reported; '' where enough is. */
export function adequacyReason(adequacy: Adequacy, keptS: Seconds, lengthS: Seconds): string {
  if (adequacy === 'enough') return '';
  const lost = lengthS > 0 && keptS / lengthS < 1 - NOT_REPORTABLE_LOSS - ROUNDING;
  return adequacy === 'not-reportable' && !lost
    ? `${(keptS / 60).toFixed(1)} min kept are too few`
    : `${keptPercent(keptS, lengthS)} % kept`;
}

/** Whole percent kept, rounded down, so that a phase that lost over 30 % never reads as 70 % kept; 0 without a length. */
export function keptPercent(keptS: Seconds, lengthS: Seconds): number {
  return lengthS > 0 ? Math.floor((100 * keptS) / lengthS + ROUNDING) : 0;
}
