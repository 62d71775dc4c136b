import type { Range } from '../../numeric/chance-range';

/** Where a figure may lie if every open doubt is decided one way or the other. */
export interface DoubtsRange extends Range {
  /** True where no decision gives less or more; false where each doubt's own effect was added up. */
  readonly exact: boolean;
  /** Doubts that reach the figure's phase. */
  readonly doubts: number;
}

/** Lowest and highest of a percentage under the limits and epoch lengths in use. */
export interface LimitsRange extends Range {
  /** "1-2.5-3.75-10 cpm, epochs of 3 min". */
  readonly lowBy: string;
  readonly highBy: string;
}

/** How far one figure of one phase could be from the truth; null for what cannot be told or does not apply. */
export interface FigureRanges {
  readonly key: string;
  /** Nominal 95 %. */
  readonly chance: Range | null;
  readonly doubts: DoubtsRange | null;
  readonly limits: LimitsRange | null;
}

export interface PhaseRanges {
  /** Name of the phase or part. */
  readonly name: string;
  readonly figures: readonly FigureRanges[];
}

/** How far a change between two phases could be from the truth by chance, nominal 95 %. */
export interface ChangeRange extends Range {
  readonly key: string;
  readonly from: string;
  readonly to: string;
  /** Of a change in dB, the same as a ratio of powers; null of any other. */
  readonly ratio: Range | null;
}

export interface RangesEvidence {
  readonly phases: readonly PhaseRanges[];
  readonly changes: readonly ChangeRange[];
  /** Open doubts whose mend can reach a heart figure. */
  readonly openHeartDoubts: number;
}

/** The ranges of a figure of a phase; null where none is told. */
export function rangesOfFigure(
  { phases }: RangesEvidence,
  phase: string,
  key: string,
): FigureRanges | null {
  const figures = phases.find(({ name }) => name === phase)?.figures ?? [];
  return figures.find((one) => one.key === key) ?? null;
}

/** The range of a change; null where none is told. */
export function rangeOfChange(
  { changes }: RangesEvidence,
  key: string,
  from: string,
  to: string,
): ChangeRange | null {
  return changes.find((one) => one.key === key && one.from === from && one.to === to) ?? null;
}
