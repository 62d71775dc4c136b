import { describe, expect, it } from 'vitest';
import { createRandom } from '../../src/numeric/random';
import { coveredSeconds, type Interval } from '../../src/recording/span';
import { withoutBreathing } from '../../src/separate/breathing-out';

const RATE_HZ = 4;
const SECONDS = 1800;
const LENGTH = SECONDS * RATE_HZ;

/** A movement of wandering rate with a second harmonic, written for this test alone. */
function breathing(ratePerMin: number, seed: number, harmonic = 0.3) {
  const random = createRandom(seed);
  let rate = ratePerMin;
  let cycles = 0;
  const movement = new Float64Array(LENGTH);
  const other = new Float64Array(LENGTH);
  for (let i = 0; i < LENGTH; i += 1) {
    rate += 0.02 * (ratePerMin - rate) + 0.03 * random.gaussian();
    cycles += rate / 60 / RATE_HZ;
    movement[i] = Math.sin(2 * Math.PI * cycles);
    other[i] =
      Math.sin(2 * Math.PI * cycles - 0.9) + harmonic * Math.sin(4 * Math.PI * cycles + 0.5);
  }
  /** What a belt sees, and what the lead sees: later, of another shape. */
  return { belt: movement, inLead: other };
}

const wave = Float64Array.from(
  { length: LENGTH },
  (_, i) => 100 * Math.sin((2 * Math.PI * 0.05 * i) / RATE_HZ),
);
const noise = (() => {
  const random = createRandom(3);
  return wave.map(() => 8 * random.gaussian());
})();
const lengthOf = (stretches: readonly Interval[]) => coveredSeconds(stretches, 0, SECONDS);
const power = (x: Float64Array) =>
  x.subarray(400, LENGTH - 400).reduce((sum, one) => sum + one * one, 0) / (LENGTH - 800);

describe('breathing taken out by a reference', () => {
  it('of another shape and later leaves a hundredth of its power, and the slow wave', () => {
    const { belt, inLead } = breathing(6.5, 1);
    const lead = wave.map((uv, i) => uv + noise[i] + 120 * inLead[i]);
    const { lead: out, takenOut } = withoutBreathing(lead, belt, RATE_HZ);
    const left = out.map((uv, i) => uv - wave[i] - noise[i]);
    expect(power(left) / power(inLead.map((one) => 120 * one))).toBeLessThan(0.01);
    expect(lengthOf(takenOut)).toBeGreaterThan(0.95 * SECONDS);
  });

  it('changes nothing where the lead holds no breathing', () => {
    const { belt } = breathing(6.5, 1);
    const lead = wave.map((uv, i) => uv + noise[i]);
    const { lead: out, takenOut } = withoutBreathing(lead, belt, RATE_HZ);
    expect(power(out.map((uv, i) => uv - lead[i]))).toBeLessThan(0.005 * power(lead));
    expect(lengthOf(takenOut)).toBeLessThan(0.25 * SECONDS);
  });

  it('leaves breathing in where the reference is that of somebody else', () => {
    const own = breathing(6.5, 1);
    const other = breathing(9, 2);
    const lead = wave.map((uv, i) => uv + noise[i] + 120 * own.inLead[i]);
    const { lead: out } = withoutBreathing(lead, other.belt, RATE_HZ);
    expect(power(out.map((uv, i) => uv - lead[i]))).toBeLessThan(0.01 * power(lead));
  });

  it('works only where there is a reference', () => {
    const { belt, inLead } = breathing(6.5, 1);
    const lead = wave.map((uv, i) => uv + 120 * inLead[i]);
    const half = belt.map((one, i) => (i < LENGTH / 2 ? one : Number.NaN));
    const { lead: out, takenOut } = withoutBreathing(lead, half, RATE_HZ);
    expect(out.slice(LENGTH / 2 + 400)).toEqual(lead.slice(LENGTH / 2 + 400));
    expect(lengthOf(takenOut)).toBeGreaterThan(0.4 * SECONDS);
    expect(lengthOf(takenOut)).toBeLessThan(0.6 * SECONDS);
  });

  it('does not take a bout of the stomach at the breathing rate for breathing', () => {
    const { belt, inLead } = breathing(6.1, 4, 0);
    const bout = wave.map((_, i) =>
      i > 600 * RATE_HZ && i < 1020 * RATE_HZ
        ? 80 * Math.sin((2 * Math.PI * 6.1 * i) / 60 / RATE_HZ)
        : 0,
    );
    const lead = wave.map((uv, i) => uv + noise[i] + 25 * inLead[i] + bout[i]);
    const { lead: out } = withoutBreathing(lead, belt, RATE_HZ);
    const inside = (x: Float64Array) => x.slice(660 * RATE_HZ, 960 * RATE_HZ);
    const left = inside(out.map((uv, i) => uv - wave[i] - noise[i]));
    const share = (x: Float64Array) => x.reduce((sum, one) => sum + one * one, 0);
    expect(share(left) / share(inside(bout))).toBeGreaterThan(0.4);
  });

  it('leaves a lead too short to learn from as it is', () => {
    const short = wave.slice(0, 600);
    expect(withoutBreathing(short, short, RATE_HZ)).toEqual({ lead: short, takenOut: [] });
  });
});
