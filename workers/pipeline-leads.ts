import type { LeadsEvidence } from '../src/recording/evidence/leads';
import type { Job } from './job';
import type { EvidenceInputs } from './pipeline-evidence';

/** Placeholder, to be filled before it reaches main. */
export async function leadsOf(_from: EvidenceInputs, job: Job): Promise<LeadsEvidence> {
  await job.breathe();
  return { lines: [] };
}
