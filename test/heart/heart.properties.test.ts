import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { align, timerOf } from '../../src/heart/align';
import { detectBeats } from '../../src/heart/detect';
import { timeDomain } from '../../src/heart/variability';
import { lombBandPowers, welchBandPowers } from '../../src/heart/variability-spectrum';
import { largestDifference } from '../numeric/signals';
import { always, numbers, signals, times } from '../properties';
import { heartbeatOf } from './record208';
import { addBeats, addNoise, BIPHASIC, NARROW, planBeats } from './simulated-heart';

const all = (rrMs: Float64Array) => new Uint8Array(rrMs.length).fill(1);
/** Intervals about 850 ms with a spread of 40 ms. */
const intervals = signals(60, 400).map((x) => x.map((value) => 850 + 40 * value));

const endsOf = (rrMs: Float64Array) => {
  let at = 0;
  return rrMs.map((one) => {
    at += one / 1000;
    return at;
  });
};

describe('variability of intervals', () => {
  it('keeps SDNN, RMSSD, SDSD, pNN50, SD1 and SD2 when every interval is as much longer', () => {
    fc.assert(
      fc.property(intervals, numbers(-300, 600), (rrMs, more) => {
        // Whole 1/64 ms, so that no difference of 50 ms is moved across 50 by rounding.
        const [exact, shift] = [rrMs.map((one) => Math.round(64 * one) / 64), Math.round(more)];
        const plain = timeDomain(exact, all(exact));
        const moved = timeDomain(
          exact.map((one) => one + shift),
          all(exact),
        );
        expect(moved.meanMs).toBeCloseTo(plain.meanMs + shift, 9);
        for (const name of ['sdnnMs', 'rmssdMs', 'sdsdMs', 'pnn50Pct', 'sd1Ms', 'sd2Ms'] as const)
          expect(moved[name]).toBeCloseTo(plain[name], 9);
      }),
      always(60),
    );
  });

  it('grows with the intervals, and is the same backwards', () => {
    fc.assert(
      fc.property(intervals, numbers(0.5, 2), (rrMs, factor) => {
        const plain = timeDomain(rrMs, all(rrMs));
        const scaled = timeDomain(times(factor, rrMs), all(rrMs));
        expect(scaled.heartRateBpm * factor).toBeCloseTo(plain.heartRateBpm, 9);
        for (const name of ['sdnnMs', 'rmssdMs', 'sdsdMs', 'sd1Ms', 'sd2Ms'] as const)
          expect(scaled[name] / (factor * plain[name])).toBeCloseTo(1, 9);
        const back = timeDomain(rrMs.slice().reverse(), all(rrMs));
        for (const name of ['meanMs', 'sdnnMs', 'rmssdMs', 'sdsdMs', 'pnn50Pct'] as const)
          expect(back[name]).toBeCloseTo(plain[name], 9);
      }),
      always(60),
    );
  });

  it('of intervals that are not NN takes nothing, whatever they are', () => {
    fc.assert(
      fc.property(intervals, fc.nat(), numbers(0, 20_000), (rrMs, which, wrong) => {
        const i = which % rrMs.length;
        const mask = all(rrMs);
        mask[i] = 0;
        const wild = rrMs.slice();
        wild[i] = wrong;
        expect(timeDomain(wild, mask)).toEqual(timeDomain(rrMs, mask));
        const { nnCount, pairCount } = timeDomain(rrMs, mask);
        expect(nnCount).toBe(rrMs.length - 1);
        expect(pairCount).toBe(rrMs.length - (i === 0 || i === rrMs.length - 1 ? 2 : 3));
      }),
      always(60),
    );
  });
});

describe('LF and HF', () => {
  const BANDS = [
    [0.04, 0.15],
    [0.15, 0.4],
  ] as const;

  it('do not see the mean or a line, nor when the segment began, and grow by the square', () => {
    fc.assert(
      fc.property(
        signals(200, 350),
        numbers(-0.2, 0.2),
        numbers(0, 20_000),
        numbers(0.2, 5),
        (spread, msPerS, fromS, gain) => {
          const own = spread.map((value) => 30 * value);
          const ends = endsOf(own.map((value) => 850 + value));
          const of = (method: typeof lombBandPowers, values: Float64Array, at = ends) =>
            method(at, values, BANDS);
          const plain = own.map((value) => 850 + value);
          const later = ends.map((at) => at + fromS);
          // The times alone say where the intervals lie; Lomb takes its scale from the mean interval.
          const tilted = own.map((value, i) => 850 + value + msPerS * (ends[i] - 120));
          const lomb = of(lombBandPowers, plain);
          const meanOf = (x: Float64Array) => x.reduce((sum, one) => sum + one, 0) / x.length;
          const ratio = meanOf(tilted) / meanOf(plain);
          of(lombBandPowers, tilted).forEach((power, k) => {
            expect(power / (ratio * lomb[k])).toBeCloseTo(1, 6);
          });
          of(lombBandPowers, plain, later).forEach((power, k) => {
            expect(power / lomb[k]).toBeCloseTo(1, 6);
          });
          const welched = of(welchBandPowers, plain);
          of(welchBandPowers, tilted).forEach((power, k) => {
            expect(power / welched[k]).toBeCloseTo(1, 6);
          });
          const scaled = of(
            welchBandPowers,
            own.map((value) => gain * (850 + value)),
          );
          scaled.forEach((power, k) => {
            expect(power / (gain * gain * welched[k])).toBeCloseTo(1, 6);
          });
        },
      ),
      always(25),
    );
  });
});

describe('the place of a beat in a row', () => {
  const bump = Float64Array.from({ length: 51 }, (_, i) => Math.exp(-0.5 * ((i - 25) / 3) ** 2));
  const timer = timerOf(bump);
  const rowWith = (place: number, size: number) =>
    Float64Array.from({ length: 200 }, (_, i) => size * Math.exp(-0.5 * ((i - place) / 3) ** 2));

  it('is found between samples, wherever it lies, at any height, offset and slope', () => {
    fc.assert(
      fc.property(
        numbers(92, 108),
        numbers(5, 500),
        numbers(-1_000, 1_000),
        numbers(-2, 2),
        (place, size, level, slope) => {
          const row = rowWith(place, size).map((value, i) => value + level + slope * i);
          const found = align(row, timer, 100, 12);
          expect(Math.abs(found.place - place)).toBeLessThan(0.01);
          expect(Math.abs(found.size / size - 1)).toBeLessThan(0.01);
          expect(found.likeness).toBeGreaterThan(0.99);
        },
      ),
      always(100),
    );
  });

  it('of a lopsided beat is found on any slope, since the filter gives nothing for a line', () => {
    const lopsided = (i: number) =>
      Math.exp(-0.5 * (i / 3) ** 2) - 0.6 * Math.exp(-0.5 * ((i - 9) / 4) ** 2);
    const average = Float64Array.from({ length: 51 }, (_, i) => lopsided(i - 25));
    const { weights } = timerOf(average);
    const rowAt = (place: number) =>
      Float64Array.from({ length: 200 }, (_, i) => 100 * lopsided(i - place));
    const offset = align(rowAt(100), timerOf(average), 100, 12).place - 100;
    const sum = (at: (i: number) => number) =>
      weights.reduce((total, weight, i) => total + weight * at(i), 0);
    expect(Math.abs(sum(() => 1))).toBeLessThan(1e-12);
    expect(Math.abs(sum((i) => i - 25))).toBeLessThan(1e-11);
    fc.assert(
      fc.property(
        numbers(92, 108),
        numbers(-1_000, 1_000),
        numbers(-30, 30),
        (place, uv, slope) => {
          const row = rowAt(place);
          const plain = align(row, timerOf(average), 100, 12);
          const tilted = align(
            row.map((value, i) => value + uv + slope * i),
            timerOf(average),
            100,
            12,
          );
          // A lopsided shape has an offset of its own, a few hundredths of a sample, one for every beat.
          expect(Math.abs(plain.place - place - offset)).toBeLessThan(0.02);
          expect(Math.abs(tilted.place - plain.place)).toBeLessThan(1e-9);
          expect(Math.abs(tilted.size - plain.size)).toBeLessThan(1e-9);
        },
      ),
      always(50),
    );
  });

  it('moves by whole samples with the row, to the bit', () => {
    fc.assert(
      fc.property(numbers(95, 105), fc.integer({ min: -20, max: 20 }), (place, by) => {
        const row = rowWith(place, 80);
        const moved = Float64Array.from({ length: 200 }, (_, i) => row[i - by] ?? 0);
        const plain = align(row, timer, 100, 12);
        const later = align(moved, timer, 100 + by, 12);
        expect(later.place - by).toBeCloseTo(plain.place, 10);
        expect(later.size).toBe(plain.size);
      }),
      always(50),
    );
  });
});

describe('beats found', () => {
  const RATE_HZ = 250;
  const studies = fc
    .record({ seed: fc.nat(1_000), meanRrS: numbers(0.6, 1.1), biphasic: fc.boolean() })
    .map(({ seed, meanRrS, biphasic }) => {
      const beats = planBeats({ seed, seconds: 120, meanRrS, ventricular: 0.03 });
      const flat = new Float64Array(120 * RATE_HZ);
      const raw = addBeats(flat, RATE_HZ, beats, 100, biphasic ? BIPHASIC : NARROW);
      return heartbeatOf(addNoise(raw, RATE_HZ, { seed, whiteUv: 3, slowUv: 100 }), RATE_HZ);
    });
  const found = (heartbeat: Float64Array) =>
    detectBeats({ heartbeat, rateHz: RATE_HZ, ticksPerSample: 64 });

  it('are the same, to the tick and with the same classes, upside down; the sign alone flips', () => {
    fc.assert(
      fc.property(studies, (heartbeat) => {
        const [plain, turned] = [found(heartbeat), found(times(-1, heartbeat))];
        expect(turned.beats).toEqual(plain.beats);
        expect(turned.sign).toBe(-plain.sign);
        expect(plain.beats.ticks.length).toBeGreaterThan(90);
      }),
      always(4),
    );
  });

  it('are the same in a signal twice as large', () => {
    fc.assert(
      fc.property(studies, (heartbeat) => {
        const [plain, doubled] = [found(heartbeat), found(times(2, heartbeat))];
        expect(largestDifference(doubled.beats.ticks, plain.beats.ticks)).toBe(0);
        expect(doubled.heightUv / plain.heightUv).toBeCloseTo(2, 9);
      }),
      always(4),
    );
  });
});
