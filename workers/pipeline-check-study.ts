import { sin } from '../src/numeric/elementary';
import { numberOf } from '../src/recording/figure';
import { DEFAULT_SETTINGS } from '../src/recording/settings';
import { ARITHMETIC, type CheckValue, EXACT, within } from './check-value';
import type { Job } from './job';
import {
  beatsAt,
  beatTimesS,
  df,
  type InventedLead,
  type MakePipeline,
  MEAL,
  MINUTES,
  mixture,
  most,
  RATE_HZ,
  type Result,
  taken,
  WHOLE,
} from './self-check-lead';

const BOTH = { heart: true, settings: DEFAULT_SETTINGS };

const normal = ({ epochs }: Result) => epochs.filter(({ rhythm }) => rhythm === 'normo').length;
const dp = ({ epochs }: Result) => epochs.map(({ dpDb }) => dpDb ?? Number.NaN);
const less = (a: readonly number[], b: readonly number[]) => a.map((value, i) => value - b[i]);
const rhythms = ({ epochs }: Result) => epochs.map(({ rhythm }) => rhythm).join(' ');
const rr = ({ analysis }: Result) => Array.from(analysis.heart?.value?.rr.rrMs ?? []);

/** Keys of figures that differ between two results, levels left out, which a gain must move; 'none' of none. */
function changedFigures(before: Result, after: Result): string {
  const told = ({ analysis }: Result) =>
    analysis.findings.phases.flatMap(({ name, figures }) =>
      Object.entries(figures)
        .filter(([key]) => !key.endsWith('_db'))
        .map(([key, value]) => ({ name: `${name} ${key}`, value: numberOf(value) })),
    );
  const known = told(before);
  const same = (a: number, b: number) => Object.is(a, b) || Math.abs(a - b) <= 1e-9 * Math.abs(b);
  const changed = told(after).filter(({ value }, i) => !same(value, known[i]?.value));
  return changed.map(({ name }) => name).join(', ') || 'none';
}

/** Fed over fasting in dB, before it is rounded. */
function powerRatioDb({ analysis }: Result): number {
  const [fasting, fed] = analysis.findings.phases.map(({ figures }) =>
    numberOf(figures.dp_mean_spectrum_db),
  );
  return fed - fasting;
}

/** Epochs of a step from 3 to 5 cpm at half an hour, and those with DF in 2-4 cpm. */
async function step(make: MakePipeline, job: Job): Promise<readonly number[]> {
  const turns = (t: number) => (t < 1800 ? 3 * t : 3 * 1800 + 5 * (t - 1800)) / 60;
  const beat = beatsAt(Array.from({ length: 4501 }, (_, i) => 0.8 * i));
  const result = await taken(
    make,
    {
      minutes: 60,
      rateHz: RATE_HZ,
      limitUv: 500,
      uvAt: (t) => 100 * sin(2 * Math.PI * (turns(t) % 1)) + beat(t),
    },
    { heart: false, phases: [], settings: DEFAULT_SETTINGS },
    job,
  );
  return [result.epochs.length, df(result).filter((cpm) => cpm >= 2 && cpm < 4).length];
}

/** Runs a piece of work once for all the lines that ask for it. */
function once<T>(work: (job: Job) => Promise<T>): (job: Job) => Promise<T> {
  let made: Promise<T> | null = null;
  return (job) => {
    made ??= work(job);
    return made;
  };
}

/** An invented study of both rhythms, and one whose rhythm changes, from the bytes of a file to the figures. */
export function mixtureChecks(make: MakePipeline): readonly CheckValue[] {
  const plain = once((job) => taken(make, mixture(100), { ...BOTH, phases: WHOLE }, job));
  return [
    {
      id: 'CV-14',
      what: '100 µV at 3 cpm, breathing, beats about 75 a minute, 30 min: epochs, in the normal band',
      source: ARITHMETIC,
      expected: [27, 27],
      tolerance: EXACT,
      async got(job) {
        const result = await plain(job);
        return [result.epochs.length, normal(result)];
      },
    },
    {
      id: 'CV-14',
      what: 'the same: farthest DF from 3 cpm',
      source: ARITHMETIC,
      expected: [0],
      tolerance: within(0.02),
      got: async (job) => [most(df(await plain(job)).map((cpm) => cpm - 3))],
    },
    {
      id: 'CV-14',
      what: 'the same: beats found of those put in',
      source: ARITHMETIC,
      expected: [beatTimesS(MINUTES).length],
      tolerance: EXACT,
      got: async (job) => [(await plain(job)).beats.ticks.length],
    },
    {
      id: 'CV-15',
      what: '3 cpm, from half an hour on 5 cpm: epochs, those with DF in 2-4 cpm (one is a tie)',
      source: ARITHMETIC,
      expected: [57, 29],
      tolerance: within(1),
      got: (job) => step(make, job),
    },
  ];
}

/** What a study turned over, moved or made larger may change, all the way to the figures. */
export function sameFiguresChecks(make: MakePipeline): readonly CheckValue[] {
  const meal = (lead: InventedLead) =>
    once((job) => taken(make, lead, { ...BOTH, phases: MEAL }, job));
  const base = meal(mixture(150));
  const turned = meal({ ...mixture(150), times: -1 });
  const doubled = meal({ ...mixture(150), times: 2 });
  const moved = meal(mixture(150, (t) => 1000 + t / 6));
  return [
    {
      id: 'CV-60',
      what: 'A lead turned over: beats, largest change of a beat’s time and of an interval',
      source: ARITHMETIC,
      expected: [beatTimesS(MINUTES).length, 0, 0],
      tolerance: EXACT,
      async got(job) {
        const [a, b] = [await base(job), await turned(job)];
        const ticks = less(Array.from(b.beats.ticks), Array.from(a.beats.ticks));
        return [b.beats.ticks.length, most(ticks), most(less(rr(b), rr(a)))];
      },
    },
    {
      id: 'CV-61',
      what: '1000 µV and 10 µV a minute added: largest change of DP, dB',
      source: ARITHMETIC,
      expected: [0],
      tolerance: within(0.1),
      got: async (job) => [most(less(dp(await moved(job)), dp(await base(job))))],
    },
    {
      id: 'CV-61',
      what: 'the same: largest change of DF, cpm',
      source: ARITHMETIC,
      expected: [0],
      tolerance: within(0.001),
      got: async (job) => [most(less(df(await moved(job)), df(await base(job))))],
    },
    {
      id: 'CV-61',
      what: 'the same: rhythm of every epoch',
      source: ARITHMETIC,
      expected: ['unchanged'],
      tolerance: EXACT,
      got: async (job) => [
        rhythms(await base(job)) === rhythms(await moved(job)) ? 'unchanged' : 'changed',
      ],
    },
    {
      id: 'CV-62',
      what: 'A lead twice as large: least and largest change of DP, dB',
      source: ARITHMETIC,
      expected: [6.021, 6.021],
      tolerance: within(0.001),
      async got(job) {
        const changes = less(dp(await doubled(job)), dp(await base(job)));
        return [Math.min(...changes), Math.max(...changes)];
      },
    },
    {
      id: 'CV-62',
      what: 'the same: figures that changed, those in dB left out',
      source: ARITHMETIC,
      expected: ['none'],
      tolerance: EXACT,
      got: async (job) => [changedFigures(await base(job), await doubled(job))],
    },
    {
      id: 'CV-62',
      what: 'the same: change of the power ratio of fed to fasting, dB',
      source: ARITHMETIC,
      expected: [0],
      tolerance: within(0.001),
      got: async (job) => [powerRatioDb(await doubled(job)) - powerRatioDb(await base(job))],
    },
  ];
}
