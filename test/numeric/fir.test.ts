import { describe, expect, it } from 'vitest';
import { extend } from '../../src/numeric/ends';
import {
  bandPassTaps,
  convolveSame,
  firResponse,
  highPassTaps,
  lowPassTaps,
} from '../../src/numeric/fir';
import { cascadeKernels, centredKernel, kernelResponse } from '../../src/numeric/kernel';
import { amplitudeDb } from '../../src/numeric/windows';
import reference from '../reference/numeric-filters.json';
import octave from '../reference/numeric-octave.json';
import { filteredByDefinition, largestDifference, noise } from './signals';

// Reference: scipy.signal.firwin and numpy, test/reference/numeric-filters.py; kaiserord, kaiser
// and conv of Octave, test/reference/numeric-octave.m.

describe('Kaiser windowed-sinc taps', () => {
  it('of a low-pass are those of scipy.signal.firwin', () => {
    const [rateHz, passHz, stopHz, attenuationDb] = reference.lowPass.spec;
    const taps = lowPassTaps({ rateHz, passHz, stopHz, attenuationDb });
    expect(largestDifference(taps, reference.lowPass.taps)).toBeLessThan(1e-15);
  });

  it('of a low-pass, and the signal filtered by them, are Octave’s', () => {
    const taps = lowPassTaps({ rateHz: 250, passHz: 40, stopHz: 45, attenuationDb: 60 });
    expect(largestDifference(taps, octave.fir.taps)).toBeLessThan(1e-14);
    const y = convolveSame(Float64Array.from(octave.fir.x), taps, 'zero');
    expect(largestDifference(y, octave.fir.y)).toBeLessThan(1e-12);
  });

  it('of a band-pass are those of firwin but for the exact zero at 0 Hz', () => {
    const [rateHz, lowStopHz, lowPassHz, highPassHz, highStopHz, attenuationDb] =
      reference.bandPass.spec;
    const spec = { rateHz, lowStopHz, lowPassHz, highPassHz, highStopHz, attenuationDb };
    const taps = bandPassTaps(spec);
    expect(largestDifference(taps, reference.bandPass.taps)).toBeLessThan(1e-4);
    expect(Math.abs(firResponse(taps, 0, rateHz).re)).toBeLessThan(1e-15);
  });

  it('keep the pass band within the ripple and the stop band below the attenuation', () => {
    const spec = {
      rateHz: 250,
      lowStopHz: 0.5,
      lowPassHz: 5,
      highPassHz: 15,
      highStopHz: 25,
      attenuationDb: 60,
    };
    const taps = bandPassTaps(spec);
    for (let f = 0; f <= 125; f += 0.1) {
      const { re, im } = firResponse(taps, f, 250);
      expect(Math.abs(im)).toBeLessThan(1e-13);
      if (f >= 5 && f <= 15) expect(Math.abs(re - 1)).toBeLessThan(2e-3);
      if (f <= 0.5 || f >= 25) expect(amplitudeDb(re)).toBeLessThan(-59.5);
    }
  });

  it('of a high-pass are the unit impulse less the low-pass', () => {
    const taps = highPassTaps({ rateHz: 250, stopHz: 0.2, passHz: 0.8, attenuationDb: 60 });
    expect(Math.abs(firResponse(taps, 0, 250).re)).toBeLessThan(1e-14);
    expect(firResponse(taps, 0.5, 250).re).toBeCloseTo(0.5, 3);
    expect(firResponse(taps, 40, 250).re).toBeCloseTo(1, 3);
  });

  it('refuse edges that do not rise or lie above half the rate', () => {
    const spec = { rateHz: 250, passHz: 40, stopHz: 45, attenuationDb: 60 };
    expect(() => lowPassTaps({ ...spec, stopHz: 30 })).toThrow('must rise');
    expect(() => lowPassTaps({ ...spec, stopHz: 130 })).toThrow('half the rate');
  });
});

describe('kernels in a row', () => {
  it('have the product of their responses', () => {
    const first = { taps: noise(30, 1), origin: 4 };
    const second = centredKernel(noise(9, 2));
    const both = cascadeKernels(first, second);
    const a = kernelResponse(first, 13, 100);
    const b = kernelResponse(second, 13, 100);
    const { re, im } = kernelResponse(both, 13, 100);
    expect(re).toBeCloseTo(a.re * b.re - a.im * b.im, 11);
    expect(im).toBeCloseTo(a.re * b.im + a.im * b.re, 11);
  });

  it('refuse a centre between two taps', () => {
    expect(() => centredKernel(new Float64Array(4))).toThrow('odd');
  });
});

describe('convolution as long as the input', () => {
  const x = Float64Array.from(reference.convolve.x);
  const taps = Float64Array.from(reference.convolve.taps);

  it('agrees with numpy for both kinds of ends', () => {
    expect(largestDifference(convolveSame(x, taps, 'zero'), reference.convolve.y)).toBeLessThan(
      1e-12,
    );
    const odd = convolveSame(x, taps, 'reflect-odd');
    expect(largestDifference(odd, reference.convolveOdd.y)).toBeLessThan(1e-12);
  });

  it.each([
    [20_000, 5],
    [20_000, 301],
    [3_000, 2_001],
    [200, 1_001],
    [1, 301],
  ])('of %i samples and %i taps is the sum it stands for', (length, count) => {
    const signal = noise(length, 3);
    const kernel = centredKernel(noise(count, 4));
    for (const ends of ['zero', 'reflect-odd'] as const) {
      const wanted = filteredByDefinition(signal, kernel, ends);
      const scale = 1 + wanted.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
      const got = convolveSame(signal, kernel.taps, ends);
      expect(largestDifference(got, wanted) / scale).toBeLessThan(1e-12);
    }
  });
});

it('odd reflection goes on as numpy.pad does, beyond the signal’s own length too', () => {
  const { x, pad, y } = reference.padOdd;
  expect([...extend(Float64Array.from(x), pad, pad, 'reflect-odd')]).toEqual(y);
  expect([...extend(Float64Array.of(2, 3), 2, 1, 'hold')]).toEqual([2, 2, 2, 3, 3]);
  expect([...extend(Float64Array.of(2, 3), 1, 2, 'zero')]).toEqual([0, 2, 3, 0, 0]);
});
