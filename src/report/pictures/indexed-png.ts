import { crc32 } from '../../export/crc32';

const SIGNATURE = [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a];
const MOST_STORED = 0xffff;

/**
 * A PNG of one byte a pixel (row after row from the top, indexes into a palette of up to 256 RGB triples; index 0 is clear),
 * its data stored without deflating so that the same pixels give the same bytes everywhere. W3C PNG (third edition).
 * Throws RangeError where the pixels do not fill width times height.
 */
export function indexedPng(
  pixels: Uint8Array,
  width: number,
  height: number,
  palette: readonly (readonly [number, number, number])[],
): Uint8Array {
  if (pixels.length !== width * height || width < 1 || height < 1)
    throw new RangeError('pixels want to fill width times height');
  const header = [...bytes32(width), ...bytes32(height), 8, 3, 0, 0, 0];
  const parts = [
    Uint8Array.from(SIGNATURE),
    chunk('IHDR', Uint8Array.from(header)),
    chunk('PLTE', Uint8Array.from(palette.flat())),
    chunk('tRNS', Uint8Array.of(0)),
    chunk('IDAT', storedStream(withFilterBytes(pixels, width, height))),
    chunk('IEND', new Uint8Array(0)),
  ];
  return joinBytes(parts);
}

const bytes32 = (value: number): readonly number[] => [
  value >>> 24,
  (value >>> 16) & 255,
  (value >>> 8) & 255,
  value & 255,
];

function chunk(name: string, data: Uint8Array): Uint8Array {
  const named = joinBytes([Uint8Array.from(name, (letter) => letter.charCodeAt(0)), data]);
  return joinBytes([
    Uint8Array.from(bytes32(data.length)),
    named,
    Uint8Array.from(bytes32(crc32(named))),
  ]);
}

function withFilterBytes(pixels: Uint8Array, width: number, height: number): Uint8Array {
  const rows = new Uint8Array((width + 1) * height);
  for (let y = 0; y < height; y += 1)
    rows.set(pixels.subarray(y * width, (y + 1) * width), y * (width + 1) + 1);
  return rows;
}

/** A zlib stream (RFC 1950) of stored blocks (RFC 1951). */
function storedStream(data: Uint8Array): Uint8Array {
  const parts: Uint8Array[] = [Uint8Array.of(0x78, 0x01)];
  for (let from = 0; from < data.length; from += MOST_STORED) {
    const block = data.subarray(from, from + MOST_STORED);
    const last = from + MOST_STORED >= data.length ? 1 : 0;
    const { length } = block;
    parts.push(
      Uint8Array.of(last, length & 255, length >>> 8, ~length & 255, (~length >>> 8) & 255),
      block,
    );
  }
  return joinBytes([...parts, Uint8Array.from(bytes32(adler32(data)))]);
}

function adler32(data: Uint8Array): number {
  let a = 1;
  let b = 0;
  for (const byte of data) {
    a = (a + byte) % 65521;
    b = (b + a) % 65521;
  }
  return b * 65536 + a;
}

function joinBytes(parts: readonly Uint8Array[]): Uint8Array {
  const out = new Uint8Array(parts.reduce((sum, part) => sum + part.length, 0));
  let at = 0;
  for (const part of parts) {
    out.set(part, at);
    at += part.length;
  }
  return out;
}
