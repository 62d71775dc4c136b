import { describe, expect, it } from 'vitest';
import type { Epoch } from '../../src/recording/rhythm';
import { crestsPerMinute } from '../../src/review/crest-counts';
import { dfPieces } from '../../src/review/df-line';
import { heartRateLine, rateColumns, rateLimits } from '../../src/review/heart-rate';
import { ratePath } from '../../src/review/rate-path';
import { missingStretches, spectrogramRuns, usualStep } from '../../src/review/spectrogram-image';
import { joinedBlocks, stomachBlocks } from '../../src/review/stomach-blocks';

const epoch = (fromS: number, parts: Partial<Epoch> = {}): Epoch => ({
  lead: '#1',
  phase: 'fasting',
  fromS,
  toS: fromS + 240,
  kept: true,
  spoiledFraction: 0,
  dfCpm: 3,
  dpDb: 40,
  peakShare: 0.5,
  rhythm: 'normo',
  flags: [],
  ...parts,
});

describe('crests counted by eye', () => {
  it('gives three a minute for a wave of three cycles a minute', () => {
    const crests = Array.from({ length: 60 }, (_, i) => 5 + 20 * i);
    const counts = crestsPerMinute(crests, { fromS: 30, toS: 400 }, 1200, []);
    expect(counts.map((one) => one.atS)).toEqual([90, 150, 210, 270, 330]);
    expect(counts.every((one) => one.count === 3)).toBe(true);
  });

  it('leaves out minutes that the filter could not fill cleanly', () => {
    const counts = crestsPerMinute([70], { fromS: 0, toS: 180 }, 180, [{ fromS: 0, toS: 50 }]);
    expect(counts).toEqual([
      { atS: 90, count: 1 },
      { atS: 150, count: 0 },
    ]);
  });

  it('does not count a minute that the study cuts off', () => {
    expect(crestsPerMinute([5], { fromS: 0, toS: 120 }, 90, []).map((one) => one.atS)).toEqual([
      30,
    ]);
  });
});

describe('the DF line', () => {
  it('runs through kept epochs with a rhythm and breaks where there is none', () => {
    const epochs = [
      epoch(0),
      epoch(60),
      epoch(120, { rhythm: 'none' }),
      epoch(180),
      epoch(240, { kept: false, dfCpm: null, rhythm: null }),
      epoch(300, { rhythm: 'undecided' }),
      epoch(360),
    ];
    const centres = dfPieces(epochs, 60).map((piece) => piece.map((point) => point.atS));
    expect(centres).toEqual([[120, 180], [300], [480]]);
  });

  it('is not drawn across the border of a phase', () => {
    const pieces = dfPieces([epoch(0), epoch(60, { phase: 'meal' })], 60);
    expect(pieces).toHaveLength(2);
  });

  it('marks flags that act and mixed epochs, not filled ones', () => {
    const [piece] = dfPieces(
      [
        epoch(0, { flags: ['filled'] }),
        epoch(60, { flags: ['harmonic'] }),
        epoch(120, { rhythm: 'mixed' }),
      ],
      60,
    );
    expect(piece.map((point) => point.flagged)).toEqual([false, true, true]);
  });
});

describe('the stomach row', () => {
  it('has one block an epoch at its centre and says what is not kept', () => {
    const blocks = stomachBlocks(
      [epoch(0), epoch(60, { kept: false }), epoch(120, { rhythm: 'brady' })],
      60,
    );
    expect(blocks.map((one) => [one.fromS, one.toS, one.kind])).toEqual([
      [90, 150, 'normo'],
      [150, 210, 'spoiled'],
      [210, 270, 'brady'],
    ]);
  });

  it('joins equal neighbours but not across a hole', () => {
    const blocks = stomachBlocks([epoch(0), epoch(60), epoch(300)], 60);
    expect(joinedBlocks(blocks).map((one) => [one.fromS, one.toS])).toEqual([
      [90, 210],
      [390, 450],
    ]);
  });
});

describe('the heart-rate line', () => {
  const rr = {
    timesS: Float64Array.of(1, 2, 3.5, 4.5),
    rrMs: Float64Array.of(1000, 1000, 1500, 1000),
    nn: Uint8Array.of(1, 1, 0, 1),
  };
  const drawnOf = (timesS: readonly number[], values: readonly number[], px: number) => {
    const drawn: string[] = [];
    const sink = {
      moveTo: (x: number) => void drawn.push(`M${Math.round(x)}`),
      lineTo: (x: number) => void drawn.push(`L${Math.round(x)}`),
    };
    const apartS = (i: number) => 60 / values[i] + 0.05;
    const window = { fromS: 0, toS: timesS[timesS.length - 1] };
    ratePath(sink, { timesS, values, apartS }, window, px, { x0: 0, perS: 10, y0: 0, perUv: 1 });
    return drawn;
  };

  it('is 60000 over NN and nothing elsewhere', () => {
    const { perMinute } = heartRateLine(rr);
    expect([...perMinute]).toEqual([60, 60, Number.NaN, 60]);
  });

  it('breaks at intervals that are not NN and where beats are missing between', () => {
    expect(drawnOf([1, 2, 3, 6, 7], [60, 60, 60, 60, 60], 100)).toEqual([
      'M10',
      'L20',
      'L30',
      'M60',
      'L70',
    ]);
    expect(drawnOf([1, 2, 3, 4], [60, 60, Number.NaN, 60], 100)).toEqual([
      'M10',
      'L20',
      'M39',
      'L41',
    ]);
  });

  it('turns to columns where many beats share a pixel', () => {
    const timesS = Array.from({ length: 4000 }, (_, i) => i);
    expect(
      drawnOf(
        timesS,
        timesS.map((t) => 60 + (t % 7)),
        50,
      ).length,
    ).toBeLessThan(110);
  });

  it('keeps every extreme when reduced to the strip', () => {
    const { low, high, mean } = rateColumns(heartRateLine(rr), 6, 3);
    expect([low[0], high[0], mean[0]]).toEqual([60, 60, 60]);
    expect(Number.isNaN(low[2])).toBe(false);
    const line = { timesS: Float64Array.of(1, 1.5), perMinute: Float32Array.of(50, 90) };
    const reduced = rateColumns(line, 4, 2);
    expect([reduced.low[0], reduced.high[0], reduced.mean[0]]).toEqual([50, 90, 70]);
    expect(Number.isNaN(reduced.mean[1])).toBe(true);
  });

  it('has round limits that hold the rates', () => {
    const limits = rateLimits(Array.from({ length: 100 }, (_, i) => 62 + (i % 12)));
    expect(limits).toEqual([60, 80]);
    expect(rateLimits([Number.NaN])).toBeNull();
    expect(rateLimits([14, 15, 14])).toEqual([10, 20]);
  });
});

describe('the spectrogram in time', () => {
  const spectrogram = {
    centresS: Float64Array.of(120, 180, 240, 500, 560),
    firstCpm: 1,
    stepCpm: 0.1,
    binCount: 2,
    levelDb: Float32Array.of(1, 1, Number.NaN, Number.NaN, Number.NaN, Number.NaN, 1, 1, 1, 1),
  };

  it('is drawn as one piece wherever columns follow at one step', () => {
    expect(spectrogramRuns(spectrogram)).toEqual([
      { first: 0, count: 3, fromS: 90, toS: 270 },
      { first: 3, count: 2, fromS: 470, toS: 590 },
    ]);
    expect(usualStep([5])).toBe(60);
  });

  it('hatches columns that are not kept', () => {
    expect(missingStretches(spectrogram)).toEqual([{ fromS: 150, toS: 270 }]);
  });
});
