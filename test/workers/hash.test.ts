import { createHash, randomBytes } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import type { HashNews, HashRequest } from '../../workers/hash-api';
import { hashBlob } from '../../workers/hash-blob';
import { createHashClient } from '../../workers/hash-client';

const never = () => false;
const quiet = () => undefined;

describe('hashing a blob by slices', () => {
  it('gives the SHA-256 of FIPS 180-4 for "abc" and for nothing', async () => {
    // Check values of FIPS 180-4 as given in NIST's example for SHA-256 ("abc") and of the empty message (from memory).
    expect(await hashBlob(new Blob(['abc']), quiet, never)).toBe(
      'ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad',
    );
    expect(await hashBlob(new Blob([]), quiet, never)).toBe(
      'e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855',
    );
  });

  it('agrees with node:crypto over several slices and hears how far it is', async () => {
    const bytes = randomBytes(9 * 1024 * 1024 + 17);
    const heard: number[] = [];
    const sha256 = await hashBlob(new Blob([bytes]), (done) => heard.push(done), never);
    expect(sha256).toBe(createHash('sha256').update(bytes).digest('hex'));
    expect(heard).toHaveLength(3);
    expect(heard.at(-1)).toBe(1);
  });

  it('stops when asked to', async () => {
    const blob = new Blob([new Uint8Array(9 * 1024 * 1024)]);
    let slices = 0;
    const hashing = hashBlob(
      blob,
      () => {
        slices += 1;
      },
      () => slices === 1,
    );
    await expect(hashing).rejects.toMatchObject({ failure: { kind: 'cancelled' } });
    expect(slices).toBe(1);
  });

  it('says that the file cannot be read any more', async () => {
    const blob = new Blob(['abc']);
    blob.slice = () => {
      throw new DOMException('gone', 'NotReadableError');
    };
    await expect(hashBlob(blob, quiet, never)).rejects.toMatchObject({
      failure: { kind: 'unreadable', place: 'byte 0' },
    });
  });
});

/** Stands for a worker: keeps what it is sent, and says what the test tells it to. */
class Ear extends EventTarget {
  readonly sent: HashRequest[] = [];
  ended = false;
  postMessage(request: HashRequest) {
    this.sent.push(request);
  }
  terminate() {
    this.ended = true;
  }
  say(news: HashNews) {
    this.dispatchEvent(new MessageEvent('message', { data: news }));
  }
}

describe('the page’s side', () => {
  const client = () => {
    const ears: Ear[] = [];
    const made = createHashClient(() => {
      const ear = new Ear();
      ears.push(ear);
      return ear as unknown as Worker;
    });
    return { made, ears };
  };

  it('passes on progress and the end of its own job only', async () => {
    const { made, ears } = client();
    const heard: number[] = [];
    const reply = made.hash(new Blob(['a']), { heard: (done) => heard.push(done) });
    ears[0].say({ kind: 'progress', job: 1, done: 0.5 });
    ears[0].say({ kind: 'ended', job: 9, reply: { ok: true, value: 'other' } });
    ears[0].say({ kind: 'ended', job: 1, reply: { ok: true, value: 'mine' } });
    expect(await reply).toEqual({ ok: true, value: 'mine' });
    expect(heard).toEqual([0.5]);
  });

  it('sends a cancel by job number when its signal is aborted', () => {
    const { made, ears } = client();
    const stop = new AbortController();
    void made.hash(new Blob(['a']), { signal: stop.signal });
    stop.abort();
    expect(ears[0].sent[1]).toEqual({ kind: 'cancel', job: 1 });
  });

  it('ends open calls when the worker crashes, and starts another for the next', async () => {
    const { made, ears } = client();
    const reply = made.hash(new Blob(['a']));
    ears[0].dispatchEvent(new Event('error'));
    expect(await reply).toMatchObject({ ok: false, failure: { kind: 'crashed' } });
    expect(ears[0].ended).toBe(true);
    void made.hash(new Blob(['b']));
    expect(ears).toHaveLength(2);
  });

  it('ends open calls as cancelled when closed', async () => {
    const { made } = client();
    const reply = made.hash(new Blob(['a']));
    made.close();
    expect(await reply).toMatchObject({ ok: false, failure: { kind: 'cancelled' } });
  });
});
