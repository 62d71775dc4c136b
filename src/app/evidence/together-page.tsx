import type { TogetherEvidence } from '../../recording/evidence/together';
export function TogetherPage({ value }: { readonly value: TogetherEvidence }) {
  return <p>{value.windows.length}</p>;
}
