import { exp, sin } from '../src/numeric/elementary';
import { createRandom } from '../src/numeric/random';
import { type BeatList, NO_BEATS } from '../src/recording/beat';
import type { Lead } from '../src/recording/lead';
import type { Phase } from '../src/recording/phase';
import type { Epoch } from '../src/recording/rhythm';
import type { Roles } from '../src/recording/roles';
import type { Settings } from '../src/recording/settings';
import type { Analysis } from './analysis-api';
import type { Job } from './job';
import type { Pipeline } from './pipeline';
import { plainEdf } from './self-check-edf';

/** A pipeline of its own for each invented study, so that the open one is not touched. */
export type MakePipeline = () => Pipeline;

export const LEAD: Lead = { kind: 'channel', channel: 0 };
export const RATE_HZ = 250;
const BEAT_S = 0.012;

/** A lead in uV over minutes, and how it is stored. */
export interface InventedLead {
  readonly minutes: number;
  readonly rateHz: number;
  readonly limitUv: number;
  /** What every stored number is taken times when it is read, its sign too. */
  readonly times?: number;
  readonly uvAt: (t: number) => number;
}

interface Wanted {
  readonly heart: boolean;
  readonly phases: readonly Phase[];
  readonly settings: Settings;
}

export interface Result {
  readonly pipeline: Pipeline;
  readonly analysis: Analysis;
  readonly epochs: readonly Epoch[];
  readonly beats: BeatList;
}

/** An invented lead stored as an EDF file and taken through all steps, from its bytes to its figures. */
export async function taken(
  make: MakePipeline,
  invented: InventedLead,
  wanted: Wanted,
  job: Job,
): Promise<Result> {
  const pipeline = make();
  const { ticket } = await pipeline.open(1, await fileOf(invented, job), 'check.edf', null, job);
  pipeline.accept(ticket);
  const { phases, settings } = wanted;
  const roles: Roles = {
    slow: [LEAD],
    reported: 0,
    heart: wanted.heart ? LEAD : null,
    breath: null,
  };
  const beats = wanted.heart
    ? (await pipeline.propose({ roles, phases, spans: [], settings }, job)).beats
    : NO_BEATS;
  const analysis = await pipeline.analyse(
    { edit: 0, roles, phases, settings, spans: [], beats },
    job,
  );
  return { pipeline, analysis, epochs: analysis.stomach?.[0]?.epochs ?? [], beats };
}

async function fileOf({ minutes, rateHz, limitUv, times = 1, uvAt }: InventedLead, job: Job) {
  const digital = new Int16Array(60 * minutes * rateHz);
  const perUv = 32767 / limitUv;
  for (let i = 0; i < digital.length; i += 1) {
    if (i % 10_000 === 0) await job.breathe();
    digital[i] = Math.round(perUv * uvAt(i / rateHz));
  }
  return plainEdf({
    recordS: 10,
    records: 6 * minutes,
    signals: [
      {
        label: 'EGG',
        physicalMin: -limitUv * times,
        physicalMax: limitUv * times,
        digitalMin: -32767,
        digitalMax: 32767,
        digital,
      },
    ],
  });
}

export const wave = (uv: number, cpm: number, t: number) => uv * sin((2 * Math.PI * cpm * t) / 60);

/** Beats of 300 uV at times in ascending order; `t` must not go back. */
export function beatsAt(timesS: readonly number[]): (t: number) => number {
  let near = 0;
  return (t) => {
    while (near + 1 < timesS.length && timesS[near + 1] - t < t - timesS[near]) near += 1;
    const from = (t - timesS[near]) / BEAT_S;
    return Math.abs(from) > 9 ? 0 : 300 * exp(-0.5 * from * from);
  };
}

/** Times about 75 a minute, swinging with breath and chance. */
export function beatTimesS(minutes: number): number[] {
  const random = createRandom(14);
  const found: number[] = [];
  for (let t = 0.7; t < 60 * minutes - 0.7; ) {
    found.push(t);
    t += 0.8 * (1 + 0.03 * sin(2 * Math.PI * 0.25 * t) + 0.02 * random.gaussian());
  }
  return found;
}

export const MINUTES = 30;
export const WHOLE: readonly Phase[] = [{ name: 'fasting', fromS: 0, toS: 60 * MINUTES }];
export const MEAL: readonly Phase[] = [
  { name: 'fasting', fromS: 0, toS: 900 },
  { name: 'fed', fromS: 900, toS: 1800 },
];

/** Slow wave, larger after a quarter of an hour, breathing and beats; `drift` adds what no figure may feel. */
export function mixture(fedUv: number, drift: (t: number) => number = () => 0): InventedLead {
  const beat = beatsAt(beatTimesS(MINUTES));
  return {
    minutes: MINUTES,
    rateHz: RATE_HZ,
    limitUv: 3000,
    uvAt: (t) => wave(t < 900 ? 100 : fedUv, 3, t) + wave(40, 15, t) + beat(t) + drift(t),
  };
}

/** The largest of some values, whatever their sign. */
export const most = (values: readonly number[]): number =>
  values.reduce((a, b) => Math.max(a, Math.abs(b)), 0);

/** DF of every epoch in cpm, NaN where it has none. */
export const df = ({ epochs }: Result): readonly number[] =>
  epochs.map(({ dfCpm }) => dfCpm ?? Number.NaN);
