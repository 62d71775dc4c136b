import type { EvidenceLine } from './evidence-line';
import type { LeadsEvidence } from './leads';

/** What the trust section of Findings and the report say of it. */
export const leadsLines = (value: LeadsEvidence): readonly EvidenceLine[] =>
  value.lines.map((words) => ({ name: 'Leads', words, mark: null }));
