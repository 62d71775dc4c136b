import { describe, expect, it } from 'vitest';
import { atOnce } from '../../src/numeric/in-steps';
import { createRandom } from '../../src/numeric/random';
import { coveredSeconds } from '../../src/recording/span';
import { settlingTimeS } from '../../src/trust/settling';
import { createSpoilWatch } from '../../src/trust/spoil-watch';
import { unforeseen } from '../../src/trust/unforeseen';

const RATE_HZ = 50;
const SECONDS = 1200;
const EVENT_S = 700;

/** A slow wave, breathing and noise, written for this test alone. */
function lead(waveAt: (t: number) => number, extra: (t: number) => number = () => 0): Float64Array {
  const random = createRandom(11);
  return Float64Array.from({ length: SECONDS * RATE_HZ }, (_, i) => {
    const t = i / RATE_HZ;
    const breath = 40 * Math.sin(2 * Math.PI * 0.25 * t + 0.3 * Math.sin(t / 30));
    return waveAt(t) + breath + 5 * random.gaussian() + extra(t);
  });
}
const cpm = (rate: number, uv: number) => (t: number) =>
  uv * Math.sin((2 * Math.PI * rate * t) / 60);

function forStomach(x: Float64Array) {
  const watch = createSpoilWatch({ lead: '#1', rateHz: RATE_HZ, railsUv: null, stepUv: 0.1 });
  watch.push(x);
  return watch.finish().filter(({ target }) => target !== 'heart');
}

describe('for the stomach is spoiled', () => {
  it.each([
    [
      'a pop of 1.5 mV that is over in a second',
      (t: number) => (t < 1 ? 1500 * Math.exp(-5 * t) : 0),
      1,
    ],
    [
      'three coughs of 0.5 mV',
      (t: number) => (t < 2.4 ? 500 * Math.abs(Math.sin((Math.PI * t) / 0.8)) : 0),
      2.4,
    ],
    ['a knock of 0.4 mV for a second', (t: number) => (t < 1 ? 400 : 0), 1],
  ])('%s, from its first sample to its last, and little more', (_, shape, lengthS) => {
    const spans = forStomach(lead(cpm(3, 150), (t) => (t >= EVENT_S ? shape(t - EVENT_S) : 0)));
    expect(coveredSeconds(spans, EVENT_S, EVENT_S + lengthS)).toBeGreaterThan(0.9 * lengthS);
    expect(coveredSeconds(spans, 0, SECONDS)).toBeLessThan(lengthS + 12);
  });

  it('a step of 3 mV until what is left of its fall is small beside the wave', () => {
    const spans = forStomach(
      lead(cpm(3, 150), (t) => (t >= EVENT_S ? 3000 * Math.exp((EVENT_S - t) / 7) : 0)),
    );
    expect(spans).toHaveLength(1);
    const [{ fromS, toS, cause }] = spans;
    expect(cause).toBe('step');
    expect(Math.abs(fromS - EVENT_S)).toBeLessThan(4);
    // 3 mV falls to 30 uV, a tenth of the wave's swing, in 7 ln 100 = 32 s.
    expect(toS - EVENT_S).toBeGreaterThan(20);
    expect(toS - EVENT_S).toBeLessThan(45);
  });
});

describe('for the stomach is not spoiled', () => {
  const sawtooth = (t: number) =>
    [1, 2, 3, 4].reduce((sum, k) => sum + (200 / k) * Math.sin((2 * Math.PI * 3 * k * t) / 60), 0);
  const bout = (t: number) => (t > 600 && t < 660 ? cpm(7, 150)(t) : cpm(2.8, 150)(t));
  it.each([
    ['a sawtooth-like wave', lead(sawtooth)],
    ['a minute of tachygastria as large as the wave before it', lead(bout)],
    ['a wave that stops', lead((t) => (t < 600 ? cpm(3, 200)(t) : 0))],
    ['a wave that grows threefold', lead((t) => (t < 600 ? 1 : 3) * cpm(3, 80)(t))],
    ['slow and deep breathing', lead(cpm(3, 100), (t) => 150 * Math.sin(2 * Math.PI * 0.11 * t))],
  ])('%s', (_, x) => {
    expect(forStomach(x)).toEqual([]);
  });
});

describe('the time that a step takes to settle', () => {
  const fall = (heightUv: number, constantS: number) =>
    Float64Array.from({ length: 3000 }, (_, i) => heightUv * Math.exp(-i / 10 / constantS));

  it('is the constant times the logarithm of what is left', () => {
    // Felt as a wave by 1 / (1 + (5 / 12)^2) of its height: 5 ln(1000 / 1.174 / 20) = 18.8 s.
    const settling = settlingTimeS(fall(1000, 5), 0, 0.1, 20);
    expect(Math.abs(settling - 18.8)).toBeLessThan(4);
  });

  it('is shorter for a fall so slow that a filter takes it for drift', () => {
    const slow = settlingTimeS(fall(1000, 60), 0, 0.1, 20);
    expect(slow).toBeLessThan(60 * Math.log(1000 / 20) - 100);
  });

  it('is nothing where the lead jumps and stays, or falls by less than matters', () => {
    expect(settlingTimeS(new Float64Array(3000).fill(500), 0, 0.1, 20)).toBe(0);
    expect(settlingTimeS(fall(15, 5), 0, 0.1, 20)).toBe(0);
  });
});

describe('what nothing foretells', () => {
  const columns = (extra: (t: number) => number) => {
    const x = lead(cpm(3, 150), extra);
    return Float64Array.from({ length: SECONDS * 10 }, (_, c) => {
      const column = x.subarray(5 * c, 5 * c + 5);
      return column.reduce((sum, one) => sum + one, 0) / 5;
    });
  };

  it('is a pop in its own seconds, not in those that a prediction has seen it in', () => {
    const found = atOnce(
      unforeseen(
        columns((t) => (t >= EVENT_S && t < EVENT_S + 1 ? 1000 : 0)),
        0.1,
      ),
    );
    if (!found) throw new Error('there are columns enough');
    const at = (fromS: number, toS: number) =>
      Math.max(...found.sizeUv.slice(2 * (EVENT_S + fromS), 2 * (EVENT_S + toS)));
    expect(at(-1, 2)).toBeGreaterThan(150);
    expect(at(4, 15)).toBeLessThan(0.1 * at(-1, 2));
    expect(at(-15, -4)).toBeLessThan(0.1 * at(-1, 2));
  });

  it('is next to nothing of a slow wave and breathing', () => {
    const found = atOnce(
      unforeseen(
        columns(() => 0),
        0.1,
      ),
    );
    const sizes = found ? [...found.sizeUv].sort((a, b) => a - b) : [];
    expect(sizes[Math.floor(0.99 * sizes.length)]).toBeLessThan(15);
  });

  it('is not told where columns are too few or a second apart', () => {
    expect(atOnce(unforeseen(new Float64Array(100), 0.1))).toBeNull();
    expect(atOnce(unforeseen(new Float64Array(5000), 1))).toBeNull();
  });
});
