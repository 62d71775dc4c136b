import type { TogetherEvidence } from '../src/recording/evidence/together';
import type { Job } from './job';
import type { EvidenceInputs } from './pipeline-evidence';

/** Placeholder, to be filled before it reaches main. */
export async function togetherOf(_from: EvidenceInputs, job: Job): Promise<TogetherEvidence> {
  await job.breathe();
  return { lines: [] };
}
