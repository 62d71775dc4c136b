import type { BeatClass } from '../recording/beat';
import type { Hertz } from '../units/rate';
import { align, TIMING_HALF_S, type Timer, timerOf } from './align';
import { rmsAboutLine } from './beat-quality';
import type { AverageBeat } from './detect';
import type { Samples } from './usable-signal';

/** How far from its tick a beat is looked for. */
const SEARCH_S = 0.06;
const MARGIN = 8;
/** The heart is electrically quiet about so long before a beat, ahead of its P wave. */
const QUIET_BEFORE_S = 0.3;
const QUIET_HALF_S = 0.05;

/** How one place of the heartbeat looks beside the study's average beats. */
export interface BeatLook {
  /** Normalised correlation with each average at its best alignment, -1 to 1; NaN where samples are missing. */
  readonly likeness: Float64Array;
  /** The same with the main average upside down. */
  readonly turned: number;
  /** Size beside the average it is most like. */
  readonly size: number;
  /** Index of the average it is most like; -1 where there is none. */
  readonly best: number;
  /** Tick at which that average puts the beat. */
  readonly bestTick: number;
  /** Standard deviation of the signal ahead of the beat, uV. */
  readonly noiseUv: number;
}

export interface LookingAt {
  readonly heartbeat: Samples;
  readonly heartbeatHz: Hertz;
  readonly ticksPerSample: number;
  readonly averages: readonly AverageBeat[];
}

interface Ruler {
  readonly timer: Timer;
  /** From the middle of the timer to the beat's own point, in samples. */
  readonly offset: number;
}

/** Looks at places of one heartbeat signal; each is looked at once. */
export function createBeatLooks({
  heartbeat,
  heartbeatHz,
  ticksPerSample,
  averages,
}: LookingAt): (tick: number) => BeatLook {
  const half = Math.round(TIMING_HALF_S * heartbeatHz);
  const search = Math.max(2, Math.round(SEARCH_S * heartbeatHz));
  const reach = half + search + MARGIN;
  const rulers = averages.map(({ samples, centre }): Ruler => {
    const middle = Math.round(centre);
    const row = Float64Array.from(samples.subarray(middle - half, middle + half + 1));
    return { timer: timerOf(row), offset: centre - middle };
  });
  const upsideDown = rulers.length > 0 ? turnedOver(rulers[0].timer) : null;
  const known = new Map<number, BeatLook>();

  function look(tick: number): BeatLook {
    const centre = Math.round(tick / ticksPerSample);
    const row = Float64Array.from(
      { length: 2 * reach + 1 },
      (_, i) => heartbeat[centre - reach + i] ?? Number.NaN,
    );
    const fits = rulers.map(({ timer }) => align(row, timer, reach, search));
    let best = -1;
    fits.forEach(({ likeness }, k) => {
      if (likeness > (fits[best]?.likeness ?? -2)) best = k;
    });
    const shift = best < 0 ? 0 : fits[best].place - reach + rulers[best].offset;
    return {
      likeness: Float64Array.from(fits, (fit) => fit.likeness),
      turned: upsideDown ? align(row, upsideDown, reach, search).likeness : Number.NaN,
      size: fits[best]?.size ?? Number.NaN,
      best,
      bestTick: Math.round((centre + shift) * ticksPerSample),
      noiseUv: noiseAhead(heartbeat, centre, heartbeatHz),
    };
  }

  return (tick) => {
    const before = known.get(tick);
    if (before) return before;
    const made = look(tick);
    known.set(tick, made);
    return made;
  };
}

const turnedOver = (timer: Timer): Timer => ({
  ...timer,
  weights: timer.weights.map((value) => -value),
});

function noiseAhead(heartbeat: Samples, centre: number, rateHz: Hertz): number {
  const half = Math.round(QUIET_HALF_S * rateHz);
  const at = centre - Math.round(QUIET_BEFORE_S * rateHz);
  if (at - half < 0) return Number.NaN;
  return rmsAboutLine(Float64Array.from(heartbeat.subarray(at - half, at + half + 1)));
}

/** The greatest likeness to an average of some classes; NaN where there is none of them. */
export function likenessTo(
  { likeness }: BeatLook,
  averages: readonly AverageBeat[],
  classes: readonly BeatClass[],
): number {
  let most = Number.NaN;
  averages.forEach(({ beatClass }, k) => {
    if (classes.includes(beatClass) && !(likeness[k] <= most)) most = likeness[k];
  });
  return most;
}
