import { createSHA256 } from 'hash-wasm';
import { readBytes } from './file-bytes';

const MEGABYTE = 1024 * 1024;

/**
 * A key that finds a study again at once, as 64 hexadecimal digits: SHA-256 over the size in bytes (decimal, with a line
 * feed), the first megabyte (which holds every format's header) and the last. It does not prove that two files are equal.
 * Throws a Refusal where the file cannot be read.
 */
export async function quickKey(file: Blob, fileName = 'the file'): Promise<string> {
  const hash = await createSHA256();
  hash.update(`${file.size}\n`);
  hash.update(await readBytes(file, fileName, 0, MEGABYTE));
  hash.update(await readBytes(file, fileName, Math.max(0, file.size - MEGABYTE), file.size));
  return hash.digest('hex');
}
