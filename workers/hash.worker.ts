import { Refusal, type Reply } from '../src/recording/failure';
import type { JobId } from './analysis-api';
import type { HashNews, HashRequest } from './hash-api';
import { hashBlob } from './hash-blob';

const page = self as unknown as DedicatedWorkerGlobalScope;
const stopped = new Set<JobId>();

async function run(job: JobId, blob: Blob): Promise<Reply<string>> {
  try {
    const heard = (done: number) => tell({ kind: 'progress', job, done });
    return { ok: true, value: await hashBlob(blob, heard, () => stopped.has(job)) };
  } catch (error) {
    if (error instanceof Refusal) return { ok: false, failure: error.failure };
    const failure = {
      kind: 'internal',
      message: `The SHA-256 of the file could not be made: ${String(error)}`,
      place: null,
      remedy: 'Open the study again to confirm it.',
    } as const;
    return { ok: false, failure };
  } finally {
    stopped.delete(job);
  }
}

const tell = (news: HashNews) => page.postMessage(news);

page.addEventListener('message', ({ data }: MessageEvent<HashRequest>) => {
  if (data.kind === 'cancel') stopped.add(data.job);
  else void run(data.job, data.blob).then((reply) => tell({ kind: 'ended', job: data.job, reply }));
});
