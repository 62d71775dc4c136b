import * as Comlink from 'comlink';
import { afterEach, describe, expect, it } from 'vitest';
import type { Failure } from '../../src/recording/failure';
import type { AnalysisApi, Opened, WorkerNews } from '../../workers/analysis-api';
import { type AnalysisClient, createAnalysisClient } from '../../workers/analysis-client';

/** A worker over a message channel in this process, as far as the client sees one. */
class ChannelWorker extends EventTarget {
  readonly far: MessagePort;
  private readonly near: MessagePort;
  constructor() {
    super();
    const { port1, port2 } = new MessageChannel();
    this.near = port1;
    this.far = port2;
    port1.addEventListener('message', ({ data }) =>
      this.dispatchEvent(new MessageEvent('message', { data })),
    );
    port1.start();
  }
  postMessage(message: unknown, transfer: Transferable[] = []): void {
    this.near.postMessage(message, transfer);
  }
  terminate(): void {
    this.near.close();
  }
}

const BROKEN: Failure = { kind: 'broken-format', message: 'no', place: null, remedy: '' };

interface Seen {
  readonly opened: string[];
  accepted: number;
  cancelled: number[];
  tell: (news: WorkerNews) => void;
  end: (() => void) | null;
}

const clients: AnalysisClient[] = [];
afterEach(() => {
  for (const client of clients.splice(0)) client.close();
});

function serve(speaks: boolean) {
  const workers: ChannelWorker[] = [];
  const seen: Seen = { opened: [], accepted: 0, cancelled: [], tell: () => undefined, end: null };
  let restarts = 0;
  const start = (): Worker => {
    const worker = new ChannelWorker();
    const api: Partial<AnalysisApi> = {
      listen: (ear) => {
        seen.tell = ear;
        if (speaks) ear({ kind: 'alive' });
      },
      open: async (ticket, _file, fileName) => {
        seen.opened.push(fileName);
        if (fileName === 'broken.edf') return { ok: false, failure: BROKEN };
        return { ok: true, value: { ticket } as Opened };
      },
      accept: () => {
        seen.accepted += 1;
        return true;
      },
      demo: () =>
        new Promise((resolve) => {
          seen.end = () => resolve({ ok: true, value: new Blob(['x']) });
        }),
      cancel: (job) => {
        seen.cancelled.push(job);
      },
    };
    Comlink.expose(api, worker.far as unknown as Comlink.Endpoint);
    workers.push(worker);
    return worker as unknown as Worker;
  };
  const client = createAnalysisClient(start, () => {
    restarts += 1;
  });
  clients.push(client);
  const crash = () => workers.at(-1)?.dispatchEvent(new Event('error'));
  return { client, seen, workers, crash, restarts: () => restarts };
}

const until = async (true_: () => boolean) => {
  for (let i = 0; i < 400 && !true_(); i += 1)
    await new Promise((resolve) => setTimeout(resolve, 5));
  expect(true_()).toBe(true);
};

describe('the page’s side of the worker', () => {
  it('a refusal comes back as a reply, not as an error', async () => {
    const { client } = serve(true);
    const reply = await client.open(new Blob(), 'broken.edf', null);
    expect(reply).toMatchObject({ ok: false, failure: { kind: 'broken-format' } });
  });

  it('a crash answers every open call, and the accepted file is opened again', async () => {
    const { client, seen, crash, restarts, workers } = serve(true);
    const opened = await client.open(new Blob(), 'a.edf', null);
    expect(opened.ok && (await client.accept(opened.value.ticket))).toBe(true);
    const call = client.demo();
    await until(() => seen.end !== null);
    crash();
    expect(await call).toMatchObject({ ok: false, failure: { kind: 'crashed' } });
    await until(() => restarts() === 1);
    expect(seen.opened).toEqual(['a.edf', 'a.edf']);
    expect(seen.accepted).toBe(2);
    expect(workers).toHaveLength(2);
  });

  it('of two files opened quickly, the one agreed to is the one in use, also after a crash', async () => {
    const { client, seen, crash, restarts } = serve(true);
    const [a] = await Promise.all([
      client.open(new Blob(), 'a.edf', null),
      client.open(new Blob(), 'b.edf', null),
    ]);
    expect(a.ok && (await client.accept(a.value.ticket))).toBe(true);
    crash();
    await until(() => restarts() === 1);
    expect(seen.opened.at(-1)).toBe('a.edf');
  });

  it('a study opened before a crash and not agreed to is not taken for another', async () => {
    const { client, crash, restarts } = serve(true);
    const opened = await client.open(new Blob(), 'a.edf', null);
    crash();
    await until(() => restarts() === 1);
    expect(opened.ok && (await client.accept(opened.value.ticket))).toBe(false);
  });

  it('stopping goes by the job’s number; progress reaches the one who asked', async () => {
    const { client, seen } = serve(true);
    const stop = new AbortController();
    const heard: number[] = [];
    const call = client.demo({ signal: stop.signal, onProgress: (_, done) => heard.push(done) });
    await until(() => seen.end !== null);
    seen.tell({ kind: 'progress', job: 1, step: 'making', done: 0.25 });
    seen.tell({ kind: 'progress', job: 99, step: 'making', done: 0.5 });
    await until(() => heard.length > 0);
    stop.abort();
    await until(() => seen.cancelled.length === 1);
    expect(seen.cancelled).toEqual([1]);
    expect(heard).toEqual([0.25]);
    seen.end?.();
    expect(await call).toMatchObject({ ok: true });
  });

  it('a worker that never starts is not started for ever, and every call says so', async () => {
    const { client, crash, workers } = serve(false);
    const call = client.demo();
    for (let i = 0; i < 5; i += 1) crash();
    expect(await call).toMatchObject({ ok: false, failure: { kind: 'crashed' } });
    expect(workers).toHaveLength(3);
    const later = await client.open(new Blob(), 'a.edf', null);
    expect(!later.ok && later.failure.message).toContain('cannot be started');
  });
});
