import { describe, expect, it } from 'vitest';
import { atOnce } from '../../src/numeric/in-steps';
import { bandAmplitude, cyclesOf, slowPhase } from '../../src/trust/slow-phase';

const phaseOf = (...of: Parameters<typeof slowPhase>) => atOnce(slowPhase(...of));

const RATE_HZ = 4;
const LENGTH = 20 * 60 * RATE_HZ;
const angleAt = (i: number) => (2 * Math.PI * 3 * i) / (60 * RATE_HZ) - 1;
/** 100 uV at 3 cpm on a level with a drift, and breathing at 15 a minute. */
const lead = Float64Array.from(
  { length: LENGTH },
  (_, i) => 100 * Math.cos(angleAt(i)) + 300 + i / 20 + 60 * Math.sin(2 * Math.PI * (i / 16)),
);
const all = new Uint8Array(LENGTH).fill(1);
const apart = (a: number, b: number) => Math.abs(Math.atan2(Math.sin(a - b), Math.cos(a - b)));
const INSIDE = [400, LENGTH - 400] as const;

describe('the phase of the slow wave', () => {
  it('is 0 at crests and rises with time, whatever level, drift and breathing lie beneath', () => {
    const { phase } = phaseOf(lead, all, RATE_HZ, 3.1);
    for (let i = INSIDE[0]; i < INSIDE[1]; i += 1)
      expect(apart(phase[i], angleAt(i))).toBeLessThan(0.02);
  });

  it('turns as often as the wave, which keeps its height at its own frequency', () => {
    const slow = phaseOf(lead, all, RATE_HZ, 3);
    const minutes = (INSIDE[1] - INSIDE[0]) / RATE_HZ / 60;
    expect(cyclesOf(slow, ...INSIDE)).toBeCloseTo(3 * minutes, 1);
    expect(bandAmplitude(slow.band, slow.usable, ...INSIDE)).toBeCloseTo(100, 0);
    const off = phaseOf(lead, all, RATE_HZ, 3.5);
    expect(bandAmplitude(off.band, off.usable, ...INSIDE)).toBeCloseTo(50, 0);
  });

  it('is not believed where its filter stands on what is spoiled, and is little moved by a short spoil', () => {
    const spoiled = lead.slice();
    const kept = all.slice();
    spoiled.fill(Number.NaN, 2000, 2008);
    kept.fill(0, 2000, 2008);
    spoiled.fill(9e4, 3000, 3240);
    kept.fill(0, 3000, 3240);
    const { phase, usable } = phaseOf(spoiled, kept, RATE_HZ, 3);
    expect(usable.subarray(3000, 3240).every((one) => one === 0)).toBe(true);
    expect([usable[2990], usable[3250], usable[2003]]).toEqual([0, 0, 0]);
    expect([usable[2700], usable[3540], usable[1990], usable[2020]]).toEqual([1, 1, 1, 1]);
    for (let i = 1900; i < 2100; i += 1) expect(apart(phase[i], angleAt(i))).toBeLessThan(0.15);
  });

  it('of nothing kept is a number nowhere used', () => {
    const { phase, usable } = phaseOf(
      lead.map(() => Number.NaN),
      new Uint8Array(LENGTH),
      4,
      3,
    );
    expect(usable.some((one) => one === 1)).toBe(false);
    expect(phase.every(Number.isFinite)).toBe(true);
  });
});
