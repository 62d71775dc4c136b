import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { crc32 } from '../../src/export/crc32';
import { storedZip } from '../../src/export/stored-zip';

/** Made by test/reference/stored_zip.py with Python's zipfile and zlib. */
const reference: {
  readonly files: readonly { readonly name: string; readonly text: string }[];
  readonly zip_hex: string;
  readonly crc32: readonly { readonly text: string; readonly crc32: number }[];
} = JSON.parse(readFileSync('test/reference/stored_zip.json', 'utf8'));

describe('the zip of all files', () => {
  it('is the same, byte by byte, as one by Python’s zipfile with stored files and the earliest date', () => {
    const bytes = storedZip(reference.files.map(({ name, text }) => ({ name, content: text })));
    expect(Buffer.from(bytes).toString('hex')).toBe(reference.zip_hex);
  });
  it('checks its files by the CRC-32 that zlib computes', () => {
    for (const { text, crc32: expected } of reference.crc32)
      expect(crc32(new TextEncoder().encode(text))).toBe(expected);
  });
});
