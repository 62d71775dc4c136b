import type { Seconds } from '../units/time';
import type { Figures, FigureValue, SeenInPassing } from './figure';

/** How much of a phase is left, and what follows from it. */
export type Adequacy = 'enough' | 'limited' | 'not-reportable';

/** The figures of one phase, or of a named part of it ("fed 0-30 min"). */
export interface PhaseFindings {
  /** Phase or part as shown: "fasting", "fed", "fed 0-30", "fed 30-60". */
  readonly name: string;
  /** The phase it belongs to. */
  readonly phase: string;
  readonly fromS: Seconds;
  readonly toS: Seconds;
  /** Seconds left for the stomach on the reported lead, and for the heart on its lead. */
  readonly keptStomachS: Seconds;
  readonly keptHeartS: Seconds;
  readonly adequacyStomach: Adequacy;
  readonly adequacyHeart: Adequacy;
  readonly figures: Figures;
}

/** One figure compared between two phases. */
export interface FigureChange {
  readonly key: string;
  readonly from: string;
  readonly to: string;
  readonly value: FigureValue;
}

/** A statement about the study that stands above its figures ("band is tilted by a 0.05 Hz high-pass"). */
export interface StudyWarning {
  readonly about: 'stomach' | 'heart' | 'study';
  readonly text: string;
}

export interface Findings {
  /** Edit number the figures belong to. */
  readonly edit: number;
  readonly phases: readonly PhaseFindings[];
  readonly changes: readonly FigureChange[];
  readonly seen: readonly SeenInPassing[];
  readonly warnings: readonly StudyWarning[];
}
