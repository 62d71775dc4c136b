import type { Cpm } from '../../units/rate';
import type { Seconds } from '../../units/time';

/** Frequencies this near each other are the same. */
export const SAME_CPM = 0.25;
/** Under this percentage of epochs with the same frequency, the methods are said to disagree (common practice, no source). */
export const LEAST_AGREEMENT_PCT = 90;
/** Powers of a phase that differ by more than this percentage of their mean are said to disagree; on simulated half hours they differ by 12 at most. */
export const MOST_POWER_DIFFERENCE_PCT = 25;

/** The dominant frequency of one kept epoch by several methods; null where one finds none. */
export interface EpochOpinions {
  readonly phase: string;
  readonly centreS: Seconds;
  /** DF of the figures; null where the epoch has no rhythm of one band. */
  readonly hannCpm: Cpm | null;
  readonly burgCpm: Cpm | null;
  readonly burgOrder: number;
  readonly multitaperCpm: Cpm | null;
  /** Crests a minute of the drawn wave; null where there are under four. */
  readonly crestCpm: Cpm | null;
}

/** In how many epochs with a rhythm a method finds DF again, and the median of what it finds in them. */
export interface Agreement {
  readonly same: number;
  readonly of: number;
  readonly medianCpm: Cpm | null;
}

/** Power of one band of the heart rate by two methods. */
export interface PowerPair {
  readonly key: 'lf_ms2' | 'hf_ms2';
  readonly lombMs2: number;
  readonly welchMs2: number;
}

/** A figure that other methods do not bear out, and what they say. */
export interface Disagreement {
  readonly key: string;
  readonly words: string;
}

/** What other methods say of one phase or part of it. */
export interface PartOpinions {
  readonly name: string;
  readonly phase: string;
  readonly fromS: Seconds;
  readonly toS: Seconds;
  /** Median DF of the epochs with a rhythm; null where there are none. */
  readonly hannCpm: Cpm | null;
  readonly burg: Agreement;
  readonly multitaper: Agreement;
  readonly crests: Agreement;
  readonly powers: readonly PowerPair[];
  readonly disagreements: readonly Disagreement[];
}

/** What other methods make of the same minutes. */
export interface OpinionsEvidence {
  /** The reported lead. */
  readonly lead: string;
  readonly epochs: readonly EpochOpinions[];
  /** As the findings have them. */
  readonly parts: readonly PartOpinions[];
}
