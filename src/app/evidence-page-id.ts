import type { EvidencePart } from '../recording/evidence/evidence';

/** Pages of the evidence dialog. */
export type EvidencePageId = EvidencePart | 'settings-map' | 'self-check';
