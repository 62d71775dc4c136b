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
const STEPS_PER_WIDTH = 256;

/** exp(-x2/2) for x from 0 to REACH and a step beyond. */
function gaussianTable(): Float64Array {
  const table = new Float64Array(REACH * STEPS_PER_WIDTH + 2);
  for (let i = 0; i < table.length; i += 1) table[i] = exp(-((i / STEPS_PER_WIDTH) ** 2) / 2);
  return table;
}

/** Adds one wave to a lead, read from the table by straight lines (within 2e-6 of its height). */
function addWave(
  signal: Float64Array,
  table: Float64Array,
  centre: number,
  width: number,
  gain: number,
): void {
  const from = Math.max(0, Math.ceil(centre - REACH * width));
  const to = Math.min(signal.length, Math.floor(centre + REACH * width) + 1);
  const scale = STEPS_PER_WIDTH / width;
  for (let n = from; n < to; n += 1) {
    const place = Math.abs(n - centre) * scale;
    const index = Math.floor(place);
    const low = table[index];
    signal[n] += gain * (low + (table[index + 1] - low) * (place - index));
  }
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
  for (const { timeS, beatClass, rrS } of beats) {
    const point = Math.min(grid.points - 1, Math.round(timeS / grid.stepS));
    const height = 1 + (movement === null ? 0 : heart.respiratoryHeight * movement[point]);
    for (const wave of wavesOf(beatClass, rrS, heart.tWave))
      for (let k = 0; k < leads.length; k += 1) {
        const angle = ((leads[k].heartAxisDeg - wave.angleDeg) * Math.PI) / 180;
        const gain = height * leads[k].heartUv * wave.size * cos(angle);
        addWave(signals[k], table, (timeS + wave.atS) * rateHz, wave.widthS * rateHz, gain);
      }
  }
}
