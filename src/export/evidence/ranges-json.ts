import type { RangesEvidence } from '../../recording/evidence/ranges';

/** The part `ranges` of findings.json. */
export const rangesJson = (value: RangesEvidence): unknown => value;
