import { inflateSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { indexedPng } from '../../src/report/pictures/indexed-png';
import { escapeXml, pathThrough, timeAxis } from '../../src/report/pictures/svg';
import { niceBar, wavePicture } from '../../src/report/pictures/wave-picture';

describe('pictures of the printed page', () => {
  it('the PNG is one that zlib and the PNG layout of the W3C agree with', () => {
    const pixels = Uint8Array.from({ length: 300 * 250 }, (_, i) => i % 7);
    const png = Buffer.from(
      indexedPng(pixels, 300, 250, [
        [0, 0, 0],
        [255, 0, 0],
      ]),
    );
    expect(png.subarray(1, 4).toString('ascii')).toBe('PNG');
    const chunks = new Map<string, Buffer>();
    for (let at = 8; at < png.length; ) {
      const length = png.readUInt32BE(at);
      chunks.set(
        png.subarray(at + 4, at + 8).toString('ascii'),
        png.subarray(at + 8, at + 8 + length),
      );
      at += 12 + length;
    }
    expect([...chunks.keys()]).toEqual(['IHDR', 'PLTE', 'tRNS', 'IDAT', 'IEND']);
    expect(chunks.get('IHDR')?.readUInt32BE(0)).toBe(300);
    const rows = inflateSync(chunks.get('IDAT') ?? Buffer.alloc(0));
    expect(rows.length).toBe(301 * 250);
    expect([...rows.subarray(301, 311)]).toEqual([0, ...pixels.subarray(300, 309)]);
  });

  it('a chunk’s checksum is the CRC of RFC 1952: that of IEND is AE426082', () => {
    const png = indexedPng(Uint8Array.of(0), 1, 1, [[0, 0, 0]]);
    expect([...png.subarray(-4)]).toEqual([0xae, 0x42, 0x60, 0x82]);
  });

  it('a gap breaks the line instead of being drawn across', () => {
    expect(
      pathThrough([
        [0, 1],
        [1, 2],
        [2, Number.NaN],
        [3, 4],
      ]),
    ).toBe('M0 1L1 2M3 4');
  });

  it('text from a file is text in a picture', () => {
    expect(escapeXml('<b onclick="x">&')).toBe('&lt;b onclick=&quot;x&quot;&gt;&amp;');
  });

  it('the wave’s bar is a round number no taller than half the picture', () => {
    expect([3, 49, 50, 180].map(niceBar)).toEqual([2, 20, 50, 100]);
    const svg = wavePicture({ timesS: [0, 10], low: [-40, 40], high: [-40, 40] }, 'fed', 0, 10, 50);
    expect(svg).toContain('50 µV');
  });

  it('the time axis of a study of hours writes hours and minutes', () => {
    expect(timeAxis(0, 5400, 10)).toContain('>0:30<');
  });
});
