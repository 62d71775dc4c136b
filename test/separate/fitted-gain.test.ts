import { describe, expect, it } from 'vitest';
import { fittedGain, gainTaps } from '../../src/separate/fitted-gain';
import { leadBackground } from '../../src/separate/lead-background';

const SIZE = 4096;
const BIN_CPM = (60 * 4) / SIZE;
const cpmOf = (k: number) => k * BIN_CPM;
const bins = SIZE / 2 + 1;

/** A background of 1/f with lines: [cpm, height over the background]. */
function spectrum(lines: readonly (readonly [number, number])[]): Float64Array {
  return Float64Array.from({ length: bins }, (_, k) => {
    const cpm = Math.max(BIN_CPM, cpmOf(k));
    const background = 1000 / cpm;
    return lines.reduce(
      (sum, [at, over]) => sum + over * (1000 / at) * Math.exp(-(((cpm - at) / 0.2) ** 2)),
      background,
    );
  });
}
const spectraOf = (density: Float64Array) => ({
  windows: [density],
  mean: density,
  binCpm: BIN_CPM,
  size: SIZE,
});
const at = (values: Float64Array, cpm: number) => values[Math.round(cpm / BIN_CPM)];

describe("a lead's background", () => {
  it('is what lies beneath its lines', () => {
    const background = leadBackground(
      spectraOf(
        spectrum([
          [3, 500],
          [6, 40],
          [13, 900],
        ]),
      ),
    );
    for (const cpm of [0.8, 1.5, 3, 6, 9, 13])
      expect(at(background, cpm) / (1000 / cpm)).toBeCloseTo(1, 1);
  });
});

describe('the gain fitted to a lead', () => {
  it('is that of the best linear filter, signal over signal and background (Wiener 1949)', () => {
    const gain = fittedGain(spectraOf(spectrum([[3, 4]])), 10);
    expect(at(gain, 3)).toBeCloseTo(4 / 5, 1);
    expect(at(gain, 3.2)).toBeCloseTo(4 / Math.E / (4 / Math.E + 1), 1);
  });

  it('lowers what does not stand out to a tenth, and takes nothing in the band away', () => {
    const gain = fittedGain(spectraOf(spectrum([[3, 100]])), 10);
    expect(at(gain, 5)).toBe(0.1);
    expect(gain.slice(0, Math.floor(10 / BIN_CPM)).every((one) => one >= 0.1)).toBe(true);
  });

  it("keeps a tachygastria's harmonic above the band, and breathing beside it out", () => {
    const gain = fittedGain(
      spectraOf(
        spectrum([
          [5.5, 400],
          [11, 60],
          [14, 400],
        ]),
      ),
      10,
    );
    expect(at(gain, 11)).toBeGreaterThan(0.9);
    expect(at(gain, 14)).toBe(0);
  });

  it('does not take breathing at 12 a minute for the fourth harmonic of 3 cpm', () => {
    const gain = fittedGain(
      spectraOf(
        spectrum([
          [3, 400],
          [6, 150],
          [12, 800],
        ]),
      ),
      10,
    );
    expect(at(gain, 6)).toBeGreaterThan(0.9);
    expect(at(gain, 12)).toBe(0);
  });

  it('becomes zero-phase taps whose response is the gain', () => {
    const gain = fittedGain(spectraOf(spectrum([[3, 50]])), 10);
    const taps = gainTaps(gain, SIZE, 480);
    expect(taps).toHaveLength(961);
    const response = (cpm: number) =>
      taps.reduce(
        (sum, tap, i) => sum + tap * Math.cos(2 * Math.PI * (cpm / 60) * ((i - 480) / 4)),
        0,
      );
    for (const cpm of [3, 5, 8]) expect(Math.abs(response(cpm) - at(gain, cpm))).toBeLessThan(0.08);
    for (let i = 0; i < 480; i += 1) expect(taps[i]).toBe(taps[960 - i]);
  });
});
