import type { Cpm } from '../../units/rate';
import type { Seconds } from '../../units/time';
import type { ElectrodesOfPair } from '../electrodes';
import type { FigureValue } from '../figure';

/** What slow-wave leads that share no electrode say of each other. */
export interface LeadsEvidence {
  /** DF of coupled epochs differ by less. */
  readonly withinCpm: Cpm;
  /** Slow-wave leads of the study. */
  readonly leadCount: number;
  readonly pairs: readonly LeadPair[];
}

interface NamedPair {
  /** Keys of the leads ("#1"), in the order of the roles, and how people read them. */
  readonly first: string;
  readonly second: string;
  readonly firstName: string;
  readonly secondName: string;
  readonly electrodes: ElectrodesOfPair;
}

/** Two leads: compared, or not, with the reason. */
export type LeadPair =
  | (NamedPair & { readonly kind: 'left-out'; readonly why: string })
  | (NamedPair & {
      readonly kind: 'compared';
      /** What must be read beside its lags; null where there is nothing. */
      readonly mark: string | null;
      readonly phases: readonly PairInPhase[];
      /** One an epoch kept on both leads, by time. */
      readonly strip: readonly LagInEpoch[];
    });

export interface PairInPhase {
  readonly name: string;
  readonly fromS: Seconds;
  readonly toS: Seconds;
  /** Percent of the epochs kept on both. */
  readonly coupling: FigureValue;
  /** Its 95 % range by chance in percent; null where no percentage is given. */
  readonly couplingRange: readonly [low: number, high: number] | null;
  readonly lag: LagFound;
}

/** How much later the second lead is, or why that is not said. */
export type LagFound =
  | {
      readonly kind: 'withheld';
      readonly reason: string;
      /** Coherence at DF with the level that unrelated noise stays under; null where it could not be computed. */
      readonly coherence: number | null;
      readonly level: number | null;
    }
  | {
      readonly kind: 'lag';
      readonly dfCpm: Cpm;
      /** Above 0 where the second lead is later; from minus to plus half a cycle. */
      readonly lagS: Seconds;
      /** 95 % by chance. */
      readonly lowS: Seconds;
      readonly highS: Seconds;
      readonly halfCycleS: Seconds;
      readonly coherence: number;
      readonly level: number;
      readonly segments: number;
    };

/** The lag in one epoch; null where the leads share no DF or are not coherent there. */
export interface LagInEpoch {
  readonly fromS: Seconds;
  readonly toS: Seconds;
  readonly coupled: boolean;
  readonly dfCpm: Cpm | null;
  readonly lagS: Seconds | null;
  readonly lowS: Seconds | null;
  readonly highS: Seconds | null;
}
