/** Placeholder of the part `ranges`, to be filled before it reaches main. */
export interface RangesEvidence {
  readonly lines: readonly string[];
}
