import type { EvidenceLine } from './evidence-line';
import type { TogetherEvidence } from './together';

/** What the trust section of Findings and the report say of it. */
export const togetherLines = (value: TogetherEvidence): readonly EvidenceLine[] =>
  value.lines.map((words) => ({ name: 'Together', words, mark: null }));
