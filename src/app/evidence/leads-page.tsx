import type { LeadsEvidence } from '../../recording/evidence/leads';

/** The page of the part `leads`. */
export function LeadsPage({ value }: { readonly value: LeadsEvidence }) {
  return <p>{value.lines.join(' ')}</p>;
}
