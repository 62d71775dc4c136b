import type { LeadsEvidence } from '../../recording/evidence/leads';
export function LeadsPage({ value }: { readonly value: LeadsEvidence }) {
  return <p>{value.pairs.length}</p>;
}
