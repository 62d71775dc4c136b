import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { DEFAULT_SETTINGS, type HeartRouteName } from '../../src/recording/settings';
import { createSeparation, type Separated } from '../../src/separate/separation';
import { largestDifference, noise } from '../numeric/signals';
import { always, cutAt, cuts, mixed, numbers, sizeOf, times } from '../properties';
import { ALL_ROUTES } from './all-routes';

const ROUTES: readonly HeartRouteName[] = ['band', 'fractional'];
const RATE_HZ = 50;
const SECONDS = 400;

/** White noise and a random walk: something at every frequency. */
function wide(draw: number): Float64Array {
  const x = noise(SECONDS * RATE_HZ, draw);
  let walk = 0;
  return x.map((value, i) => {
    walk += x[x.length - 1 - i];
    return 20 * value + walk;
  });
}

function separated(
  blocks: readonly Float64Array[],
  route: HeartRouteName,
  rateHz = RATE_HZ,
): Separated {
  const separation = createSeparation({
    lead: '#1',
    rateHz,
    sampleCount: blocks.reduce((sum, block) => sum + block.length, 0),
    settings: {
      ...DEFAULT_SETTINGS,
      slowGain: 'even',
      slowRoute: route,
      heartRoute: route,
      fractional: { ...DEFAULT_SETTINGS.fractional, memoryS: 20 },
    },
    routes: ALL_ROUTES,
    wants: { slow: true, heart: true },
  });
  for (const block of blocks) separation.push(block);
  return separation.finish();
}

/** The three signals of a separation. */
function signalsOf({ slow, heart }: Separated) {
  if (!slow || !heart) throw new Error('both outputs were asked for');
  return {
    recorded: slow.recorded,
    slowWave: slow.slowWave,
    heartbeat: Float64Array.from(heart.heartbeat),
    unclean: [slow.unclean, heart.unclean],
  };
}

const draws = fc.nat();
const inside = (x: Float64Array, rateHz: number) => x.subarray(130 * rateHz, 270 * rateHz);

describe.each(ROUTES)('route %s', (route) => {
  it('cut at any samples gives the same bits, gaps and all', () => {
    const gaps = fc.array(fc.tuple(fc.nat(SECONDS * RATE_HZ - 1), fc.nat(400)), { maxLength: 3 });
    fc.assert(
      fc.property(draws, gaps, cuts, (draw, holes, shares) => {
        const x = wide(draw);
        for (const [from, length] of holes) x.fill(Number.NaN, from, from + length);
        const whole = signalsOf(separated([x], route));
        expect(signalsOf(separated(cutAt(x, shares), route))).toEqual(whole);
      }),
      always(10),
    );
  });

  it.each([250, 500, 311.127])('cut at any samples gives the same bits at %d Hz', (rateHz) => {
    fc.assert(
      fc.property(draws, cuts, (draw, shares) => {
        const x = noise(Math.round(100 * rateHz), draw);
        const whole = signalsOf(separated([x], route, rateHz));
        expect(signalsOf(separated(cutAt(x, shares), route, rateHz))).toEqual(whole);
      }),
      always(2),
    );
  });

  it('is linear: of a sum it gives the sum', () => {
    fc.assert(
      fc.property(draws, draws, numbers(-5, 5), (one, other, a) => {
        const [x, y] = [wide(one), wide(other)];
        const of = (signal: Float64Array) => signalsOf(separated([signal], route));
        const [sum, ofX, ofY] = [of(mixed(a, x, 1, y)), of(x), of(y)];
        const size = (1 + Math.abs(a)) * (sizeOf(x) + sizeOf(y));
        for (const name of ['recorded', 'slowWave'] as const)
          expect(
            largestDifference(sum[name], mixed(a, ofX[name], 1, ofY[name])) / size,
          ).toBeLessThan(1e-11);
        // The heartbeat is kept in single precision, 6e-8 of its size each.
        expect(
          largestDifference(sum.heartbeat, mixed(a, ofX.heartbeat, 1, ofY.heartbeat)) / size,
        ).toBeLessThan(1e-6);
      }),
      always(8),
    );
  });

  it('turns over with its lead and doubles with it, to the bit', () => {
    fc.assert(
      fc.property(draws, (draw) => {
        const x = wide(draw);
        x.fill(Number.NaN, 9_000, 9_100);
        const plain = signalsOf(separated([x], route));
        for (const factor of [-1, 2, 0.25]) {
          const got = signalsOf(separated([times(factor, x)], route));
          for (const name of ['recorded', 'slowWave', 'heartbeat'] as const)
            expect(largestOrNaN(got[name], times(factor, plain[name]))).toBe(0);
        }
      }),
      always(5),
    );
  });

  it('does not see an offset of the electrodes, in the slow wave or the heartbeat', () => {
    fc.assert(
      fc.property(draws, numbers(-300_000, 300_000), (draw, level) => {
        const x = wide(draw);
        const [plain, moved] = [x, x.map((value) => value + level)].map((signal) =>
          signalsOf(separated([signal], route)),
        );
        // 1e-9 of what was put in: a lead on 300 mV keeps its slow wave to 0.3 nV.
        const size = sizeOf(x) + Math.abs(level);
        expect(largestDifference(moved.slowWave, plain.slowWave) / size).toBeLessThan(1e-9);
        expect(largestDifference(moved.heartbeat, plain.heartbeat) / size).toBeLessThan(1e-7);
        const back = moved.recorded.map((value) => value - level);
        expect(largestDifference(back, plain.recorded) / size).toBeLessThan(1e-12);
      }),
      always(8),
    );
  });

  it('keeps a thousandth of the mains’ hum at most; a derivative, which lifts it, two', () => {
    const most = { recorded: 1e-3, slowWave: route === 'fractional' ? 2e-3 : 1e-3 };
    fc.assert(
      fc.property(draws, fc.constantFrom(50, 60), numbers(1, 1_000), (draw, hz, uv) => {
        const x = times(50, noise(320 * 250, draw));
        const hum = x.map((value, i) => value + uv * Math.sin((2 * Math.PI * hz * i) / 250 + 0.4));
        const [plain, humming] = [x, hum].map((one) => signalsOf(separated([one], route, 250)));
        const left = (name: 'recorded' | 'slowWave' | 'heartbeat', from: number, to: number) =>
          largestDifference(humming[name].subarray(from, to), plain[name].subarray(from, to)) / uv;
        expect(left('recorded', 4 * 125, 4 * 195)).toBeLessThan(most.recorded);
        expect(left('slowWave', 4 * 125, 4 * 195)).toBeLessThan(most.slowWave);
        if (route === 'band') expect(left('heartbeat', 15 * 250, 305 * 250)).toBeLessThan(2e-3);
      }),
      always(6),
    );
  });

  it('gives a lead that comes some seconds later the same signals, as much later', () => {
    fc.assert(
      fc.property(draws, fc.integer({ min: 1, max: 30 }), (draw, seconds) => {
        const x = wide(draw);
        const by = seconds * RATE_HZ;
        const level = x.reduce((sum, value) => sum + value, 0) / x.length;
        const centred = x.map((value) => value - level);
        const padded = Float64Array.from([...new Float64Array(by), ...centred]);
        const plain = signalsOf(separated([centred], route));
        const moved = signalsOf(separated([padded], route));
        const size = sizeOf(centred);
        const late = (signal: Float64Array, rateHz: number) => signal.subarray(seconds * rateHz);
        expect(
          largestDifference(inside(late(moved.recorded, 4), 4), inside(plain.recorded, 4)) / size,
        ).toBeLessThan(1e-12);
        expect(
          largestDifference(inside(late(moved.slowWave, 4), 4), inside(plain.slowWave, 4)) / size,
        ).toBeLessThan(1e-9);
        const heart = inside(late(moved.heartbeat, RATE_HZ), RATE_HZ);
        expect(largestDifference(heart, inside(plain.heartbeat, RATE_HZ)) / size).toBeLessThan(
          1e-6,
        );
      }),
      always(8),
    );
  });
});

describe('route band', () => {
  it('does not see a line in the middle of the slow wave, nor in the heartbeat', () => {
    fc.assert(
      fc.property(draws, numbers(-5, 5), (draw, uvPerS) => {
        const x = wide(draw);
        const tilted = x.map((value, i) => value + (uvPerS * i) / RATE_HZ);
        const [plain, moved] = [x, tilted].map((one) => signalsOf(separated([one], 'band')));
        const size = sizeOf(x) + sizeOf(tilted);
        expect(
          largestDifference(inside(moved.slowWave, 4), inside(plain.slowWave, 4)) / size,
        ).toBeLessThan(1e-9);
        expect(
          largestDifference(inside(moved.heartbeat, RATE_HZ), inside(plain.heartbeat, RATE_HZ)) /
            size,
        ).toBeLessThan(1e-6);
      }),
      always(8),
    );
  });
});

/** As largestDifference, where NaN at the same place in both counts as equal. */
function largestOrNaN(a: Float64Array, b: Float64Array): number {
  const there = (x: Float64Array) => x.map((value, i) => (Number.isNaN(a[i] + b[i]) ? 0 : value));
  const holes = (x: Float64Array) => x.reduce((sum, value) => sum + Number(Number.isNaN(value)), 0);
  return holes(a) === holes(b) ? largestDifference(there(a), there(b)) : Number.POSITIVE_INFINITY;
}

describe('route band with the gain fitted to the lead', () => {
  const fitted = (x: Float64Array) => {
    const separation = createSeparation({
      lead: '#1',
      rateHz: RATE_HZ,
      sampleCount: x.length,
      settings: DEFAULT_SETTINGS,
      routes: ALL_ROUTES,
      wants: { slow: true, heart: false },
    });
    separation.push(x);
    const { slow } = separation.finish();
    if (!slow) throw new Error('a slow wave was asked for');
    return slow.slowWave;
  };

  it('turns over with its lead and grows with it: the gain is that of shape, not of size', () => {
    fc.assert(
      fc.property(draws, numbers(0.1, 10), (draw, factor) => {
        const x = wide(draw);
        x.fill(Number.NaN, 9_000, 9_100);
        const plain = fitted(x);
        const size = sizeOf(plain.filter((one) => !Number.isNaN(one)));
        for (const by of [factor, -factor]) {
          const got = fitted(times(by, x));
          const misses = got.map((value, i) => value - by * plain[i]);
          expect(Math.max(...misses.filter(Number.isFinite).map(Math.abs))).toBeLessThan(
            1e-9 * factor * size,
          );
        }
      }),
      always(5),
    );
  });
});
