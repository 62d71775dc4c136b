import { openAsBlob } from 'node:fs';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import type { Proposal } from '../../workers/analysis-api';
import { startJob } from '../../workers/job';
import { createPipeline, type Pipeline } from '../../workers/pipeline';
import { inventedStudy, writeStudy } from './invented-study';
import { type Bench, medianTimed, type Part, type Timed, timed, timeLine } from './measured';

const PART = 'pipeline';
const ROUNDS = 3;
const TICKET = 1;
const STEPS = ['open', 'firstRoles', 'propose', 'analyse', 'again'] as const;
type Step = (typeof STEPS)[number];

const WORDS: Readonly<Record<Step, string>> = {
  open: 'file opened',
  firstRoles: 'roles for the first picture',
  propose: 'one pass over the file, leads compared, beats found',
  analyse: 'all figures',
  again: 'all figures once more after one beat was taken away',
};

const job = () => startJob(() => undefined).job;

async function analyse(pipeline: Pipeline, proposal: Proposal, edit: number): Promise<void> {
  const { roles, phases, beats } = proposal;
  const spans = proposal.spans.map((span, i) => ({ ...span, id: i + 1 }));
  const taken = edit === 0 ? 0 : 100;
  const without = {
    ticks: beats.ticks.filter((_, i) => i !== taken),
    classes: beats.classes.filter((_, i) => i !== taken),
    origins: beats.origins.filter((_, i) => i !== taken),
  };
  const inputs = { edit, roles, phases, settings: DEFAULT_SETTINGS, spans };
  await pipeline.analyse({ ...inputs, beats: edit === 0 ? beats : without }, job());
}

async function walk(path: string, times: Record<Step, Timed[]>): Promise<void> {
  const pipeline = createPipeline();
  const given = { roles: null, phases: null, spans: null, settings: DEFAULT_SETTINGS };
  const step = async <T>(name: Step, work: () => Promise<T>): Promise<T> => {
    const took = await timed(work);
    times[name].push(took);
    return took.made;
  };
  await step('open', async () => {
    const file = await openAsBlob(path);
    return pipeline.open(TICKET, file, 'invented.edf', null, job());
  });
  pipeline.accept(TICKET);
  await step('firstRoles', () => pipeline.firstRoles());
  const proposal = await step('propose', () => pipeline.propose(given, job()));
  await step('analyse', () => analyse(pipeline, proposal, 0));
  await step('again', () => analyse(pipeline, proposal, 1));
}

/** The worker's own work in Node, from the file to all figures, step by step: for `node --cpu-prof` too. */
export const pipeline: Part = async ({ minutes, folder }: Bench) => {
  const path = await writeStudy(inventedStudy(minutes), folder);
  const times: Record<Step, Timed[]> = {
    open: [],
    firstRoles: [],
    propose: [],
    analyse: [],
    again: [],
  };
  for (let round = 0; round < ROUNDS; round += 1) await walk(path, times);
  return [
    ...STEPS.map((step) => timeLine(PART, `${WORDS[step]}, first time`, times[step][0])),
    ...STEPS.map((step) => timeLine(PART, WORDS[step], medianTimed(times[step].slice(1)))),
  ];
};
