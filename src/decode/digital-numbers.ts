/** Bytes of one sample: 2 in EDF (Kemp 1992), 3 in BDF. */
export type SampleBytes = 2 | 3;

/**
 * Digital numbers of consecutive samples, little-endian two's complement, as is every machine that runs this. 16-bit samples
 * are looked at where they lie, 24-bit ones are copied; bytes after the last whole sample are left out.
 */
export function digitalNumbers(
  bytes: Uint8Array<ArrayBuffer>,
  sampleBytes: SampleBytes,
): Int16Array | Int32Array {
  const count = Math.floor(bytes.length / sampleBytes);
  if (sampleBytes === 2) return new Int16Array(bytes.buffer, bytes.byteOffset, count);
  const numbers = new Int32Array(count);
  for (let i = 0, at = 0; i < count; i += 1, at += 3)
    numbers[i] = bytes[at] | (bytes[at + 1] << 8) | ((bytes[at + 2] << 24) >> 8);
  return numbers;
}
