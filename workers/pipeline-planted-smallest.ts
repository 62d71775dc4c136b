import { median } from '../src/numeric/statistics';
import type { SmallestWave } from '../src/recording/evidence/planted';
import type { SeparatedSlow } from '../src/separate/route';
import { plantedEpoch } from '../src/trust/planted-epochs';
import { PLANTED_CPM } from '../src/trust/planted-wave';
import { LARGEST_UV, smallestWave, twoDigits } from '../src/trust/smallest-wave';
import type { Job } from './job';
import {
  drawAndJudge,
  type Judged,
  judge,
  lobePower,
  plantedRates,
  plus,
  type SlowCheck,
  some,
} from './pipeline-planted-judge';

/** Epochs that the first guess is read from, at most. */
const MOST_EPOCHS = 200;

/** Between the leftover alone and with a full wave: what a route that is linear makes of a part of that wave. */
function partly(alone: SeparatedSlow, full: SeparatedSlow, share: number): SeparatedSlow {
  const mixed = (a: Float64Array, b: Float64Array) => a.map((one, i) => one + share * (b[i] - one));
  return {
    ...alone,
    slowWave: mixed(alone.slowWave, full.slowWave),
    forSpectra: mixed(alone.forSpectra, full.forSpectra),
  };
}

/** The smallest wave of each steady rate that would have been found, given the leftover alone. */
export async function smallestWaves(
  check: SlowCheck,
  alone: Judged,
  job: Job,
): Promise<readonly SmallestWave[]> {
  const noise = lobePower(check, check.leftover.lead);
  const { rhythmBands } = check.lead.settings;
  const kept = alone.judged.epochs.filter((one) => one.kept);
  const smallest: SmallestWave[] = [];
  for (const planted of plantedRates(check)) {
    if (planted.rate.kind === 'drift') continue;
    const { cpm } = planted.rate;
    const powers: number[] = [];
    for (const epoch of some(kept, MOST_EPOCHS)) {
      powers.push(noise(epoch, cpm).power);
      await job.breathe();
    }
    const firstUv = Math.sqrt(2 * median(powers));
    const full = await drawAndJudge(check, plus(check.leftover.change, planted.unit, firstUv), job);
    const { uv, mostShare } = await smallestWave(firstUv, async (size) => {
      const judged = await judge(check, partly(alone.drawn, full.drawn, size / firstUv), job);
      const epochs = judged.epochs.filter((one) => one.kept);
      const found = epochs.filter((one) => plantedEpoch(one, planted.cpmAt, 0, rhythmBands).right);
      return found.length / Math.max(1, epochs.length);
    });
    smallest.push({
      cpm,
      uv: uv === null ? null : twoDigits(uv),
      upToUv: LARGEST_UV,
      mostPct: Math.round(100 * mostShare),
    });
    job.progress('Looking for the smallest wave', smallest.length / PLANTED_CPM.length);
  }
  return smallest;
}
