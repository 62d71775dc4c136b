import type { LeadsEvidence } from './leads';
import type { OpinionsEvidence } from './opinions';
import type { PlantedEvidence } from './planted';
import type { RangesEvidence } from './ranges';
import type { TogetherEvidence } from './together';

/** How far the figures of a review can be believed, by part. Each part is computed by itself, after the figures. */
export interface Evidence {
  /** How far each figure could be from the truth. */
  readonly ranges: RangesEvidence;
  /** What other methods say. */
  readonly opinions: OpinionsEvidence;
  /** What several leads say of each other. */
  readonly leads: LeadsEvidence;
  /** Stomach and heart over the same minutes. */
  readonly together: TogetherEvidence;
  /** Known waves and heartbeats planted in this recording, and what came back. */
  readonly planted: PlantedEvidence;
}

export type EvidencePart = keyof Evidence;

/** The parts in the order they are computed and shown. */
export const EVIDENCE_PARTS = [
  'ranges',
  'opinions',
  'leads',
  'together',
  'planted',
] as const satisfies readonly EvidencePart[];

/** The evidence from its parts. Throws Error where one is missing. */
export function wholeOf(parts: Partial<Evidence>): Evidence {
  const { ranges, opinions, leads, together, planted } = parts;
  if (!ranges || !opinions || !leads || !together || !planted)
    throw new Error('a part of the evidence is missing');
  return { ranges, opinions, leads, together, planted };
}
