import type { PlantedEvidence } from '../src/recording/evidence/planted';
import type { Job } from './job';
import type { EvidenceInputs } from './pipeline-evidence';

/** Placeholder, to be filled before it reaches main. */
export async function plantedOf(_from: EvidenceInputs, job: Job): Promise<PlantedEvidence> {
  await job.breathe();
  return { lines: [] };
}
