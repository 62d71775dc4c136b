import { describe, expect, it } from 'vitest';
import type { Ends } from '../../src/numeric/ends';
import {
  blockSizeFor,
  createOverlapSave,
  kernelSpectrum,
  overlapSave,
} from '../../src/numeric/overlap-save';
import { blocksOf, filteredByDefinition, largestDifference, noise } from './signals';

// Every figure is held against the sum that defines it, written out in signals.ts.

const x = noise(3_001, 1);
const causal = { taps: noise(300, 2), origin: 0 };
const zeroPhase = { taps: noise(41, 3), origin: 20 };
const ahead = { taps: noise(25, 4), origin: 60 };
const kernels = [causal, zeroPhase] as const;

function joined(parts: readonly Float64Array[]): Float64Array {
  return Float64Array.from(parts.flatMap((part) => [...part]));
}

describe('a running filter by overlap-save', () => {
  it.each<[Ends, number]>([
    ['zero', 1],
    ['hold', 1],
    ['reflect-odd', 1],
    ['zero', 4],
    ['hold', 2],
    ['reflect-odd', 8],
    ['zero', 3],
    ['reflect-odd', 6],
    ['hold', 12],
    ['zero', 512],
  ])('with ends %s at every %i-th sample gives both outputs exactly', (ends, decimate) => {
    const made = overlapSave(x, { blockSize: 1024, kernels, decimate, ends });
    kernels.forEach((kernel, k) => {
      const wanted = filteredByDefinition(x, kernel, ends, decimate);
      expect(largestDifference(made[k], wanted)).toBeLessThan(1e-12);
    });
  });

  it('takes blocks of any size and gives the same bits', () => {
    const options = { blockSize: 512, kernels, decimate: 2, ends: 'reflect-odd' } as const;
    const whole = overlapSave(x, options);
    for (const lengths of [[1], [7, 0, 350], [5_000]]) {
      const stream = createOverlapSave(options);
      const parts = blocksOf(x, lengths).map((block) => stream.push(block));
      parts.push(stream.finish());
      [0, 1].forEach((k) => {
        expect(joined(parts.map((part) => part[k]))).toEqual(whole[k]);
      });
    }
  });

  it.each([0, 1, 2, 30, 299, 300, 301, 511, 512, 963])(
    'is right for a signal of %i samples',
    (length) => {
      const short = x.slice(0, length);
      for (const ends of ['zero', 'hold', 'reflect-odd'] as const)
        for (const kernel of [causal, zeroPhase, ahead]) {
          const [y] = overlapSave(short, { blockSize: 512, kernels: [kernel], decimate: 1, ends });
          const wanted = filteredByDefinition(short, kernel, ends);
          const scale = 1 + wanted.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
          expect(largestDifference(y, wanted) / scale).toBeLessThan(1e-12);
        }
    },
  );

  it('looks ahead where all taps lie before the origin', () => {
    const [y] = overlapSave(x, { blockSize: 256, kernels: [ahead], decimate: 1 });
    expect(largestDifference(y, filteredByDefinition(x, ahead, 'zero'))).toBeLessThan(1e-12);
  });

  it('shares one spectrum among streams', () => {
    const spectrum = kernelSpectrum({ blockSize: 1024, kernels, decimate: 4 });
    const other = noise(2_000, 9);
    const first = overlapSave(x, { spectrum });
    const second = overlapSave(other, { spectrum });
    expect(largestDifference(first[1], filteredByDefinition(x, zeroPhase, 'zero', 4))).toBeLessThan(
      1e-12,
    );
    expect(
      largestDifference(second[0], filteredByDefinition(other, causal, 'zero', 4)),
    ).toBeLessThan(1e-12);
  });

  it('refuses blocks too small for the kernels, odd sizes and samples after the end', () => {
    expect(() => kernelSpectrum({ blockSize: 256, kernels, decimate: 1 })).toThrow('too small');
    expect(() => kernelSpectrum({ blockSize: 1000, kernels, decimate: 1 })).toThrow('power of two');
    expect(() => kernelSpectrum({ blockSize: 1024, kernels, decimate: 0 })).toThrow('whole number');
    const stream = createOverlapSave({ blockSize: 1024, kernels, decimate: 1 });
    stream.finish();
    expect(() => stream.push(x)).toThrow('after the end');
  });

  it('chooses a block that fits the kernels and no larger than the signal asks', () => {
    const chosen = blockSizeFor(kernels, 1e9);
    expect(chosen).toBeGreaterThan(1024);
    expect(chosen).toBeLessThan(65_536);
    expect(blockSizeFor(kernels, 600)).toBe(1024);
  });
});
