import { createRandom } from '../src/numeric/random';
import type { PlantedRate } from '../src/recording/evidence/planted';
import type { BreathingSeries } from '../src/recording/heart-series';
import type { Epoch } from '../src/recording/rhythm';
import type { Interval } from '../src/recording/span';
import type { SeparatedSlow } from '../src/separate/route';
import { keptSamples } from '../src/stomach/kept-samples';
import { type JudgedEpochs, judgedEpochs } from '../src/stomach/slow-wave-rhythm';
import { usualCpm } from '../src/stomach/usual-cpm';
import { windowSpectra } from '../src/stomach/window-spectrum';
import type { Leftover } from '../src/trust/leftover';
import { PLANTED_CPM, patternCpm, plantedWave } from '../src/trust/planted-wave';
import type { CheckPlan } from '../src/trust/stretches';
import { type Job, withRests } from './job';
import { type DrawnWith, drawnAgain, type RoutedLead, withChange } from './pipeline-planted-route';

/** The planted waves' phases: the same each time. */
const SEED = 20_260_502;
/** DF is told within this by a peak's main lobe, 240 s. */
const LOBE_CPM = 0.5;
/** The derivative's lead is undone here until the rhythm found is known. */
const USUAL_CPM = 3;

const RATES: readonly PlantedRate[] = [
  ...PLANTED_CPM.map((cpm) => ({ kind: 'steady', cpm }) as const),
  { kind: 'drift' },
];

/** One lead, what it is planted in, and all that its figures were made with. */
export interface SlowCheck {
  readonly lead: RoutedLead;
  /** What is planted in. */
  readonly leftover: Pick<Leftover, 'lead' | 'change' | 'restDb'>;
  /** Stretches that carry no slow wave. */
  readonly spoiled: readonly Interval[];
  readonly breathing: BreathingSeries | null;
  /** The lead's own epochs. */
  readonly epochs: readonly Epoch[];
  readonly plan: CheckPlan;
  readonly drawing: Omit<DrawnWith, 'dfCpm'>;
}

/** A lead with something planted, as the program draws and judges it. */
export interface Judged {
  readonly drawn: SeparatedSlow;
  readonly judged: JudgedEpochs;
}

export const judge = (
  { lead, spoiled, breathing, plan }: SlowCheck,
  drawn: SeparatedSlow,
  job: Job,
): Promise<JudgedEpochs> =>
  withRests(
    judgedEpochs({
      slow: drawn,
      spoiled,
      phases: plan.phases,
      settings: lead.settings,
      breathing,
    }),
    job,
  );

/** Draws and judges the lead with a change, the drawn wave put back by its lead at the rhythm found where the settings ask for it. */
export async function drawAndJudge(
  check: SlowCheck,
  change: Float64Array,
  job: Job,
): Promise<Judged> {
  const { lead, drawing } = check;
  const changed = await withChange(lead, change, job);
  const drawn = await drawnAgain(lead, changed, { ...drawing, dfCpm: USUAL_CPM }, job);
  await job.breathe();
  const judged = await judge(check, drawn, job);
  if (!lead.settings.fractional.undoLead || drawn.powerResponse === null) return { drawn, judged };
  return {
    drawn: await drawnAgain(lead, changed, { ...drawing, dfCpm: usualCpm(judged) }, job),
    judged,
  };
}

/** Powers in uV2 within 0.5 cpm of a rate in an epoch of a lead at the slow rate. */
export function lobePower(check: SlowCheck, signal: Float64Array) {
  const { lead, spoiled } = check;
  const { rateHz } = lead.slow;
  const spectra = windowSpectra({
    signal,
    kept: keptSamples(signal, rateHz, spoiled),
    rateHz,
    lengthS: lead.settings.epoch.lengthS,
    powerResponse: null,
  });
  return ({ fromS }: Pick<Epoch, 'fromS'>, cpm: number) => {
    const first = Math.max(0, Math.ceil(fromS * rateHz - 1e-6));
    const last = signal.length - spectra.taper.length;
    const density = spectra.density(spectra.prepare(Math.min(first, last)));
    let [power, highest] = [0, 0];
    const from = Math.max(1, Math.round((cpm - LOBE_CPM) / spectra.binCpm));
    const to = Math.min(density.length - 1, Math.round((cpm + LOBE_CPM) / spectra.binCpm));
    for (let k = from; k <= to; k += 1) {
      power += (density[k] * spectra.binCpm) / 60;
      highest = Math.max(highest, density[k]);
    }
    return { power, highest };
  };
}

export const some = <T>(all: readonly T[], most: number): readonly T[] => {
  const every = Math.max(1, all.length / most);
  return Array.from({ length: Math.min(all.length, most) }, (_, k) => all[Math.floor(k * every)]);
};

/** One planted wave of 1 uV with its phase. */
export interface Planted {
  readonly rate: PlantedRate;
  readonly unit: Float64Array;
  readonly cpmAt: (atS: number) => number;
}

export function plantedRates({ lead }: SlowCheck): readonly Planted[] {
  const random = createRandom(SEED);
  const { length } = lead.slow.recorded;
  const { rateHz } = lead.slow;
  return RATES.map((rate) => ({
    rate,
    unit: plantedWave(rate, length, rateHz, random.uniform()),
    cpmAt: (atS) => patternCpm(rate, atS, length / rateHz),
  }));
}

export const plus = (change: Float64Array, unit: Float64Array, uv: number) =>
  change.map((value, i) => value + uv * unit[i]);
