import { cos, exp } from '../numeric/elementary';
import type { BeatClass } from '../recording/beat';
import type { Hertz } from '../units/rate';
import type { TrueBeat } from './beat-times';
import type { CoarseGrid } from './coarse-grid';
import type { HeartSpec, LeadSpec } from './spec';

/** One wave of a beat: a Gaussian in time, seen by a lead as the cosine of the angle between them. */
interface Wave {
  readonly atS: number;
  readonly widthS: number;
  /** Size relative to the R wave of class N. */
  readonly size: number;
  /** Angle to the R wave of class N. */
  readonly angleDeg: number;
}

/** Delay of the T wave after R at an RR interval of 1 s; it goes with the root of RR (after Bazett 1920). */
const T_AT_S = 0.28;

/** Sum-of-Gaussians shapes (the idea: McSharry et al. 2003, IEEE Trans Biomed Eng 50:289); the numbers are invented. */
function wavesOf(beatClass: BeatClass, rrS: number, tWave: number): readonly Wave[] {
  const tAt = T_AT_S * Math.sqrt(rrS);
  if (beatClass === 'V')
    return [
      { atS: 0, widthS: 0.03, size: 1.5, angleDeg: 35 },
      { atS: 0.075, widthS: 0.032, size: -0.7, angleDeg: 10 },
      { atS: tAt + 0.06, widthS: 0.06, size: -1.9 * tWave, angleDeg: 20 },
    ];
  const atrial = beatClass === 'S' ? { size: -0.08, atS: -0.12 } : { size: 0.08, atS: -0.16 };
  return [
    { ...atrial, widthS: 0.022, angleDeg: 15 },
    { atS: -0.026, widthS: 0.008, size: -0.12, angleDeg: -20 },
    { atS: 0, widthS: 0.011, size: 1, angleDeg: 0 },
    { atS: 0.028, widthS: 0.01, size: -0.24, angleDeg: 30 },
    { atS: tAt, widthS: 0.045, size: tWave, angleDeg: -15 },
  ];
}

const REACH = 4;
/** Width of the widest wave above. */
const WIDEST_S = 0.06;
const STEPS_PER_WIDTH = 256;

/** exp(-x2/2) for x from 0 to REACH and a step beyond. */
function gaussianTable(): Float64Array {
  const table = new Float64Array(REACH * STEPS_PER_WIDTH + 2);
  for (let i = 0; i < table.length; i += 1) table[i] = exp(-((i / STEPS_PER_WIDTH) ** 2) / 2);
  return table;
}

/** A Gaussian on the sample grid: `shape[i]` belongs to sample `from + i`, for i below `length`. */
interface SampledWave {
  from: number;
  length: number;
  readonly shape: Float64Array;
}

/** Reads a Gaussian of centre and width in samples from the table by straight lines (within 2e-6 of its height). */
function sampleWave(wave: SampledWave, table: Float64Array, centre: number, width: number): void {
  const scale = STEPS_PER_WIDTH / width;
  wave.from = Math.ceil(centre - REACH * width);
  wave.length = Math.floor(centre + REACH * width) + 1 - wave.from;
  for (let i = 0; i < wave.length; i += 1) {
    const place = Math.abs(wave.from + i - centre) * scale;
    const index = Math.floor(place);
    const low = table[index];
    wave.shape[i] = low + (table[index + 1] - low) * (place - index);
  }
}

function addWave(signal: Float64Array, wave: SampledWave, gain: number): void {
  const { from, shape } = wave;
  const to = Math.min(wave.length, signal.length - from);
  for (let i = Math.max(0, -from); i < to; i += 1) signal[from + i] += gain * shape[i];
}

/** Adds all beats to the samples of all leads. `movement` is breathing on the grid, which changes the height, or null. */
export function addBeats(
  signals: readonly Float64Array[],
  leads: readonly LeadSpec[],
  beats: readonly TrueBeat[],
  context: {
    readonly heart: HeartSpec;
    readonly rateHz: Hertz;
    readonly grid: CoarseGrid;
    readonly movement: Float64Array | null;
  },
): void {
  const { heart, rateHz, grid, movement } = context;
  const table = gaussianTable();
  const longest = Math.ceil(2 * REACH * WIDEST_S * rateHz) + 2;
  const sampled: SampledWave = { from: 0, length: 0, shape: new Float64Array(longest) };
  for (const { timeS, beatClass, rrS } of beats) {
    const point = Math.min(grid.points - 1, Math.round(timeS / grid.stepS));
    const height = 1 + (movement === null ? 0 : heart.respiratoryHeight * movement[point]);
    for (const wave of wavesOf(beatClass, rrS, heart.tWave)) {
      sampleWave(sampled, table, (timeS + wave.atS) * rateHz, wave.widthS * rateHz);
      for (let k = 0; k < leads.length; k += 1) {
        const angle = ((leads[k].heartAxisDeg - wave.angleDeg) * Math.PI) / 180;
        addWave(signals[k], sampled, height * leads[k].heartUv * wave.size * cos(angle));
      }
    }
  }
}
