import type { OpinionsEvidence } from '../../recording/evidence/opinions';

/** The page of the part `opinions`. */
export function OpinionsPage({ value }: { readonly value: OpinionsEvidence }) {
  return <p>{value.lines.join(' ')}</p>;
}
