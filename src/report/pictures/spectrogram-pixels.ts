import type { Spectrogram } from '../../recording/rhythm';
import { RAMP_STEPS } from './spectrogram-ramp';

/** Fine enough that the eye sees no steps on paper: about a seventh of a millimetre. */
const LEAST_WIDTH = 1200;
const MOST_WIDTH = 1600;
const HEIGHT = 320;

const DB_STEP = 5;
const LEAST_RANGE_DB = 20;

/**
 * Limits of the level scale, the same for the whole study: on whole fives from the level a tenth of all values lie below to
 * the one a two-hundredth lie above, at least 20 dB apart. [0, 60] without values.
 */
export function levelRange(levelDb: Float32Array): readonly [number, number] {
  const levels = levelDb.filter((level) => Number.isFinite(level)).sort();
  if (levels.length === 0) return [0, 60];
  const atShare = (share: number) => levels[Math.floor(share * (levels.length - 1))];
  const high = Math.ceil(atShare(0.995) / DB_STEP) * DB_STEP;
  const low = Math.floor(atShare(0.1) / DB_STEP) * DB_STEP;
  return [Math.min(low, high - LEAST_RANGE_DB), high];
}

/** A spectrogram as an indexed image; its columns stretch from `fromS` to `toS`. */
export interface SpectrogramPixels {
  readonly pixels: Uint8Array;
  readonly width: number;
  readonly height: number;
  readonly fromS: number;
  readonly toS: number;
}

/** The two columns a time lies between and how far it is on the way; null outside or in a gap. */
interface Between {
  readonly left: number;
  readonly right: number;
  readonly share: number;
}

/**
 * Pixels of a spectrogram, high frequency at the top: 0 is clear, 1 to RAMP_STEPS run over `rangeDb`. Levels are drawn smooth
 * between the centres of columns and of bins; a column stands for half a step on both sides of its centre, and beside one that
 * is not kept nothing is mixed in. Null where there are no columns.
 */
export function spectrogramPixels(
  { centresS, firstCpm, stepCpm, binCount, levelDb }: Spectrogram,
  stepS: number,
  [lowCpm, highCpm]: readonly [number, number],
  [lowDb, highDb]: readonly [number, number],
): SpectrogramPixels | null {
  const columns = centresS.length;
  if (columns === 0 || binCount === 0) return null;
  const fromS = centresS[0] - stepS / 2;
  const toS = centresS[columns - 1] + stepS / 2;
  const width = Math.min(MOST_WIDTH, Math.max(LEAST_WIDTH, columns));
  const pixels = new Uint8Array(width * HEIGHT);
  const place = columnPlaces(centresS, stepS);
  for (let x = 0; x < width; x += 1) {
    const between = place(fromS + ((x + 0.5) / width) * (toS - fromS));
    if (!between) continue;
    for (let y = 0; y < HEIGHT; y += 1) {
      const cpm = highCpm - ((y + 0.5) / HEIGHT) * (highCpm - lowCpm);
      const bin = Math.min(binCount - 1, Math.max(0, (cpm - firstCpm) / stepCpm));
      const level = levelBetween(levelDb, binCount, between, bin);
      pixels[y * width + x] = stepOf((level - lowDb) / (highDb - lowDb));
    }
  }
  return { pixels, width, height: HEIGHT, fromS, toS };
}

const stepOf = (share: number): number =>
  Number.isFinite(share)
    ? 1 + Math.min(RAMP_STEPS - 1, Math.max(0, Math.round(share * (RAMP_STEPS - 1))))
    : 0;

/** Finds columns for times that grow from call to call. */
function columnPlaces(centresS: Float64Array, stepS: number): (timeS: number) => Between | null {
  let left = 0;
  return (timeS) => {
    while (left + 1 < centresS.length && centresS[left + 1] <= timeS) left += 1;
    const right = Math.min(left + 1, centresS.length - 1);
    const before = timeS - centresS[left];
    const apartS = centresS[right] - centresS[left];
    if (before >= 0 && apartS > 0 && apartS <= 1.5 * stepS)
      return { left, right, share: before / apartS };
    const [nearest] = [left, right].sort(
      (a, b) => distance(centresS[a], timeS) - distance(centresS[b], timeS),
    );
    return distance(centresS[nearest], timeS) <= stepS / 2
      ? { left: nearest, right: nearest, share: 0 }
      : null;
  };
}

const distance = (a: number, b: number): number => Math.abs(a - b);

function levelBetween(
  levelDb: Float32Array,
  binCount: number,
  { left, right, share }: Between,
  bin: number,
): number {
  const low = Math.floor(bin);
  const high = Math.min(low + 1, binCount - 1);
  const inColumn = (column: number) => {
    const below = levelDb[column * binCount + low];
    return below + (levelDb[column * binCount + high] - below) * (bin - low);
  };
  const [before, after] = [inColumn(left), inColumn(right)];
  if (Number.isFinite(before) && Number.isFinite(after)) return before + (after - before) * share;
  return share < 0.5 ? before : after;
}
