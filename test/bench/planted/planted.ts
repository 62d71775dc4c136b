import type { PlantedWave } from '../../../src/recording/evidence/planted';
import { DEFAULT_SETTINGS, SLOW_GAINS } from '../../../src/recording/settings';
import { simulateStudy } from '../../../src/simulate/simulate-study';
import { PLAIN_STUDY } from '../../../src/simulate/spec';
import { windowSpectra } from '../../../src/stomach/window-spectrum';
import { startJob } from '../../../workers/job';
import { plantedOf } from '../../../workers/pipeline-planted';
import { plantedSlow, plantedWaves } from '../../../workers/pipeline-planted-slow';
import { drawStudies, type Family } from '../accuracy/families';
import { type Bench, type Measured, median, type Part } from '../measured';
import { checks, evidenceInputs } from './studies';

const SEED = 1;
/** Of each family so many studies are planted in. */
const EACH = 4;
const BOUTS: Family = 'changing rhythms';
const { job } = startJob(() => undefined);

const row = (
  what: string,
  value: number,
  unit: string,
  decimals: number,
  budget: string,
  note = '',
): Measured => ({ part: 'planted', what, value, unit, decimals, budget, note });

/** How far the check of one study is from the truth. */
interface Agreement {
  readonly dfCpm: readonly number[];
  readonly rightPct: readonly number[];
  readonly snrDb: readonly number[];
}

/** Difference of a value of the check and the same of the truth, wave by wave; waves that either lacks are left out. */
const differences = (
  found: readonly PlantedWave[],
  truth: readonly PlantedWave[],
  value: (one: PlantedWave) => number | null | undefined,
): readonly number[] =>
  found.flatMap((one, k) => {
    const [a, b] = [value(one), value(truth[k])];
    return a === null || a === undefined || b === null || b === undefined ? [] : [a - b];
  });

function agreementOf(found: readonly PlantedWave[], truth: readonly PlantedWave[]): Agreement {
  return {
    dfCpm: differences(found, truth, (one) => one.dfErrorCpm?.median),
    rightPct: differences(found, truth, (one) => (100 * one.right) / one.epochs),
    snrDb: differences(found, truth, (one) => one.snrDb?.median),
  };
}

const mean = (values: readonly number[]) =>
  values.reduce((sum, one) => sum + one, 0) / values.length;
const farthest = (values: readonly number[]) => Math.max(...values.map(Math.abs));

function agreementRows(name: string, all: readonly Agreement[]): readonly Measured[] {
  const each = (pick: (one: Agreement) => readonly number[]) => all.map((one) => mean(pick(one)));
  const waves = (pick: (one: Agreement) => readonly number[]) => all.flatMap((one) => pick(one));
  const part = (
    what: string,
    pick: (one: Agreement) => readonly number[],
    unit: string,
    decimals: number,
    budget: string,
  ) => {
    const sizes = each(pick).map(Math.abs);
    const within = sizes.filter((one) => one <= Number(budget)).length;
    return row(
      `${name}: ${what}, check against truth, median study`,
      median(sizes),
      unit,
      decimals,
      budget,
      `${within} of ${sizes.length} studies within; worst study ${farthest(sizes).toFixed(decimals)}, worst single wave ${farthest(waves(pick)).toFixed(decimals)}; mean ${mean(each(pick)).toFixed(decimals)}`,
    );
  };
  return [
    part('DF error', (one) => one.dfCpm, 'cpm', 3, '0.02'),
    part('share of right rhythms', (one) => one.rightPct, 'points', 1, '5'),
    part('SNR', (one) => one.snrDb, 'dB', 1, '2'),
  ];
}

async function agreement({ say }: Bench): Promise<readonly Measured[]> {
  const steady: Agreement[] = [];
  const bouts: Agreement[] = [];
  const counts = new Map<Family, number>();
  for (const { family, spec } of drawStudies(SEED)) {
    const done = counts.get(family) ?? 0;
    if (done >= EACH || !spec.slowWave) continue;
    counts.set(family, done + 1);
    const { check, truth } = await checks(spec, job);
    const found = await plantedSlow(check, job);
    if (found.kind !== 'planted') throw new Error(found.reason);
    const heights = [found.ownUv, found.ownUv / 4];
    const one = agreementOf(found.waves, await plantedWaves(truth, heights, job));
    (family === BOUTS ? bouts : steady).push(one);
    if (process.env.PLANTED_VERBOSE) say(JSON.stringify({ family, seed: spec.seed, ...one }));
  }
  return [
    ...agreementRows('one rhythm', steady),
    ...agreementRows('rhythms that change within a second', bouts),
  ];
}

/** Mean power of a lead between two rates over the study, uV2. */
function powerWithin(signal: Float64Array, fromCpm: number, toCpm: number): number {
  const kept = new Uint8Array(signal.length).fill(1);
  const spectra = windowSpectra({ signal, kept, rateHz: 4, lengthS: 240, powerResponse: null });
  const length = spectra.taper.length;
  let [power, count] = [0, 0];
  for (let first = 0; first + length <= signal.length; first += length / 2) {
    spectra.density(spectra.prepare(first)).forEach((value, bin) => {
      const cpm = bin * spectra.binCpm;
      if (cpm >= fromCpm && cpm <= toCpm) power += (value * spectra.binCpm) / 60;
    });
    count += 1;
  }
  return power / count;
}

/** A wave as strong as the noise that passes with it, in studies without a slow wave. */
async function withoutWave(): Promise<readonly Measured[]> {
  const spec = { ...PLAIN_STUDY, durationS: 2400, slowWave: null, seed: 5 };
  const rows: Measured[] = [];
  for (const slowGain of SLOW_GAINS) {
    const { check, lead } = await checks(spec, job, { ...DEFAULT_SETTINGS, slowGain });
    const scores: number[] = [];
    for (const cpm of [1.5, 3, 5.5]) {
      const band = slowGain === 'even' ? [0.8, 10] : [cpm - 0.25, cpm + 0.25];
      const uv = Math.sqrt(2 * powerWithin(lead, band[0], band[1]));
      const waves = await plantedWaves(check, [uv], job);
      const one = waves.find(({ rate }) => rate.kind === 'steady' && rate.cpm === cpm);
      scores.push(one?.snrDb?.median ?? Number.NaN);
    }
    const of = slowGain === 'even' ? 'all of 0.8 to 10 cpm' : '0.25 cpm to each side';
    rows.push(
      row(
        `no slow wave, gain ${slowGain}: SNR of a wave as strong as the noise of ${of}, highest`,
        Math.max(...scores),
        'dB',
        1,
        '3',
        `at 1.5, 3, 5.5 cpm: ${scores.map((one) => one.toFixed(1)).join(', ')}`,
      ),
    );
  }
  return rows;
}

/** Time of the whole check for one hour, and its longest stretch without a turn for others. */
async function hour(): Promise<readonly Measured[]> {
  const spec = { ...PLAIN_STUDY, durationS: 3600 };
  const from = await evidenceInputs(simulateStudy(spec), spec, job);
  let [last, longest] = [performance.now(), 0];
  const watched = {
    progress: () => undefined,
    async breathe() {
      const now = performance.now();
      longest = Math.max(longest, now - last);
      await job.breathe();
      last = performance.now();
    },
  };
  const begun = performance.now();
  const cpu = process.cpuUsage();
  last = begun;
  await plantedOf(from, watched);
  const seconds = (performance.now() - begun) / 1000;
  const used = process.cpuUsage(cpu);
  return [
    row(
      'planted check of 1 h, 250 Hz',
      seconds,
      's',
      1,
      '',
      `${((used.user + used.system) / 1e6).toFixed(1)} s of processor; longest turn ${longest.toFixed(0)} ms`,
    ),
  ];
}

/** Whether the planted check tells the truth about invented studies, and what it costs. */
export const planted: Part = async (bench) => [
  ...(await hour()),
  ...(await withoutWave()),
  ...(await agreement(bench)),
];
