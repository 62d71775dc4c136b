import { createHash } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { quickKey } from '../../src/decode/quick-key';

const MEGABYTE = 1024 * 1024;
const bytes = Uint8Array.from({ length: 3 * MEGABYTE }, (_, i) => (i * 31) % 251);

describe('the quick key', () => {
  it('is SHA-256 (node:crypto) over size, first and last megabyte', async () => {
    const expected = createHash('sha256')
      .update(`${bytes.length}\n`)
      .update(bytes.subarray(0, MEGABYTE))
      .update(bytes.subarray(2 * MEGABYTE))
      .digest('hex');
    expect(await quickKey(new Blob([bytes]))).toBe(expected);
  });

  it('changes with size, start and end, not with the middle', async () => {
    const key = await quickKey(new Blob([bytes]));
    const changed = (at: number) => {
      const copy = bytes.slice();
      copy[at] ^= 1;
      return quickKey(new Blob([copy]));
    };
    expect(await changed(0)).not.toBe(key);
    expect(await changed(bytes.length - 1)).not.toBe(key);
    expect(await changed(1.5 * MEGABYTE)).toBe(key);
    expect(await quickKey(new Blob([bytes, bytes.subarray(2 * MEGABYTE)]))).not.toBe(key);
  });

  it('exists for small and empty files', async () => {
    expect(await quickKey(new Blob([]))).toMatch(/^[0-9a-f]{64}$/);
    expect(await quickKey(new Blob(['a']))).not.toBe(await quickKey(new Blob(['b'])));
  });
});
