/** Remainders of the 256 byte values by the reversed polynomial of ISO 3309 (0xEDB88320). */
const TABLE = Uint32Array.from({ length: 256 }, (_, value) => {
  let remainder = value;
  for (let bit = 0; bit < 8; bit += 1)
    remainder = remainder & 1 ? 0xedb88320 ^ (remainder >>> 1) : remainder >>> 1;
  return remainder >>> 0;
});

/** CRC-32 of ISO 3309 / ITU-T V.42, as zip and PNG use it; an unsigned 32-bit number. */
export function crc32(bytes: Uint8Array): number {
  let remainder = 0xffffffff;
  for (const byte of bytes) remainder = TABLE[(remainder ^ byte) & 0xff] ^ (remainder >>> 8);
  return (remainder ^ 0xffffffff) >>> 0;
}
