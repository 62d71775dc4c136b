import type { RivalVerdict } from '../recording/evidence/together';
import type { Microvolts } from '../units/voltage';

/** What is known of the heartbeat's own slow course in a lead; null where it could not be told. */
export interface LeakFacts {
  /** Amplitudes near DF: of what the beats put into the lead, and of the lead. */
  readonly leakUv: Microvolts | null;
  readonly slowUv: Microvolts;
  /** Depth and p of the intervals' modulation as found, and with the beats' share taken out of the lead. */
  readonly depth: number;
  readonly p: number;
  readonly withoutDepth: number | null;
  readonly withoutP: number | null;
  /** p of the beats' height against the same phase. */
  readonly heightP: number | null;
}

const SIGNIFICANT = 0.05;
/** The beats' share of the lead from which it may make the phase by itself. */
const LARGE_SHARE = 0.1;
const LEAST_DEPTH_LEFT = 0.5;

/**
 * Whether leakage is a rival: the beats make a tenth or more of what the lead holds near DF, the modulation goes or halves
 * once their share is taken out, or the beats' height follows the phase too (the rules are this program's).
 */
export function leakVerdict(facts: LeakFacts): RivalVerdict {
  const { leakUv, slowUv, depth, p, withoutDepth, withoutP, heightP } = facts;
  if (leakUv === null || withoutDepth === null || withoutP === null)
    return heightP !== null && heightP < SIGNIFICANT ? 'seen' : 'not-tested';
  const large = leakUv >= LARGE_SHARE * slowUv;
  const goes =
    p < SIGNIFICANT && (withoutP >= SIGNIFICANT || withoutDepth < LEAST_DEPTH_LEFT * depth);
  const heights = heightP !== null && heightP < SIGNIFICANT;
  return large || goes || heights ? 'seen' : 'not-seen';
}
