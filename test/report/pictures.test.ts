import { inflateSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { base64 } from '../../src/report/pictures/base64';
import { indexedPng } from '../../src/report/pictures/indexed-png';
import {
  escapeXml,
  hatched,
  PICTURE_WIDTH,
  pathThrough,
  timeAxis,
  timeScale,
} from '../../src/report/pictures/svg';

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

  it('bytes become base64 as RFC 4648 has it', () => {
    const bytes = Uint8Array.from({ length: 257 }, (_, i) => (i * 7) % 256);
    for (const length of [0, 1, 2, 3, 256, 257])
      expect(base64(bytes.subarray(0, length))).toBe(
        Buffer.from(bytes.subarray(0, length)).toString('base64'),
      );
  });

  it('the time axis of a study of hours writes hours and minutes, of minutes seconds too', () => {
    expect(timeAxis(timeScale(0, 5400), 10)).toContain('>0:30<');
    expect(timeAxis(timeScale(780, 1020), 10)).toContain('>0:14:00<');
  });

  it('no label of the time axis reaches past the picture, at either end and for any length', () => {
    const letterWidth = 6.4;
    for (const durationS of [120, 240, 5400, 7200, 86400]) {
      const labels = [
        ...timeAxis(timeScale(0, durationS), 10).matchAll(/<text x="([\d.]+)".*?>([^<]+)</g),
      ];
      expect(labels.length).toBeGreaterThan(2);
      for (const [, x, text] of labels)
        expect(Number(x) + (letterWidth * text.length) / 2).toBeLessThanOrEqual(PICTURE_WIDTH);
    }
  });

  it('hatching stays inside its stretch, and one outside the plot is not drawn', () => {
    const scale = timeScale(0, 100, 0, 100);
    const svg = hatched([{ fromS: 40, toS: 60 }], scale, 10, 50);
    const points = [...svg.matchAll(/[ML]([\d.]+) ([\d.]+)/g)].map(([, x, y]) => [
      Number(x),
      Number(y),
    ]);
    expect(points.length).toBeGreaterThan(10);
    for (const [x, y] of points) {
      expect(x >= 40 && x <= 60).toBe(true);
      expect(y >= 10 && y <= 50).toBe(true);
    }
    expect(hatched([{ fromS: 120, toS: 140 }], scale, 10, 50)).toBe('');
  });
});
