import { median } from '../numeric/statistics';
import type { SlowWaveRhythm } from '../recording/rhythm';
import type { Cpm } from '../units/rate';
import { hasRhythm } from './rhythm-class';

/** The stomach's usual rhythm, for a lead that has none of its own. */
const USUAL_CPM = 3;

/** Median DF of a lead over its epochs with a rhythm; 3 cpm where none has one. */
export function usualCpm({ epochs }: Pick<SlowWaveRhythm, 'epochs'>): Cpm {
  const dfCpm = epochs.filter(hasRhythm).flatMap((epoch) => epoch.dfCpm ?? []);
  return dfCpm.length > 0 ? median(dfCpm) : USUAL_CPM;
}
