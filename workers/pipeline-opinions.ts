import type { OpinionsEvidence } from '../src/recording/evidence/opinions';
import type { Job } from './job';
import type { EvidenceInputs } from './pipeline-evidence';

/** Placeholder, to be filled before it reaches main. */
export async function opinionsOf(_from: EvidenceInputs, job: Job): Promise<OpinionsEvidence> {
  await job.breathe();
  return { lines: [] };
}
