import { exp, log } from '../numeric/elementary';
import { besselI0 } from '../numeric/special';
import type { Cpm } from '../units/rate';
import type { SpectrumPeak } from './dominant-peak';
import type { WindowRow } from './window-row';

/** Powers a wave may have over the background, at its peak of one window. Stronger ones are found alone. */
const POWERS = [3.5, 7, 14, 28];
/** From window to window a wave wanders (standard deviation), and where it is looked for in each. */
const WANDER_CPM = 0.1;
const OFFSETS_CPM = [-0.2, -0.1, 0, 0.1, 0.2];
/** How often a wave goes on from one window to the next, and comes back from a pause. */
const STAYS = 0.9;
const RETURNS = 0.7;
const USUALLY_THERE = RETURNS / (1 - STAYS + RETURNS);
/** The argument of I0 beyond which a window proves no more. */
const MOST_PROOF = 60;

/** Likelihood of a height over the background with a wave of a power over it, against that of noise alone (Rice 1944). */
export const likelihoodRatio = (power: number, height: number): number =>
  exp(-power) * besselI0(Math.min(MOST_PROOF, 2 * Math.sqrt(power * height)));

const WEIGHTS = OFFSETS_CPM.map((cpm) => exp(-0.5 * (cpm / WANDER_CPM) ** 2));
const ALL_WEIGHTS = WEIGHTS.reduce((sum, weight) => sum + weight, 0);

/** What a row says of a wave at the place of one of the epoch's peaks. */
interface WaveEvidence {
  /** Log likelihood of the row with the wave in the epoch over that of no wave in any window. */
  readonly there: number;
  /** Log odds that the wave is in the epoch, given that it is in the row. */
  readonly here: number;
}

/** Heights of a window over the background of the row, about a place. */
interface Heights {
  readonly place: number;
  readonly heights: readonly number[];
}

function heightsOf({ windows, binCpm }: WindowRow, cpm: Cpm, level: number): readonly Heights[] {
  const per = exp(-level);
  const bins = OFFSETS_CPM.map((offset) => Math.round((cpm + offset) / binCpm));
  return windows
    .filter(({ place }) => place !== 0)
    .map(({ place, over }) => ({ place, heights: bins.map((bin) => per * over.times[bin]) }));
}

/** Likelihood ratio of each window beside the epoch for each power, by place. */
function ratiosOf(beside: readonly Heights[]): ReadonlyMap<number, readonly number[]> {
  return new Map(
    beside.map(({ place, heights }) => [
      place,
      POWERS.map(
        (power) =>
          heights.reduce((sum, height, i) => sum + WEIGHTS[i] * likelihoodRatio(power, height), 0) /
          ALL_WEIGHTS,
      ),
    ]),
  );
}

/** No power makes the log likelihood ratio of a height more than the height less this, nor of a lower one more than 0. */
const LOSS_AT_BEST = 1.8;

/** True where the windows cannot reach the evidence asked for, whatever the power: most places of noise. */
function isHopeless(own: number, beside: readonly Heights[], asked: number): boolean {
  let most = Math.max(0, own - LOSS_AT_BEST);
  for (const { heights } of beside) most += Math.max(0, Math.max(...heights) - LOSS_AT_BEST);
  return most < asked;
}

/** Likelihood of the windows on one side, `step` apart, where the wave is there and where it pauses in the epoch. */
function sideLikelihood(
  ratios: ReadonlyMap<number, readonly number[]>,
  step: 1 | -1,
  power: number,
): readonly [there: number, pausing: number] {
  const far = Math.max(0, ...[...ratios.keys()].map((place) => step * place));
  let [there, pausing] = [1, 1];
  for (let away = far; away >= 1; away -= 1) {
    const seen = (ratios.get(step * away)?.[power] ?? 1) * there;
    [there, pausing] = [
      STAYS * seen + (1 - STAYS) * pausing,
      RETURNS * seen + (1 - RETURNS) * pausing,
    ];
  }
  return [there, pausing];
}

/**
 * Evidence for a wave that gave the epoch's own peak its height and the windows beside it theirs: a
 * wave of one unknown power that goes on from window to window, pauses and comes back (a hidden
 * Markov chain of two states), each window's height being Rice's.
 */
function waveEvidence(own: number, beside: readonly Heights[]): WaveEvidence {
  const ratios = ratiosOf(beside);
  let [there, pausing] = [0, 0];
  POWERS.forEach((power, i) => {
    const before = sideLikelihood(ratios, -1, i);
    const after = sideLikelihood(ratios, 1, i);
    const seen = likelihoodRatio(power, own);
    there += (USUALLY_THERE * before[0] * after[0] * seen) / POWERS.length;
    pausing += ((1 - USUALLY_THERE) * before[1] * after[1]) / POWERS.length;
  });
  return { there: log(there), here: log(there / pausing) };
}

/** Evidence asked for at a false-alarm rate of 5 %; the highest of the peaks of noise passes it in about 1 % of epochs. */
const ASKED = { there: 3.5, falseAlarm: 0.05 };

/**
 * The peak of an epoch for which the row has the most evidence, where that is enough at the
 * false-alarm rate and the wave is rather in the epoch than pausing; else null.
 */
export function steadyPeak(
  row: WindowRow,
  density: Float64Array,
  peaks: readonly SpectrumPeak[],
  falseAlarm: number,
): SpectrumPeak | null {
  const own = row.windows.find(({ place }) => place === 0);
  if (!own) return null;
  let most = ASKED.there - log(falseAlarm / ASKED.falseAlarm);
  let found: SpectrumPeak | null = null;
  for (const peak of peaks) {
    const level = row.levelAt(peak.cpm);
    const height = (exp(-level) * own.over.times[peak.bin] * peak.density) / density[peak.bin];
    const beside = heightsOf(row, peak.cpm, level);
    if (isHopeless(height, beside, most)) continue;
    const { there, here } = waveEvidence(height, beside);
    if (here <= 0 || there <= most) continue;
    most = there;
    found = peak;
  }
  return found;
}
