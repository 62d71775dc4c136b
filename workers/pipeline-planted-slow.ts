import { log10 } from '../src/numeric/elementary';
import { median } from '../src/numeric/statistics';
import type { NotPlanted, PlantedSlow, PlantedWave } from '../src/recording/evidence/planted';
import type { Epoch } from '../src/recording/rhythm';
import { isWithin } from '../src/recording/span';
import type { SeparatedSlow } from '../src/separate/route';
import { keptSamples } from '../src/stomach/kept-samples';
import { hasRhythm } from '../src/stomach/rhythm-class';
import type { JudgedEpochs } from '../src/stomach/slow-wave-rhythm';
import { type PlantedEpoch, plantedEpoch } from '../src/trust/planted-epochs';
import { overStretches } from '../src/trust/stretches';
import { type WaveScore, waveScore } from '../src/trust/wave-score';
import type { Job } from './job';
import {
  drawAndJudge,
  type Judged,
  lobePower,
  type Planted,
  plantedRates,
  plus,
  type SlowCheck,
  some,
} from './pipeline-planted-judge';
import { smallestWaves } from './pipeline-planted-smallest';

/** Parts of the study's own height that are planted. */
const SHARES = [1, 0.25] as const;
/** Epochs that the study's own height is read from, at most. */
const MOST_EPOCHS = 200;
const PICTURE_S = 240;
const PICTURE_STEP_S = 0.5;
/** The picture's spectra end here. */
const PICTURE_CPM = 10;

/** Median height of the study's own wave, its leftover's power taken off; of its highest peaks where it has no rhythm. */
export async function ownHeight(
  check: SlowCheck,
  job: Job,
): Promise<Pick<PlantedSlow, 'ownUv' | 'ownFrom'> | null> {
  const { epochs, lead, leftover } = check;
  const own = lobePower(check, lead.slow.recorded);
  const rest = lobePower(check, leftover.lead);
  const kept = epochs.filter((one) => one.kept && one.dfCpm !== null);
  const rhythmic = kept.filter(hasRhythm);
  const ownFrom = rhythmic.length > 0 ? 'rhythm' : 'peaks';
  const heights: number[] = [];
  for (const epoch of some(ownFrom === 'rhythm' ? rhythmic : kept, MOST_EPOCHS)) {
    const cpm = epoch.dfCpm ?? Number.NaN;
    const beside = ownFrom === 'rhythm' ? rest(epoch, cpm).power : 0;
    heights.push(Math.sqrt(2 * Math.max(0, own(epoch, cpm).power - beside)));
    await job.breathe();
  }
  const ownUv = heights.length > 0 ? median(heights) : 0;
  return ownUv > 0 ? { ownUv, ownFrom } : null;
}

/** 1 where a drawn sample counts: kept, drawn, and not felt by an end or a gap. */
function countsOf({ spoiled }: SlowCheck, drawn: SeparatedSlow): Uint8Array {
  const lost = [...spoiled, ...drawn.unclean];
  return keptSamples(drawn.slowWave, drawn.rateHz, lost);
}

async function epochScores(
  check: SlowCheck,
  planted: Planted,
  uv: number,
  epochs: readonly Epoch[],
  job: Job,
): Promise<readonly PlantedEpoch[]> {
  const alone = lobePower(check, planted.unit);
  const { rhythmBands } = check.lead.settings;
  const scores: PlantedEpoch[] = [];
  for (const epoch of epochs) {
    if (!epoch.kept) continue;
    const cpm = planted.cpmAt((epoch.fromS + epoch.toS) / 2);
    const dpDb = 10 * log10(uv * uv * alone(epoch, cpm).highest);
    scores.push(plantedEpoch(epoch, planted.cpmAt, dpDb, rhythmBands));
    await job.breathe();
  }
  return scores;
}

const meanOf = (values: readonly (number | null)[]): number | null => {
  const there = values.flatMap((one) => one ?? []);
  return there.length > 0 ? there.reduce((sum, one) => sum + one, 0) / there.length : null;
};

/** Mean density over epochs in dB, up to 10 cpm. */
function meanSpectrumDb({ epochSpectra, binCpm }: JudgedEpochs): Float32Array {
  const there = epochSpectra.filter((one) => one !== null);
  return Float32Array.from({ length: Math.ceil(PICTURE_CPM / binCpm) + 1 }, (_, k) => {
    const mean = there.reduce((sum, one) => sum + one[k], 0) / Math.max(1, there.length);
    return 10 * log10(Math.max(1e-12, mean));
  });
}

/** A few minutes from the middle of the stretch whose score is the middle one. */
function pictureOf(
  { plan }: SlowCheck,
  { unit }: Planted,
  uv: number,
  { drawn, judged }: Judged,
  scores: readonly (WaveScore | null)[],
): PlantedWave['picture'] {
  const ranked = scores
    .flatMap((score, k) => (score ? [{ k, snrDb: score.snrDb }] : []))
    .sort((a, b) => a.snrDb - b.snrDb);
  const { fromS, toS } = plan.stretches[ranked[ranked.length >> 1]?.k ?? 0];
  const from = Math.max(fromS, (fromS + toS - PICTURE_S) / 2);
  const every = Math.max(1, Math.round(PICTURE_STEP_S * drawn.rateHz));
  const first = Math.round(from * drawn.rateHz);
  const count = Math.floor((Math.min(toS - from, PICTURE_S) * drawn.rateHz) / every);
  const pick = (value: (i: number) => number) =>
    Float32Array.from({ length: count }, (_, k) => value(first + k * every));
  return {
    fromS: first / drawn.rateHz,
    stepS: every / drawn.rateHz,
    plantedUv: pick((i) => uv * unit[i]),
    drawnUv: pick((i) => drawn.slowWave[i]),
    spectrumDb: meanSpectrumDb(judged),
  };
}

async function scoresOf(
  check: SlowCheck,
  planted: Planted,
  uv: number,
  found: Judged,
  job: Job,
): Promise<PlantedWave> {
  const { plan } = check;
  const { drawn, judged } = found;
  const epochs = await epochScores(check, planted, uv, judged.epochs, job);
  const counts = countsOf(check, drawn);
  const wave = planted.unit.map((value) => uv * value);
  const scores: (WaveScore | null)[] = [];
  for (const { fromS, toS } of plan.stretches) {
    const from = Math.ceil(fromS * drawn.rateHz);
    const to = Math.min(drawn.slowWave.length, Math.floor(toS * drawn.rateHz));
    scores.push(waveScore(drawn.slowWave, wave, { counts, from, to }, drawn.rateHz));
    await job.breathe();
  }
  const byStretch = plan.stretches.map((stretch) =>
    epochs.filter(({ centreS }) => isWithin(centreS, [stretch])),
  );
  const over = (value: (one: PlantedEpoch) => number | null) =>
    overStretches(byStretch.map((all) => meanOf(all.map(value))));
  return {
    rate: planted.rate,
    uv,
    epochs: epochs.length,
    right: epochs.filter(({ right }) => right).length,
    rightPct: over(({ right }) => (right ? 100 : 0)),
    dfErrorCpm: over(({ dfErrorCpm }) => dfErrorCpm),
    dpErrorDb: over(({ dpErrorDb }) => dpErrorDb),
    snrDb: overStretches(scores.map((one) => one?.snrDb ?? null)),
    scale: overStretches(scores.map((one) => one?.scale ?? null)),
    delayS: overStretches(scores.map((one) => one?.delayS ?? null)),
    picture: pictureOf(check, planted, uv, found, scores),
  };
}

/** The scores of waves of some heights at every rate, planted in a lead's leftover. */
export async function plantedWaves(
  check: SlowCheck,
  heightsUv: readonly number[],
  job: Job,
): Promise<readonly PlantedWave[]> {
  const waves: PlantedWave[] = [];
  const all = plantedRates(check);
  for (const planted of all)
    for (const uv of heightsUv) {
      const found = await drawAndJudge(check, plus(check.leftover.change, planted.unit, uv), job);
      waves.push(await scoresOf(check, planted, uv, found, job));
      job.progress('Planting known waves', waves.length / (all.length * heightsUv.length));
      await job.breathe();
    }
  return waves;
}

/** Plants known waves in a lead's leftover and scores what the study's own route and figures make of them. */
export async function plantedSlow(check: SlowCheck, job: Job): Promise<PlantedSlow | NotPlanted> {
  const none = (reason: string): NotPlanted => ({ kind: 'not-planted', reason });
  const { leftover, plan, lead } = check;
  if (plan.phases.length === 0) return none('No phase holds an epoch of four minutes.');
  const own = await ownHeight(check, job);
  if (!own) return none('No epoch of the lead is kept.');
  const alone = await drawAndJudge(check, leftover.change, job);
  const epochs = alone.judged.epochs.filter(({ kept }) => kept).length;
  if (epochs === 0) return none('No epoch of the lead is kept.');
  const heights = SHARES.map((share) => share * own.ownUv);
  return {
    kind: 'planted',
    lead: lead.slow.lead,
    ...own,
    stretches: plan.stretches.length,
    stretchS: median(plan.stretches.map(({ fromS, toS }) => toS - fromS)),
    epochs,
    restDb: leftover.restDb,
    waves: await plantedWaves(check, heights, job),
    smallest: await smallestWaves(check, alone, job),
    binCpm: alone.judged.binCpm,
    leftoverDb: meanSpectrumDb(alone.judged),
  };
}
