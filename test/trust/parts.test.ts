import { describe, expect, it } from 'vitest';
import { createBaseColumns } from '../../src/trust/base-columns';
import { excursionsAbove, paddedAndJoined } from '../../src/trust/excursions';
import { ownLevel } from '../../src/trust/own-level';
import { slidingRange } from '../../src/trust/sliding-range';

describe('base columns', () => {
  it('hold least, greatest, mean and roughness of each 0.1 s, and NaN where a sample is missing', () => {
    const base = createBaseColumns({ rateHz: 40, railsUv: null, stepUv: 0 });
    base.push(Float64Array.of(1, 3, 5, 7, 7, 7, 7));
    base.push(Float64Array.of(7, 2, Number.NaN, 4, 4, 9, 9));
    const columns = base.finish();
    expect(columns.count).toBe(3);
    expect([...columns.low]).toEqual([1, 7, Number.NaN]);
    expect([...columns.high]).toEqual([7, 7, Number.NaN]);
    expect([...columns.mean]).toEqual([4, 7, Number.NaN]);
    expect(columns.roughness[0]).toBeCloseTo(Math.sqrt(12 / 4), 6);
    expect(columns.roughness[1]).toBe(0);
    expect(columns.missing).toEqual([{ from: 9, to: 10 }]);
    expect(columns.sampleCount).toBe(14);
  });

  it('measure what is like a QRS complex and not the mains hum beside it', () => {
    const likeOf = (hz: number) => {
      const base = createBaseColumns({ rateHz: 500, railsUv: null, stepUv: 0 });
      base.push(
        Float64Array.from({ length: 5000 }, (_, i) => Math.sin((2 * Math.PI * hz * i) / 500)),
      );
      return base.finish().likeQrs[50];
    };
    // A sine against itself 18 ms later, both averaged over 18 ms: 2 sin2(pi f T) / (pi f T), over root 2.
    const gain = (hz: number) => {
      const x = Math.PI * hz * 0.018;
      return (Math.SQRT2 * Math.sin(x) ** 2) / x;
    };
    for (const hz of [10, 20, 30]) expect(likeOf(hz)).toBeCloseTo(gain(hz), 1);
    for (const hz of [50, 60]) expect(likeOf(hz)).toBeLessThan(0.1 * gain(20));
  });

  it('count a sample at the rail within half a step of it, three or more in a row', () => {
    const base = createBaseColumns({ rateHz: 50, railsUv: [100, -100], stepUv: 1 });
    base.push(Float64Array.of(0, 99.6, 0, 100, 100, 100, 0, -99.7, -100, -99.9, -99));
    expect(base.finish().railed).toEqual([
      { from: 3, to: 6 },
      { from: 7, to: 10 },
    ]);
  });

  it('keep more columns than they began with', () => {
    const base = createBaseColumns({ rateHz: 10, railsUv: null, stepUv: 0 });
    for (let i = 0; i < 5000; i += 1) base.push(Float64Array.of(i));
    const { count, mean } = base.finish();
    expect(count).toBe(5000);
    expect(mean[4999]).toBe(4999);
  });
});

describe('sliding range', () => {
  it('equals the greatest less the least of every window looked at one by one', () => {
    let state = 1;
    const x = Float64Array.from({ length: 200 }, (_, i) => {
      state = (state * 48271) % 2147483647;
      return i % 17 === 3 || (i > 90 && i < 110) ? Number.NaN : state / 2147483647;
    });
    for (const width of [1, 2, 5, 8]) {
      const before = Math.floor(width / 2);
      const wanted = Array.from(x, (_, i) => {
        const window = x
          .slice(Math.max(0, i - before), i - before + width)
          .filter((one) => !Number.isNaN(one));
        return window.length === 0 ? Number.NaN : Math.max(...window) - Math.min(...window);
      });
      expect([...slidingRange(x, x, width)]).toEqual(wanted);
    }
  });
});

describe('excursions', () => {
  const at = (value: number, count: number) => new Array<number>(count).fill(value);

  it('begin where the higher limit is passed and reach to where the lower one is kept', () => {
    const x = [0, 2, 2, 5, 2, 0, 2, 2, 0, 9];
    expect(excursionsAbove(x, at(4, 10), at(1, 10))).toEqual([
      { from: 1, to: 5 },
      { from: 9, to: 10 },
    ]);
  });

  it('are carried on, but not begun, by what is missing', () => {
    const x = [Number.NaN, 5, Number.NaN, 5, 0, Number.NaN];
    expect(excursionsAbove(x, at(4, 6), at(1, 6))).toEqual([{ from: 1, to: 4 }]);
  });

  it('are joined where less than the given time parts them once they are padded', () => {
    const three = [
      { fromS: 10, toS: 12 },
      { fromS: 15, toS: 16 },
      { fromS: 30, toS: 31 },
    ];
    expect(paddedAndJoined(three, 0.5, 3)).toEqual([
      { fromS: 9.5, toS: 16.5 },
      { fromS: 29.5, toS: 31.5 },
    ]);
  });
});

describe('own level', () => {
  it('follows a slow change, not a stretch that is spoiled for as long as the window', () => {
    const growing = Float64Array.from({ length: 6000 }, (_, i) => 1 + i / 3000);
    const level = ownLevel(growing, 300, 0);
    expect(level[3000]).toBeCloseTo(2, 1);
    const spoiled = new Float64Array(6000).fill(1);
    spoiled.fill(50, 2000, 2900);
    expect(Math.max(...ownLevel(spoiled, 300, 0))).toBe(3);
    expect(Math.min(...ownLevel(spoiled, 300, 1.5))).toBe(1.5);
    expect([...ownLevel(new Float64Array(3).fill(Number.NaN), 1, 0.2)]).toEqual([0.2, 0.2, 0.2]);
  });
});
