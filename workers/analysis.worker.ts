import * as Comlink from 'comlink';
import { type Failure, Refusal, type Reply } from '../src/recording/failure';
import type { AnalysisApi, JobId, WorkerNews } from './analysis-api';
import { type Job, type JobControl, startJob } from './job';
import { createPipeline, selfCheck } from './pipeline';

const SIGN_OF_LIFE_MS = 1000;
/** Progress is told at most this often, so that telling costs nothing. */
const TELL_EVERY_MS = 60;

let tell: (news: WorkerNews) => void = () => undefined;
const running = new Map<JobId, JobControl>();
const pipeline = createPipeline();

function failureOf(error: unknown): Failure {
  if (error instanceof Refusal) return error.failure;
  if (error instanceof RangeError && /allocation|array length|buffer/i.test(error.message))
    return {
      kind: 'out-of-memory',
      message: 'This computer has too little free memory for this step.',
      place: null,
      remedy: 'Close other pages and programs, then open the study again; your edits are kept.',
    };
  return {
    kind: 'internal',
    message: `The program met an error of its own: ${error instanceof Error ? error.message : String(error)}`,
    place: error instanceof Error ? (error.stack?.split('\n').at(1)?.trim() ?? null) : null,
    remedy:
      'Your edits are kept. Reload the page and open the study again; if it comes back, tell who maintains the program.',
  };
}

async function reply<T>(work: () => T | Promise<T>): Promise<Reply<T>> {
  try {
    return { ok: true, value: await work() };
  } catch (error) {
    return { ok: false, failure: failureOf(error) };
  }
}

async function inJob<T>(id: JobId, work: (job: Job) => T | Promise<T>): Promise<Reply<T>> {
  let toldMs = 0;
  const control = startJob((step, done) => {
    const now = performance.now();
    if (now - toldMs < TELL_EVERY_MS && done < 1) return;
    toldMs = now;
    tell({ kind: 'progress', job: id, step, done });
  });
  running.set(id, control);
  try {
    return await reply(() => work(control.job));
  } finally {
    running.delete(id);
  }
}

const api: AnalysisApi = {
  listen(ear) {
    tell = ear;
  },
  demo: (id) =>
    inJob(id, async () => {
      const { demoStudyFile } = await import('./demo-study');
      return demoStudyFile();
    }),
  open: (id, file, fileName, reading) =>
    inJob(id, (job) => pipeline.open(id, file, fileName, reading, job)),
  accept: (ticket) => pipeline.accept(ticket),
  firstRoles: (id) => inJob(id, () => pipeline.firstRoles()),
  propose: (id, given) => inJob(id, (job) => pipeline.propose(given, job)),
  analyse: (id, inputs) => inJob(id, (job) => pipeline.analyse(inputs, job)),
  doubts: (id, inputs, settled) => inJob(id, (job) => pipeline.doubts(inputs, settled, job)),
  evidence: (id, inputs, settled, part) =>
    inJob(id, (job) => pipeline.evidence(inputs, settled, part, job)),
  selfCheck: (id) => inJob(id, selfCheck),
  settingsMap: (id, inputs) => inJob(id, (job) => pipeline.settingsMap(inputs, job)),
  lookAlikes: (id, inputs, settled, doubtId) =>
    inJob(id, (job) => pipeline.lookAlikes(inputs, settled, doubtId, job)),
  figuresOf: (id, states) => inJob(id, (job) => pipeline.figuresOf(states, job)),
  detectWithin: (id, request) => inJob(id, (job) => pipeline.detectWithin(request, job)),
  separated: (id, inputs) => inJob(id, (job) => pipeline.separated(inputs, job)),
  columns: (request) => reply(() => pipeline.columns(request)),
  placeBeat: (nearS) => reply(() => pipeline.placeBeat(nearS)),
  cancel: (id) => running.get(id)?.cancel(),
};

setInterval(() => tell({ kind: 'alive' }), SIGN_OF_LIFE_MS);
Comlink.expose(api);
