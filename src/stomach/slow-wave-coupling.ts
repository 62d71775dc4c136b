import type { Epoch } from '../recording/rhythm';
import type { Cpm } from '../units/rate';
import type { Seconds } from '../units/time';
import { hasRhythm } from './rhythm-class';

/** Two leads are coupled in an epoch whose DF differ by less (the usual value, from memory). */
export const COUPLED_WITHIN_CPM: Cpm = 0.2;

/** An epoch kept on both of two leads. */
export interface EpochOfPair {
  readonly phase: string;
  readonly fromS: Seconds;
  readonly toS: Seconds;
  /** Both rhythms are normo and the DF agree. */
  readonly coupled: boolean;
  /** Mean DF where both have a rhythm, of whatever band, and the DF agree; null elsewhere. */
  readonly sharedCpm: Cpm | null;
}

/** Differences of decimals are never exact: 0.2 apart is not under 0.2. */
const ROUNDING = 1e-9;

/** Whether two DF agree: strictly less than COUPLED_WITHIN_CPM apart. */
export const dfAgree = (a: Cpm, b: Cpm): boolean => Math.abs(a - b) < COUPLED_WITHIN_CPM - ROUNDING;

/** The epochs that are kept on both leads, of the same phases and settings, in the order of the first. */
export function epochsOfPair(
  first: readonly Epoch[],
  second: readonly Epoch[],
): readonly EpochOfPair[] {
  const place = ({ phase, fromS }: Epoch) => `${fromS} ${phase}`;
  const others = new Map(second.map((epoch) => [place(epoch), epoch]));
  return first.flatMap((a) => {
    const b = others.get(place(a));
    if (!b || !a.kept || !b.kept) return [];
    const agree = a.dfCpm !== null && b.dfCpm !== null && dfAgree(a.dfCpm, b.dfCpm);
    const both = agree && hasRhythm(a) && hasRhythm(b);
    return [
      {
        phase: a.phase,
        fromS: a.fromS,
        toS: a.toS,
        coupled: agree && a.rhythm === 'normo' && b.rhythm === 'normo',
        sharedCpm: both && a.dfCpm !== null && b.dfCpm !== null ? (a.dfCpm + b.dfCpm) / 2 : null,
      },
    ];
  });
}
