import { readBytes } from './file-bytes';

const MEGABYTE = 1024 * 1024;

/**
 * A key that finds a study again at once, as 64 hexadecimal digits: SHA-256 over the size in bytes (decimal, with a line
 * feed), the first megabyte (which holds every format's header) and the last. It does not prove that two files are equal.
 * Throws a Refusal where the file cannot be read.
 */
export async function quickKey(file: Blob, fileName = 'the file'): Promise<string> {
  const parts = [
    new TextEncoder().encode(`${file.size}\n`),
    await readBytes(file, fileName, 0, MEGABYTE),
    await readBytes(file, fileName, Math.max(0, file.size - MEGABYTE), file.size),
  ];
  return sha256(new Uint8Array(await new Blob(parts).arrayBuffer()));
}

/** SHA-256 by the browser's own code; where it has none (a page served without https), by a library fetched for it. */
async function sha256(bytes: Uint8Array<ArrayBuffer>): Promise<string> {
  const subtle: SubtleCrypto | undefined = globalThis.crypto?.subtle;
  if (!subtle) {
    const library = await import('hash-wasm');
    return library.sha256(bytes);
  }
  const digest = new Uint8Array(await subtle.digest('SHA-256', bytes));
  return Array.from(digest, (byte) => byte.toString(16).padStart(2, '0')).join('');
}
