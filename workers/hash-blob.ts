import { createSHA256 } from 'hash-wasm';
import { Refusal } from '../src/recording/failure';

/** Bytes read at a time: what reads well from disk and leaves no long pause between two looks at `stopped`. */
const SLICE_BYTES = 4 * 1024 * 1024;

/**
 * SHA-256 of a blob in hex, read slice by slice so that memory does not grow with the file. `heard` gets the share done (0
 * to 1) after each slice; where `stopped` says so, the reading ends with a Refusal of kind `cancelled`. Throws Refusal of kind
 * `unreadable` where the file cannot be read any more.
 */
export async function hashBlob(
  blob: Blob,
  heard: (done: number) => void,
  stopped: () => boolean,
): Promise<string> {
  const hash = await createSHA256();
  hash.init();
  for (let from = 0; from < blob.size; from += SLICE_BYTES) {
    const to = Math.min(blob.size, from + SLICE_BYTES);
    const bytes = await readSlice(blob, from, to);
    if (stopped()) throw cancelled();
    hash.update(bytes);
    heard(to / blob.size);
  }
  return hash.digest('hex');
}

async function readSlice(blob: Blob, from: number, to: number): Promise<Uint8Array> {
  try {
    return new Uint8Array(await blob.slice(from, to).arrayBuffer());
  } catch {
    throw new Refusal({
      kind: 'unreadable',
      message: 'The file changed or can no longer be read.',
      place: `byte ${from}`,
      remedy: 'Choose the same file again.',
    });
  }
}

const cancelled = () =>
  new Refusal({
    kind: 'cancelled',
    message: 'Reading the whole file for its SHA-256 was stopped.',
    place: null,
    remedy: 'Open the study again to confirm it.',
  });
