import { describe, expect, it } from 'vitest';
import { heartHalfWidths } from '../../src/heart/half-widths';
import { createRandom } from '../../src/numeric/random';
import { numberFigure } from '../../src/recording/figure';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';

const SD_MS = 40;
const MEAN_MS = 800;
const SEGMENT_S = 300;

/** Intervals that know nothing of one another: white, normal. */
function whiteSeries(seconds: number) {
  const random = createRandom(3);
  const rrMs: number[] = [];
  const timesS: number[] = [];
  for (let t = 0; ; ) {
    const rr = MEAN_MS + SD_MS * random.gaussian();
    t += rr / 1000;
    if (t > seconds) break;
    rrMs.push(rr);
    timesS.push(t);
  }
  return {
    timesS: Float64Array.from(timesS),
    rrMs: Float64Array.from(rrMs),
    nn: new Uint8Array(rrMs.length).fill(1),
  };
}

const partOf = (seconds: number) => ({
  rr: whiteSeries(seconds),
  part: { name: 'fed', fromS: 0, toS: seconds },
  segments: Array.from({ length: seconds / SEGMENT_S }, (_, k) => ({
    phase: 'fed',
    fromS: k * SEGMENT_S,
    toS: (k + 1) * SEGMENT_S,
    nnShare: 1,
    state: 'used' as const,
    sdnnMs: SD_MS,
    lfMs2: 1,
    hfMs2: 1,
  })),
  settings: DEFAULT_SETTINGS.variability,
});

describe('the half-width of the range of a heart figure', () => {
  it('is that of theory where intervals know nothing of one another', () => {
    const from = partOf(3600);
    const n = from.rr.rrMs.length;
    const widths = heartHalfWidths(from, {});
    // Standard errors of mean and SD of a normal sample (any textbook of statistics): sd / sqrt(n), sd / sqrt(2 n).
    const meanMs = (1.96 * SD_MS) / Math.sqrt(n);
    expect(Math.abs(widths.heart_rate_bpm / ((60000 / MEAN_MS ** 2) * meanMs) - 1)).toBeLessThan(
      0.3,
    );
    expect(Math.abs(widths.sdnn_ms / ((1.96 * SD_MS) / Math.sqrt(2 * n)) - 1)).toBeLessThan(0.3);
    // Successive differences of white intervals share one each: the variance of their mean square is 3 sd^4 x 4 / n.
    const rmssd = Math.SQRT2 * SD_MS;
    const meanSquare = Math.sqrt((12 * SD_MS ** 4) / n);
    expect(Math.abs(widths.rmssd_ms / ((1.96 * meanSquare) / (2 * rmssd)) - 1)).toBeLessThan(0.3);
  });

  it('of a power falls with the square root of bandwidth and time', () => {
    const figures = { lf_ms2: numberFigure(500), hf_ms2: numberFigure(500) };
    const widths = heartHalfWidths(partOf(3600), figures);
    expect(widths.lf_ms2).toBeCloseTo((1.96 * 500) / Math.sqrt(0.11 * 3600), 2);
    expect(widths.hf_ms2).toBeCloseTo((1.96 * 500) / Math.sqrt(0.25 * 3600), 2);
  });

  it('is not told of a part too short for it', () => {
    const widths = heartHalfWidths(partOf(0), {});
    expect(widths).toEqual({});
  });
});
