import type { Epoch, Rhythm } from '../recording/rhythm';
import type { RhythmBands } from '../recording/settings';
import type { Cpm } from '../units/rate';
import type { Seconds } from '../units/time';

/** A wave counts as found where DF lies within this of its rate. */
const NEAR_CPM = 0.5;

/** One epoch of a lead with a planted wave. */
export interface PlantedEpoch {
  readonly centreS: Seconds;
  readonly right: boolean;
  /** Error of DF, and of DP against that of the planted wave alone; null unless right. */
  readonly dfErrorCpm: number | null;
  readonly dpErrorDb: number | null;
}

const bandOf = (cpm: Cpm, bands: RhythmBands): Rhythm =>
  cpm < bands.normoLowCpm ? 'brady' : cpm < bands.normoHighCpm ? 'normo' : 'tachy';

/** The rhythms that may be given to an epoch in which a wave passes from one rate to another. */
function expectedRhythms(from: Cpm, to: Cpm, bands: RhythmBands): readonly Rhythm[] {
  const both = [bandOf(from, bands), bandOf(to, bands)];
  return both[0] === both[1] ? [both[0]] : [...both, 'mixed'];
}

/**
 * What became of a planted wave in one epoch. `cpmAt` is the wave's rate, `dpDb` the dominant power that it alone would have
 * there. Right is an epoch with the rhythm of the wave and DF within 0.5 cpm of it; where the wave passes a limit in the
 * middle half of the epoch, either rhythm or `mixed`.
 */
export function plantedEpoch(
  epoch: Epoch,
  cpmAt: (atS: Seconds) => Cpm,
  dpDb: number,
  bands: RhythmBands,
): PlantedEpoch {
  const { fromS, toS, rhythm, dfCpm } = epoch;
  const centreS = (fromS + toS) / 2;
  const quarterS = (toS - fromS) / 4;
  const expected = expectedRhythms(cpmAt(centreS - quarterS), cpmAt(centreS + quarterS), bands);
  const apart = dfCpm === null ? Number.POSITIVE_INFINITY : Math.abs(dfCpm - cpmAt(centreS));
  const right = rhythm !== null && expected.includes(rhythm) && apart <= NEAR_CPM;
  return {
    centreS,
    right,
    dfErrorCpm: right ? apart : null,
    dpErrorDb: right && epoch.dpDb !== null ? epoch.dpDb - dpDb : null,
  };
}
