import type { Evidence, EvidencePart } from '../../recording/evidence/evidence';
import { EVIDENCE_PARTS } from '../../recording/evidence/evidence';
import { leadsJson } from './leads-json';
import { opinionsJson } from './opinions-json';
import { plantedJson } from './planted-json';
import { rangesJson } from './ranges-json';
import { togetherJson } from './together-json';

type JsonOf = { readonly [P in EvidencePart]: (value: Evidence[P]) => unknown };

const JSON_OF: JsonOf = {
  ranges: rangesJson,
  opinions: opinionsJson,
  leads: leadsJson,
  together: togetherJson,
  planted: plantedJson,
};

const jsonOf = <P extends EvidencePart>(part: P, evidence: Evidence) =>
  JSON_OF[part](evidence[part]);

/** The evidence beside the figures of findings.json, by part. */
export const evidenceJson = (evidence: Evidence): Record<string, unknown> =>
  Object.fromEntries(EVIDENCE_PARTS.map((part) => [part, jsonOf(part, evidence)]));
