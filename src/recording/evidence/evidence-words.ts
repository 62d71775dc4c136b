import type { Evidence, EvidencePart } from './evidence';
import { EVIDENCE_PARTS } from './evidence';
import type { EvidenceLine } from './evidence-line';
import { leadsLines } from './leads-words';
import { opinionsLines } from './opinions-words';
import { plantedLines } from './planted-words';
import { rangesLines } from './ranges-words';
import { togetherLines } from './together-words';

type LinesOf = { readonly [P in EvidencePart]: (value: Evidence[P]) => readonly EvidenceLine[] };

const LINES: LinesOf = {
  ranges: rangesLines,
  opinions: opinionsLines,
  leads: leadsLines,
  together: togetherLines,
  planted: plantedLines,
};

const linesOf = <P extends EvidencePart>(part: P, evidence: Partial<Evidence>) => {
  const value: Evidence[P] | undefined = evidence[part];
  return value === undefined ? [] : LINES[part](value);
};

/** The lines of the parts that are there, in the order of the parts. */
export const evidenceLines = (
  evidence: Partial<Evidence>,
): readonly (EvidenceLine & { readonly part: EvidencePart })[] =>
  EVIDENCE_PARTS.flatMap((part) => linesOf(part, evidence).map((line) => ({ ...line, part })));
