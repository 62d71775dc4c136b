/** Placeholder of the part `together`, to be filled before it reaches main. */
export interface TogetherEvidence {
  readonly lines: readonly string[];
}
