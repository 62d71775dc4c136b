import type { EvidenceLine } from './evidence-line';
import type { OpinionsEvidence } from './opinions';

/** What the trust section of Findings and the report say of it. */
export const opinionsLines = (value: OpinionsEvidence): readonly EvidenceLine[] =>
  value.lines.map((words) => ({ name: 'Opinions', words, mark: null }));
