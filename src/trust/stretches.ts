import { median } from '../numeric/statistics';
import type { OverStretches } from '../recording/evidence/planted';
import type { Phase } from '../recording/phase';
import type { Interval } from '../recording/span';
import type { Seconds } from '../units/time';

/** A check is repeated over about so many stretches, none shorter than an epoch. */
const WANTED = 10;
const LEAST_S: Seconds = 240;
/** Of a longer study the check takes so many pieces of so long each, spread over it. */
const LONG_S: Seconds = 12_000;
const PIECES = 10;
const PIECE_S: Seconds = 1200;

/** Where a check is made: what epochs are laid in, and the stretches that are scored by themselves. */
export interface CheckPlan {
  readonly phases: readonly Phase[];
  readonly stretches: readonly Interval[];
}

/** Equal parts of a stretch. */
function partsOf({ fromS, toS }: Interval, count: number): readonly Interval[] {
  const partS = (toS - fromS) / count;
  return Array.from({ length: count }, (_, k) => ({
    fromS: fromS + k * partS,
    toS: fromS + (k + 1) * partS,
  }));
}

/** Pieces spread evenly over phases set end to end, each inside one phase. */
function piecesOf(phases: readonly Phase[], totalS: Seconds): readonly Phase[] {
  return Array.from({ length: PIECES }, (_, k): Phase[] => {
    let atS = ((k + 0.5) * totalS) / PIECES;
    for (const { name, fromS, toS } of phases) {
      const lengthS = toS - fromS;
      if (atS < lengthS) {
        const pieceS = Math.min(PIECE_S, lengthS);
        const from = Math.max(fromS, Math.min(toS - pieceS, fromS + atS - pieceS / 2));
        return [{ name, fromS: from, toS: from + pieceS }];
      }
      atS -= lengthS;
    }
    return [];
  }).flat();
}

/**
 * Stretches of a study that a check is repeated over: about ten equal parts of its phases, none under four minutes; of a study
 * with over 200 minutes ten pieces of 20 minutes. Phases too short for an epoch are left out.
 */
export function checkPlan(phases: readonly Phase[], durationS: Seconds): CheckPlan {
  const inside = phases
    .map(({ name, fromS, toS }) => ({
      name,
      fromS: Math.max(0, fromS),
      toS: Math.min(durationS, toS),
    }))
    .filter(({ fromS, toS }) => toS - fromS >= LEAST_S);
  const totalS = inside.reduce((sum, { fromS, toS }) => sum + toS - fromS, 0);
  if (totalS > LONG_S) {
    const pieces = piecesOf(inside, totalS);
    return { phases: pieces, stretches: pieces };
  }
  const partS = Math.max(LEAST_S, totalS / WANTED);
  return {
    phases: inside,
    stretches: inside.flatMap((phase) =>
      partsOf(phase, Math.max(1, Math.floor((phase.toS - phase.fromS) / partS))),
    ),
  };
}

/** Stretches of heartbeats are none shorter and none longer than these. */
const HEART_S = [60, 180] as const;

/** Stretches of a study that a check of heartbeats is repeated over: the middles of about ten equal parts of its phases. */
export function heartStretches(phases: readonly Phase[], durationS: Seconds): readonly Interval[] {
  const inside = phases
    .map(({ fromS, toS }) => ({ fromS: Math.max(0, fromS), toS: Math.min(durationS, toS) }))
    .filter(({ fromS, toS }) => toS - fromS >= HEART_S[0]);
  const totalS = inside.reduce((sum, { fromS, toS }) => sum + toS - fromS, 0);
  const partS = Math.max(HEART_S[0], totalS / WANTED);
  return inside
    .flatMap((phase) => partsOf(phase, Math.max(1, Math.floor((phase.toS - phase.fromS) / partS))))
    .map(({ fromS, toS }) => {
      const middleS = (fromS + toS) / 2;
      const halfS = Math.min(HEART_S[1], toS - fromS) / 2;
      return { fromS: middleS - halfS, toS: middleS + halfS };
    });
}

/** Median, least and greatest of the values that there are; null of none. */
export function overStretches(values: readonly (number | null)[]): OverStretches | null {
  const there = values.flatMap((one) => (one !== null && Number.isFinite(one) ? [one] : []));
  if (there.length === 0) return null;
  return { median: median(there), least: Math.min(...there), most: Math.max(...there) };
}
