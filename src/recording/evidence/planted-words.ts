import type { EvidenceLine } from './evidence-line';
import type { PlantedEvidence } from './planted';

/** What the trust section of Findings and the report say of it. */
export const plantedLines = (value: PlantedEvidence): readonly EvidenceLine[] =>
  value.lines.map((words) => ({ name: 'Planted', words, mark: null }));
