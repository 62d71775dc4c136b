import type { Doubt } from '../src/recording/doubt';
import type { Evidence, EvidencePart } from '../src/recording/evidence/evidence';
import { EVIDENCE_PARTS, wholeOf } from '../src/recording/evidence/evidence';
import type { EvidenceReply, ReviewInputs } from './analysis-api';
import type { Job } from './job';
import type { DoubtInputs } from './pipeline-doubts';
import type { Study } from './pipeline-study';
import { sameReview } from './same-series';

/** What the evidence of a review stands on. */
export interface EvidenceInputs extends DoubtInputs {
  readonly study: Study;
  /** The open doubts with their mends, by time. */
  readonly open: readonly Doubt[];
}

type Makers = {
  readonly [P in EvidencePart]: (from: EvidenceInputs, job: Job) => Promise<Evidence[P]>;
};

/** Each part's code is fetched when it is asked for first. */
const MAKERS: Makers = {
  ranges: async (from, job) => (await import('./pipeline-ranges')).rangesOf(from, job),
  opinions: async (from, job) => (await import('./pipeline-opinions')).opinionsOf(from, job),
  leads: async (from, job) => (await import('./pipeline-leads')).leadsOf(from, job),
  together: async (from, job) => (await import('./pipeline-together')).togetherOf(from, job),
  planted: async (from, job) => (await import('./pipeline-planted')).plantedOf(from, job),
};

/** What was computed of a study last, by part, with what it was computed from. */
interface Kept<P extends EvidencePart> {
  readonly inputs: ReviewInputs;
  readonly openIds: string;
  readonly value: Evidence[P];
}
type KeptParts = { [P in EvidencePart]?: Kept<P> };
const kept = new WeakMap<Study, KeptParts>();

/** One part of the evidence of a review; what was computed for the same review is given again. */
export async function evidenceOf<P extends EvidencePart>(
  part: P,
  from: EvidenceInputs,
  job: Job,
): Promise<Evidence[P]> {
  const { inputs, study, open } = from;
  const parts = kept.get(study) ?? {};
  kept.set(study, parts);
  const openIds = open.map(({ id }) => id).join(' ');
  const known: Kept<P> | undefined = parts[part];
  if (known && known.openIds === openIds && sameReview(known.inputs, inputs)) return known.value;
  const value = await MAKERS[part](from, job);
  Object.assign(parts, { [part]: { inputs, openIds, value } });
  return value;
}

/** One part as the page is told it. */
export async function evidenceReply(
  part: EvidencePart,
  from: EvidenceInputs,
  job: Job,
): Promise<EvidenceReply> {
  const { edit } = from.inputs;
  switch (part) {
    case 'ranges':
      return { edit, part, value: await evidenceOf(part, from, job) };
    case 'opinions':
      return { edit, part, value: await evidenceOf(part, from, job) };
    case 'leads':
      return { edit, part, value: await evidenceOf(part, from, job) };
    case 'together':
      return { edit, part, value: await evidenceOf(part, from, job) };
    case 'planted':
      return { edit, part, value: await evidenceOf(part, from, job) };
  }
}

/** All parts, for a caller that can wait. */
export async function allEvidence(from: EvidenceInputs, job: Job): Promise<Evidence> {
  const made: Partial<Evidence> = {};
  for (const part of EVIDENCE_PARTS)
    Object.assign(made, { [part]: await evidenceOf(part, from, job) });
  return wholeOf(made);
}
