/** Placeholder of the part `planted`, to be filled before it reaches main. */
export interface PlantedEvidence {
  readonly lines: readonly string[];
}
