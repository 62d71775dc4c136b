import type { TogetherEvidence } from '../../recording/evidence/together';

/** The page of the part `together`. */
export function TogetherPage({ value }: { readonly value: TogetherEvidence }) {
  return <p>{value.lines.join(' ')}</p>;
}
