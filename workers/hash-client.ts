import type { Failure, Reply } from '../src/recording/failure';
import type { JobId } from './analysis-api';
import type { HashNews, HashRequest } from './hash-api';

export interface HashClient {
  /** SHA-256 of a blob in hex. Never rejects; `heard` gets the share done, 0 to 1. */
  hash(
    blob: Blob,
    options?: { readonly signal?: AbortSignal; readonly heard?: (done: number) => void },
  ): Promise<Reply<string>>;
  /** Ends the worker; open calls come back as cancelled. */
  close(): void;
}

interface OpenCall {
  readonly end: (reply: Reply<string>) => void;
  readonly heard: ((done: number) => void) | undefined;
}

const failed = (kind: Failure['kind'], message: string): Reply<string> => ({
  ok: false,
  failure: { kind, message, place: null, remedy: 'Open the study again to confirm it.' },
});
const stoppedReply = () =>
  failed('cancelled', 'Reading the whole file for its SHA-256 was stopped.');

/**
 * The page's side of the hash worker. `start` begins one (startModuleWorker with the URL that Vite gives for
 * `hash.worker.ts?worker&url`): at the first call, and again at the next call after a crash.
 */
export function createHashClient(start: () => Worker): HashClient {
  const open = new Map<JobId, OpenCall>();
  let worker: Worker | null = null;
  let lastJob: JobId = 0;

  const endAll = (reply: Reply<string>) => {
    worker?.terminate();
    worker = null;
    const calls = [...open.values()];
    open.clear();
    for (const call of calls) call.end(reply);
  };
  const running = (): Worker => {
    if (worker) return worker;
    const begun = start();
    begun.addEventListener('message', ({ data }: MessageEvent<HashNews>) => {
      const call = open.get(data.job);
      if (!call) return;
      if (data.kind === 'progress') call.heard?.(data.done);
      else {
        open.delete(data.job);
        call.end(data.reply);
      }
    });
    begun.addEventListener('error', () => {
      if (worker === begun)
        endAll(
          failed('crashed', 'The part of the program that reads the file for its SHA-256 stopped.'),
        );
    });
    worker = begun;
    return begun;
  };

  return {
    hash: (blob, { signal, heard } = {}) =>
      new Promise((resolve) => {
        if (signal?.aborted) {
          resolve(stoppedReply());
          return;
        }
        lastJob += 1;
        const job = lastJob;
        const post = (request: HashRequest) => running().postMessage(request);
        const abort = () => {
          if (open.has(job)) post({ kind: 'cancel', job });
        };
        signal?.addEventListener('abort', abort, { once: true });
        const end = (reply: Reply<string>) => {
          signal?.removeEventListener('abort', abort);
          resolve(reply);
        };
        open.set(job, { end, heard });
        post({ kind: 'hash', job, blob });
      }),
    close: () => endAll(stoppedReply()),
  };
}
