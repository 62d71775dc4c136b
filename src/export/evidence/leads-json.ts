import type { LeadsEvidence } from '../../recording/evidence/leads';

/** The part `leads` of findings.json. */
export const leadsJson = (value: LeadsEvidence): unknown => value;
