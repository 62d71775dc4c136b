import type { Random } from '../numeric/random';
import type { BeatClass } from '../recording/beat';
import type { Seconds } from '../units/time';
import type { CoarseGrid } from './coarse-grid';
import { sineOf } from './slow-sources';
import { type HeartSpec, trackAt } from './spec';

/** A beat of known time: the centre of its R wave. */
export interface TrueBeat {
  readonly timeS: Seconds;
  readonly beatClass: BeatClass;
  /** The interval that the rhythm asked for at this beat; sets the place of the T wave. */
  readonly rrS: Seconds;
}

const LOW_FREQUENCY_HZ = 0.1;
const V_COUPLING = 0.62;
const S_COUPLING = 0.7;
/** Beats of class N between two early ones, at least. */
const APART = 5;
const SHORTEST_S = 0.3;

/**
 * Beats from the start to the end of the grid. RR = 60 / rate + breathing + a wave near 0.1 Hz + jitter; a V beat comes early
 * and the next N beat where it would have come anyway (compensatory pause); after an early S beat the rhythm starts anew.
 * `movement` is the breathing movement on the grid, or null.
 */
export function beatTimes(
  spec: HeartSpec,
  grid: CoarseGrid,
  movement: Float64Array | null,
  random: Random,
): readonly TrueBeat[] {
  const endS = (grid.points - 1) * grid.stepS;
  const beats: TrueBeat[] = [];
  const startCycle = random.uniform();
  const interval = (timeS: Seconds): Seconds => {
    const point = Math.min(grid.points - 1, Math.round(timeS / grid.stepS));
    const breath = movement === null ? 0 : movement[point];
    const ms =
      trackAt(spec.respiratoryMs, timeS) * breath +
      trackAt(spec.lowFrequencyMs, timeS) * sineOf(LOW_FREQUENCY_HZ * timeS + startCycle) +
      spec.jitterMs * random.gaussian();
    return Math.max(SHORTEST_S, 60 / trackAt(spec.rateBpm, timeS) + ms / 1000);
  };
  let sinceEarly = 0;
  let timeS = 0.2 + 0.6 * random.uniform();
  while (timeS < endS) {
    const rrS = interval(timeS);
    beats.push({ timeS, beatClass: 'N', rrS });
    sinceEarly += 1;
    const early = sinceEarly > APART ? random.uniform() * 3600 : Number.POSITIVE_INFINITY;
    const vShare = spec.ventricularPerHour * rrS;
    if (early < vShare) {
      beats.push({ timeS: timeS + V_COUPLING * rrS, beatClass: 'V', rrS });
      timeS += 2 * rrS;
      sinceEarly = 0;
    } else if (early < vShare + spec.supraventricularPerHour * rrS) {
      beats.push({ timeS: timeS + S_COUPLING * rrS, beatClass: 'S', rrS });
      timeS += S_COUPLING * rrS + 1.05 * rrS;
      sinceEarly = 0;
    } else timeS += rrS;
  }
  return beats.filter((beat) => beat.timeS < endS);
}
