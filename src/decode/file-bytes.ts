import { refusal } from './refusals';

/**
 * Bytes [from, to) of a file, clipped to its size. Throws a Refusal of kind `unreadable` where the browser can no longer
 * read the file, and `out-of-memory` where the slice does not fit.
 */
export async function readBytes(
  file: Blob,
  fileName: string,
  from: number,
  to: number,
): Promise<Uint8Array<ArrayBuffer>> {
  try {
    return new Uint8Array(await file.slice(from, to).arrayBuffer());
  } catch (error) {
    if (error instanceof RangeError)
      throw refusal('out-of-memory', fileName, {
        message: `there is not enough memory to read bytes ${from} to ${to}.`,
        place: `byte ${from}`,
        remedy: 'Close other pages and open the file again.',
      });
    throw refusal('unreadable', fileName, {
      message: 'the file can no longer be read; it was changed, moved or its disk was taken out.',
      place: `byte ${from}`,
      remedy: 'Choose the same file again.',
    });
  }
}

/** Size of the slices that long files are read by, in bytes. */
export const SLICE_BYTES = 4 * 1024 * 1024;

/**
 * The results of `count` asynchronous reads in order, with two reads under way ahead of the one being used.
 * `read(i)` is called once for each i from 0 to count - 1; its rejection is thrown where its turn comes.
 */
export async function* readAhead<T>(
  count: number,
  read: (index: number) => Promise<T>,
): AsyncGenerator<T> {
  const underWay: Promise<T>[] = [];
  let next = 0;
  const start = () => {
    const promise = read(next);
    promise.catch(() => undefined);
    underWay.push(promise);
    next += 1;
  };
  while (next < Math.min(3, count)) start();
  for (let promise = underWay.shift(); promise; promise = underWay.shift()) {
    const value = await promise;
    if (next < count) start();
    yield value;
  }
}
