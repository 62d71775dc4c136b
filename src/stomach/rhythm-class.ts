import type { Epoch } from '../recording/rhythm';
import type { RhythmBands } from '../recording/settings';
import type { Cpm } from '../units/rate';

/** Rhythm of a dominant frequency by half-open bands; `none` outside the search band [low, high). */
export function rhythmOf(dfCpm: Cpm, bands: RhythmBands): 'brady' | 'normo' | 'tachy' | 'none' {
  if (!(dfCpm >= bands.lowCpm && dfCpm < bands.highCpm)) return 'none';
  if (dfCpm < bands.normoLowCpm) return 'brady';
  return dfCpm < bands.normoHighCpm ? 'normo' : 'tachy';
}

/** An epoch has a rhythm where DF is of one band: neither none, mixed nor undecided. */
export const hasRhythm = ({ rhythm }: Pick<Epoch, 'rhythm'>): boolean =>
  rhythm === 'brady' || rhythm === 'normo' || rhythm === 'tachy';
