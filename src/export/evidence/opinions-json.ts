import type { OpinionsEvidence } from '../../recording/evidence/opinions';

/** The part `opinions` of findings.json. */
export const opinionsJson = (value: OpinionsEvidence): unknown => value;
