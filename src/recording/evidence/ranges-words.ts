import type { EvidenceLine } from './evidence-line';
import type { RangesEvidence } from './ranges';

/** What the trust section of Findings and the report say of it. */
export const rangesLines = (value: RangesEvidence): readonly EvidenceLine[] =>
  value.lines.map((words) => ({ name: 'Ranges', words, mark: null }));
