/** Placeholder of the part `leads`, to be filled before it reaches main. */
export interface LeadsEvidence {
  readonly lines: readonly string[];
}
