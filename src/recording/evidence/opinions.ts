/** Placeholder of the part `opinions`, to be filled before it reaches main. */
export interface OpinionsEvidence {
  readonly lines: readonly string[];
}
