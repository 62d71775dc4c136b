import * as Comlink from 'comlink';
import type { SettledDoubt } from '../src/recording/doubt';
import type { EvidencePart } from '../src/recording/evidence/evidence';
import type { Failure, Reply } from '../src/recording/failure';
import type { Findings } from '../src/recording/findings';
import type { Roles } from '../src/recording/roles';
import type { SelfCheck } from '../src/recording/self-check';
import type { SettingsMap } from '../src/recording/settings-map';
import type {
  Analysis,
  AnalysisApi,
  Columns,
  ColumnsRequest,
  DoubtList,
  EvidenceReply,
  FoundWithin,
  Given,
  JobId,
  LookAlikes,
  Opened,
  PlacedBeat,
  Proposal,
  ReviewInputs,
  SeparatedSignals,
  TextReading,
  WithinRequest,
  WorkerNews,
} from './analysis-api';

/** A worker that has said nothing for so long is taken for dead. */
const SILENCE_MS = 20_000;
const WATCH_MS = 2_000;

export interface CallOptions {
  readonly signal?: AbortSignal;
  readonly onProgress?: (step: string, done: number) => void;
}

/** The page's side of the worker: every call resolves to a reply, whatever happens to the worker. */
export interface AnalysisClient {
  demo(options?: CallOptions): Promise<Reply<Blob>>;
  open(
    file: Blob,
    fileName: string,
    reading: TextReading | null,
    options?: CallOptions,
  ): Promise<Reply<Opened>>;
  /** Takes an opened study into use; false where the worker does not have it any more. */
  accept(ticket: JobId): Promise<boolean>;
  firstRoles(options?: CallOptions): Promise<Reply<Roles>>;
  propose(given: Given, options?: CallOptions): Promise<Reply<Proposal>>;
  analyse(inputs: ReviewInputs, options?: CallOptions): Promise<Reply<Analysis>>;
  doubts(
    inputs: ReviewInputs,
    settled: readonly SettledDoubt[],
    options?: CallOptions,
  ): Promise<Reply<DoubtList>>;
  evidence(
    inputs: ReviewInputs,
    settled: readonly SettledDoubt[],
    part: EvidencePart,
    options?: CallOptions,
  ): Promise<Reply<EvidenceReply>>;
  /** Needs no study to be open. */
  selfCheck(options?: CallOptions): Promise<Reply<SelfCheck>>;
  settingsMap(inputs: ReviewInputs, options?: CallOptions): Promise<Reply<SettingsMap>>;
  lookAlikes(
    inputs: ReviewInputs,
    settled: readonly SettledDoubt[],
    doubtId: string,
    options?: CallOptions,
  ): Promise<Reply<LookAlikes>>;
  figuresOf(
    states: readonly ReviewInputs[],
    options?: CallOptions,
  ): Promise<Reply<readonly Findings[]>>;
  detectWithin(request: WithinRequest, options?: CallOptions): Promise<Reply<FoundWithin>>;
  separated(inputs: ReviewInputs, options?: CallOptions): Promise<Reply<SeparatedSignals>>;
  columns(request: ColumnsRequest): Promise<Reply<Columns>>;
  placeBeat(nearS: number): Promise<Reply<PlacedBeat>>;
  /** Ends the worker for good. */
  close(): void;
}

interface OpenCall {
  readonly settle: (failure: Failure) => void;
  readonly onProgress: CallOptions['onProgress'];
}

type OpenArguments = readonly [Blob, string, TextReading | null];

interface Line {
  readonly worker: Worker;
  readonly api: Comlink.Remote<AnalysisApi>;
  lastSignMs: number;
  /** False until the worker has said anything. */
  spoke: boolean;
  /** Ends when a worker that was started again has the accepted study. */
  ready: Promise<unknown>;
}

const CRASHED: Failure = {
  kind: 'crashed',
  message: 'The part of the program that computes stopped unexpectedly and was started again.',
  place: null,
  remedy:
    'Your edits are kept. The last step is done again by itself; if it stops once more, open the file again.',
};

/** Workers in a row that ended without a word before no further one is started. */
const MOST_BARREN = 3;

const NEVER_STARTED: Failure = {
  kind: 'crashed',
  message: 'The part of the program that computes cannot be started in this browser.',
  place: null,
  remedy:
    'Reload the page. If that does not help, use a current version of a browser, or ask who serves this page whether all of its files are there.',
};

/**
 * A client over workers made by `startWorker`. After a crash, or when a busy worker gives no sign of life, every open call
 * resolves to a `crashed` failure, a new worker starts and opens the accepted file again; `onRestart` tells the page, with
 * the failure where the file could not be opened again. Calls made meanwhile wait for it.
 */
export function createAnalysisClient(
  startWorker: () => Worker,
  onRestart: (failure: Failure | null) => void,
): AnalysisClient {
  const open = new Map<JobId, OpenCall>();
  let nextJob: JobId = 1;
  let barren = 0;
  let line = connect();
  const openings = new Map<JobId, OpenArguments>();
  let accepted: OpenArguments | null = null;

  function connect(): Line {
    const worker = startWorker();
    const api = Comlink.wrap<AnalysisApi>(worker);
    const made: Line = {
      worker,
      api,
      lastSignMs: performance.now(),
      spoke: false,
      ready: Promise.resolve(),
    };
    worker.addEventListener('error', () => restart(made));
    worker.addEventListener('messageerror', () => restart(made));
    const hear = (news: WorkerNews) => {
      made.lastSignMs = performance.now();
      made.spoke = true;
      if (news.kind === 'progress') open.get(news.job)?.onProgress?.(news.step, news.done);
    };
    void Promise.resolve(api.listen(Comlink.proxy(hear))).catch(() => restart(made));
    return made;
  }

  function restart(dead: Line): void {
    if (dead !== line) return;
    dead.worker.terminate();
    barren = dead.spoke ? 0 : barren + 1;
    const calls = [...open.values()];
    open.clear();
    if (barren >= MOST_BARREN) {
      for (const call of calls) call.settle(NEVER_STARTED);
      return;
    }
    line = connect();
    openings.clear();
    const again = reopen(line);
    line.ready = again;
    void again.then(onRestart);
    for (const call of calls) call.settle(CRASHED);
  }

  async function reopen({ api }: Line): Promise<Failure | null> {
    if (!accepted) return null;
    const reply = await api.open(0, ...accepted);
    if (!reply.ok) return reply.failure;
    await api.accept(reply.value.ticket);
    return null;
  }

  const watch = setInterval(() => {
    if (open.size === 0) line.lastSignMs = performance.now();
    else if (performance.now() - line.lastSignMs > SILENCE_MS) restart(line);
  }, WATCH_MS);

  function call<T>(
    send: (api: Comlink.Remote<AnalysisApi>, job: JobId) => Promise<Reply<T>>,
    options: CallOptions = {},
  ): Promise<Reply<T>> {
    const job = nextJob;
    nextJob += 1;
    const { api, ready } = line;
    if (barren >= MOST_BARREN) return Promise.resolve({ ok: false, failure: NEVER_STARTED });
    return new Promise((resolve) => {
      const settle = (failure: Failure) => resolve({ ok: false, failure });
      open.set(job, { settle, onProgress: options.onProgress });
      const stop = () => void api.cancel(job);
      options.signal?.addEventListener('abort', stop, { once: true });
      if (options.signal?.aborted) stop();
      const sent = ready.then(() => send(api, job));
      sent.then(
        (reply) => {
          open.delete(job);
          options.signal?.removeEventListener('abort', stop);
          resolve(reply);
        },
        () => {
          open.delete(job);
          settle(CRASHED);
        },
      );
    });
  }

  return {
    demo: (options) => call((api, job) => api.demo(job), options),
    open: (file, fileName, reading, options) =>
      call((api, job) => {
        openings.set(job, [file, fileName, reading]);
        return api.open(job, file, fileName, reading);
      }, options),
    async accept(ticket) {
      const asked = openings.get(ticket);
      if (!asked || !(await line.api.accept(ticket))) return false;
      accepted = asked;
      openings.clear();
      return true;
    },
    firstRoles: (options) => call((api, job) => api.firstRoles(job), options),
    propose: (given, options) => call((api, job) => api.propose(job, given), options),
    analyse: (inputs, options) => call((api, job) => api.analyse(job, inputs), options),
    doubts: (inputs, settled, options) =>
      call((api, job) => api.doubts(job, inputs, settled), options),
    evidence: (inputs, settled, part, options) =>
      call((api, job) => api.evidence(job, inputs, settled, part), options),
    selfCheck: (options) => call((api, job) => api.selfCheck(job), options),
    settingsMap: (inputs, options) => call((api, job) => api.settingsMap(job, inputs), options),
    lookAlikes: (inputs, settled, doubtId, options) =>
      call((api, job) => api.lookAlikes(job, inputs, settled, doubtId), options),
    figuresOf: (states, options) => call((api, job) => api.figuresOf(job, states), options),
    detectWithin: (request, options) => call((api, job) => api.detectWithin(job, request), options),
    separated: (inputs, options) => call((api, job) => api.separated(job, inputs), options),
    columns: (request) => call((api) => api.columns(request)),
    placeBeat: (nearS) => call((api) => api.placeBeat(nearS)),
    close() {
      clearInterval(watch);
      line.worker.terminate();
    },
  };
}
