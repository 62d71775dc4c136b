const LETTERS = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/';

/** Bytes as base64 with padding (RFC 4648), the same in page and command line. */
export function base64(bytes: Uint8Array): string {
  const out: string[] = [];
  for (let i = 0; i < bytes.length; i += 3) {
    const left = bytes.length - i;
    const three =
      (bytes[i] << 16) | ((left > 1 ? bytes[i + 1] : 0) << 8) | (left > 2 ? bytes[i + 2] : 0);
    const sixes = [three >>> 18, (three >>> 12) & 63, (three >>> 6) & 63, three & 63];
    out.push(sixes.map((six, place) => (place > left ? '=' : LETTERS[six])).join(''));
  }
  return out.join('');
}
