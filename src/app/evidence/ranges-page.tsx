import type { RangesEvidence } from '../../recording/evidence/ranges';

/** The page of the part `ranges`. */
export function RangesPage({ value }: { readonly value: RangesEvidence }) {
  return <p>{value.lines.join(' ')}</p>;
}
