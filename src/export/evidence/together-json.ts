import type { TogetherEvidence } from '../../recording/evidence/together';

/** The part `together` of findings.json. */
export const togetherJson = (value: TogetherEvidence): unknown => value;
