import type { Phase } from '../recording/phase';
import type { Settings } from '../recording/settings';
import type { Seconds } from '../units/time';

const ROUNDING_S = 1e-6;

/**
 * Start times of the epochs of a phase: from its start on, one every step, each wholly inside.
 * 30 min hold 27 epochs of 240 s every 60 s. Throws where length or step is not above 0.
 */
export function epochStarts(
  phase: Pick<Phase, 'fromS' | 'toS'>,
  epoch: Pick<Settings['epoch'], 'lengthS' | 'stepS'>,
): readonly Seconds[] {
  const { lengthS, stepS } = epoch;
  if (!(lengthS > 0 && stepS > 0))
    throw new Error(`epochs of ${lengthS} s every ${stepS} s cannot be laid`);
  const room = phase.toS - phase.fromS - lengthS;
  if (!(room >= -ROUNDING_S)) return [];
  const count = Math.floor((room + ROUNDING_S) / stepS) + 1;
  return Array.from({ length: count }, (_, k) => phase.fromS + k * stepS);
}
