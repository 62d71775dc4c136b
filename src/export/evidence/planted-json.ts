import type { PlantedEvidence } from '../../recording/evidence/planted';

/** The part `planted` of findings.json. */
export const plantedJson = (value: PlantedEvidence): unknown => value;
