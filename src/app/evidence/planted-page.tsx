import type { PlantedEvidence } from '../../recording/evidence/planted';

/** The page of the part `planted`. */
export function PlantedPage({ value }: { readonly value: PlantedEvidence }) {
  return <p>{value.lines.join(' ')}</p>;
}
