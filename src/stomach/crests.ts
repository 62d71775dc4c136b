import type { Interval } from '../recording/span';
import { type Cpm, cpmToHz, type Hertz } from '../units/rate';

/** A crest stands at least this many local rms above the troughs on both sides. */
const HEIGHT_RMS = 0.5;
/** The local rms is that of this many seconds on either side. */
const RMS_HALF_S = 60;

export interface CrestOptions {
  readonly rateHz: Hertz;
  /** Upper limit of the band: two crests are at least half its period apart. */
  readonly highCpm: Cpm;
  /** Stretches without crests. */
  readonly unclean: readonly Interval[];
}

/** Root mean square of what is there within half a window on either side of every sample. */
function localRms(x: Float64Array, half: number): Float64Array {
  const squares = new Float64Array(x.length + 1);
  const counts = new Float64Array(x.length + 1);
  for (let i = 0; i < x.length; i++) {
    const there = !Number.isNaN(x[i]);
    squares[i + 1] = squares[i] + (there ? x[i] * x[i] : 0);
    counts[i + 1] = counts[i] + (there ? 1 : 0);
  }
  return x.map((_, i) => {
    const from = Math.max(0, i - half);
    const to = Math.min(x.length, i + half + 1);
    const count = counts[to] - counts[from];
    return count > 0 ? Math.sqrt(Math.max(0, squares[to] - squares[from]) / count) : 0;
  });
}

/** Indices of the crests of one stretch without gaps: turning points with hysteresis `height[i]`. */
function turningPoints(x: Float64Array, height: Float64Array, from: number, to: number): number[] {
  const crests: number[] = [];
  let rising = false;
  let extreme = from;
  for (let i = from; i < to; i++) {
    if (rising) {
      if (x[i] > x[extreme]) extreme = i;
      else if (x[extreme] - x[i] >= height[i] && height[i] > 0) {
        crests.push(extreme);
        rising = false;
        extreme = i;
      }
    } else if (x[i] < x[extreme]) extreme = i;
    else if (x[i] - x[extreme] >= height[i] && height[i] > 0) {
      rising = true;
      extreme = i;
    }
  }
  return crests;
}

/** Top of the parabola through three samples, in samples from the middle one. */
function topOffset(left: number, middle: number, right: number): number {
  const bend = left - 2 * middle + right;
  return bend < 0 ? Math.max(-0.5, Math.min(0.5, (0.5 * (left - right)) / bend)) : 0;
}

/** Of crests closer than the least distance only the higher stays. */
function apart(x: Float64Array, crests: readonly number[], least: number): number[] {
  const kept: number[] = [];
  for (const crest of crests) {
    const last = kept.at(-1);
    if (last === undefined || crest - last >= least) kept.push(crest);
    else if (x[crest] > x[last]) kept[kept.length - 1] = crest;
  }
  return kept;
}

/** Stretches [from, to) of samples that are numbers and lie in no unclean interval. */
function cleanRuns(x: Float64Array, options: CrestOptions): [from: number, to: number][] {
  const clean = new Uint8Array(x.length + 1);
  for (let i = 0; i < x.length; i++) clean[i] = Number.isNaN(x[i]) ? 0 : 1;
  for (const { fromS, toS } of options.unclean) {
    const first = Math.max(0, Math.ceil(fromS * options.rateHz));
    clean.fill(0, Math.min(first, x.length), Math.min(x.length, Math.ceil(toS * options.rateHz)));
  }
  const runs: [number, number][] = [];
  let from = -1;
  for (let i = 0; i <= x.length; i++) {
    if (clean[i] === 1 && from < 0) from = i;
    if (clean[i] === 0 && from >= 0) {
      runs.push([from, i]);
      from = -1;
    }
  }
  return runs;
}

/**
 * Times in seconds of the crests of a drawn slow wave: tops that stand half a local rms above the
 * troughs on both sides, at least half a period of the band's upper limit apart, refined by a
 * parabola. None in gaps or unclean stretches. Their count is a check by eye on DF, no figure.
 */
export function crestTimes(slowWave: Float64Array, options: CrestOptions): Float64Array {
  const { rateHz, highCpm } = options;
  const height = localRms(slowWave, Math.round(RMS_HALF_S * rateHz)).map((rms) => HEIGHT_RMS * rms);
  const least = (0.5 * rateHz) / cpmToHz(highCpm);
  const times: number[] = [];
  for (const [from, to] of cleanRuns(slowWave, options)) {
    for (const i of apart(slowWave, turningPoints(slowWave, height, from, to), least)) {
      const inside = i > from && i < to - 1;
      const offset = inside ? topOffset(slowWave[i - 1], slowWave[i], slowWave[i + 1]) : 0;
      times.push((i + offset) / rateHz);
    }
  }
  return Float64Array.from(times);
}
