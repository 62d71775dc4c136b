import { removeLine } from '../numeric/detrend';
import { exp, log } from '../numeric/elementary';
import { nextPowerOfTwo } from '../numeric/fft';
import { powerDensity } from '../numeric/spectrum';
import { median } from '../numeric/statistics';
import { hannPeriodic } from '../numeric/windows';
import { type Cpm, type Hertz, hzToCpm } from '../units/rate';
import type { Seconds } from '../units/time';
import { LINE_EDGE_CPM } from './line-band';
import { type LineTrack, trackCpm } from './line-tracks';

const WINDOW_S = 240;
const STEP_S = 60;
/** Largest part of a window that may be spoiled or missing. */
const MOST_MISSING = 0.25;
/** Neighbouring bands begin where nothing of a line was taken out and are this wide. */
const BAND_CPM = 0.9;
const LOWEST_CPM = 0.45;
const HIGHEST_CPM = 15;
const FEWEST_BINS = 4;
/** A level is told from so many windows to each side, a minute apart. */
const REACH = 8;
/** Median of the logarithm of a density of two degrees of freedom lies so far below that of its mean: -log(log 2). */
const MEDIAN_LOG = 0.36651292058166435;
/** Where the slope of a lead's background is read off, and its limits. */
const SLOPE_CPM = [0.5, 9] as const;
const SLOPES = [0, 3] as const;

/** Logarithms of the densities of windows of a lead. */
export interface LevelWindows {
  readonly centresS: readonly Seconds[];
  readonly logs: readonly Float64Array[];
  readonly binCpm: Cpm;
}

/** Spectra of 240 s Hann windows a minute apart, of a lead without holes; those with over a quarter spoiled are left out. */
export function* levelWindows(
  lead: Float64Array,
  kept: Uint8Array,
  rateHz: Hertz,
): Generator<void, LevelWindows> {
  const length = Math.min(lead.length, Math.round(WINDOW_S * rateHz));
  const step = Math.max(1, Math.round(STEP_S * rateHz));
  const taper = hannPeriodic(length);
  const size = nextPowerOfTwo(4 * length);
  const binCpm = hzToCpm(rateHz / size);
  const bins = Math.min(size / 2, Math.ceil(HIGHEST_CPM / binCpm));
  const centresS: Seconds[] = [];
  const logs: Float64Array[] = [];
  for (let from = 0; from + length <= lead.length; from += step) {
    let there = 0;
    for (let i = from; i < from + length; i += 1) there += kept[i];
    if (there < (1 - MOST_MISSING) * length) continue;
    const density = powerDensity(removeLine(lead.slice(from, from + length)), taper, rateHz, size);
    centresS.push((from + length / 2) / rateHz);
    logs.push(Float64Array.from({ length: bins }, (_, k) => log(Math.max(1e-280, density[k]))));
    yield;
  }
  return { centresS, logs, binCpm };
}

/** Windows near a time, by index; those nearest where none is within reach. */
function windowsNear(centresS: readonly Seconds[], atS: Seconds): readonly number[] {
  let nearest = 0;
  centresS.forEach((one, i) => {
    if (Math.abs(one - atS) < Math.abs(centresS[nearest] - atS)) nearest = i;
  });
  const from = Math.max(0, nearest - REACH);
  const to = Math.min(centresS.length, nearest + REACH + 1);
  return Array.from({ length: to - from }, (_, i) => from + i);
}

/** Level of one neighbouring band: its logarithm and middle; null of too few values. */
function bandLevel(
  { centresS, logs, binCpm }: LevelWindows,
  near: readonly number[],
  edgesAt: (atS: Seconds) => readonly [from: Cpm, to: Cpm],
  isFree: (cpm: Cpm, atS: Seconds) => boolean,
) {
  const values: number[] = [];
  let [places, bins] = [0, 0];
  for (const w of near) {
    const [from, to] = edgesAt(centresS[w]);
    const first = Math.ceil(Math.max(LOWEST_CPM, from) / binCpm);
    const last = Math.min(logs[w].length - 1, Math.floor(to / binCpm));
    for (let k = first; k <= last; k += 1) {
      if (!isFree(k * binCpm, centresS[w])) continue;
      values.push(logs[w][k]);
      places += log(k * binCpm);
      bins += 1;
    }
  }
  if (bins < FEWEST_BINS * near.length) return null;
  return { level: median(values) + MEDIAN_LOG, place: places / bins };
}

const isFreeOf =
  (others: readonly LineTrack[]) =>
  (cpm: Cpm, atS: Seconds): boolean =>
    others.every(
      (track) =>
        atS < track.fromS - WINDOW_S / 2 ||
        atS > track.toS + WINDOW_S / 2 ||
        Math.abs(cpm - trackCpm(track, atS)) > LINE_EDGE_CPM,
    );

const limited = (slope: number) => Math.max(SLOPES[0], Math.min(SLOPES[1], slope));

/** Slope of a lead's background: a line through the logarithms from 0.5 to 9 cpm, lines left out. */
export function backgroundSlope(windows: LevelWindows, tracks: readonly LineTrack[]): number {
  const { centresS, logs, binCpm } = windows;
  const isFree = isFreeOf(tracks);
  let [count, sumX, sumY, sumXx, sumXy] = [0, 0, 0, 0, 0];
  logs.forEach((one, w) => {
    const last = Math.min(one.length - 1, Math.floor(SLOPE_CPM[1] / binCpm));
    for (let k = Math.ceil(SLOPE_CPM[0] / binCpm); k <= last; k += 1) {
      if (!isFree(k * binCpm, centresS[w])) continue;
      const x = log(k * binCpm);
      count += 1;
      sumX += x;
      sumY += one[k];
      sumXx += x * x;
      sumXy += x * one[k];
    }
  });
  const spread = count * sumXx - sumX * sumX;
  return spread > 0 ? limited(-(count * sumXy - sumX * sumY) / spread) : 0;
}

/** The background at a line: its density there and how it falls. */
export interface NeighbourLevel {
  readonly density: number;
  readonly slope: number;
}

/**
 * Level of a lead's background at a line at some time, in uV2/Hz, from the bands 1 to 1.9 cpm below and above it over some
 * 20 minutes: medians of the logarithms, joined by a straight line in log frequency; where only one of them can be read,
 * carried over by the lead's own slope. The windows are those of the lead with its lines taken out. Null of no windows.
 */
export function neighbourLevel(
  windows: LevelWindows,
  track: LineTrack,
  others: readonly LineTrack[],
  slope: number,
  atS: Seconds,
): NeighbourLevel | null {
  const near = windowsNear(windows.centresS, atS);
  if (near.length === 0) return null;
  const isFree = isFreeOf(others);
  const at = (s: Seconds) => trackCpm(track, s);
  const far = LINE_EDGE_CPM + BAND_CPM;
  const below = bandLevel(windows, near, (s) => [at(s) - far, at(s) - LINE_EDGE_CPM], isFree);
  const above = bandLevel(windows, near, (s) => [at(s) + LINE_EDGE_CPM, at(s) + far], isFree);
  const place = log(at(atS));
  if (below && above) {
    const own = (below.level - above.level) / (above.place - below.place);
    return { density: exp(below.level - own * (place - below.place)), slope: limited(own) };
  }
  const one = below ?? above;
  return one && { density: exp(one.level - slope * (place - one.place)), slope };
}
