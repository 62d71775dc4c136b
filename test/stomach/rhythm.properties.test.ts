import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Epoch } from '../../src/recording/rhythm';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import { crestTimes } from '../../src/stomach/crests';
import { peakShare } from '../../src/stomach/dominant-peak';
import { slowWaveRhythm } from '../../src/stomach/slow-wave-rhythm';
import { windowSpectra } from '../../src/stomach/window-spectrum';
import { largestDifference } from '../numeric/signals';
import { always, numbers, sizeOf, times } from '../properties';
import { leadOf, noise, RATE_HZ, rhythmOfLead, slowOf, wave } from './leads';

const MINUTES = 12;

/** A wave of 80 uV at 1.3 to 8 cpm with a harmonic, in 1/f noise. */
interface Made {
  readonly cpm: number;
  readonly phase: number;
  readonly rmsUv: number;
  readonly draw: number;
}

const leads: fc.Arbitrary<Made> = fc.record({
  cpm: numbers(1.3, 8),
  phase: numbers(-3, 3),
  rmsUv: numbers(5, 60),
  draw: fc.nat(),
});

function signalOf({ cpm, phase, rmsUv, draw }: Made): Float64Array {
  const rest = noise(RATE_HZ * 60 * MINUTES, 1, rmsUv, draw);
  return leadOf(MINUTES, (t) => wave(80, cpm, t, phase) + wave(25, 2 * cpm, t)).map(
    (value, i) => value + rest[i],
  );
}

const epochsOf = (signal: Float64Array) => rhythmOfLead(signal).rhythm.epochs;

/** All of an epoch but its power and the flag that crests alone raise: upside down they are troughs. */
const shown = ({ dpDb: _, dfCpm, peakShare: share, flags, ...rest }: Epoch) => ({
  ...rest,
  flags: flags.filter((flag) => flag !== 'half'),
  df: dfCpm?.toFixed(6),
  share: share?.toFixed(6),
});

describe('rhythm of the slow wave', () => {
  it('is the same upside down', () => {
    fc.assert(
      fc.property(leads, (made) => {
        const signal = signalOf(made);
        expect(epochsOf(times(-1, signal)).map(shown)).toEqual(epochsOf(signal).map(shown));
      }),
      always(15),
    );
  });

  it('at another gain has DP moved by its dB and nothing else changed', () => {
    fc.assert(
      fc.property(leads, numbers(0.05, 20), (made, gain) => {
        const signal = signalOf(made);
        const [plain, louder] = [epochsOf(signal), epochsOf(times(gain, signal))];
        expect(louder.map(shown)).toEqual(plain.map(shown));
        louder.forEach(({ dpDb }, i) => {
          expect((dpDb ?? 0) - (plain[i].dpDb ?? 0)).toBeCloseTo(20 * Math.log10(gain), 9);
        });
      }),
      always(15),
    );
  });

  it('does not see an offset and a line', () => {
    fc.assert(
      fc.property(leads, numbers(-3e5, 3e5), numbers(-2, 2), (made, level, uvPerS) => {
        const signal = signalOf(made);
        const plain = epochsOf(signal);
        const moved = epochsOf(signal.map((value, i) => value + level + (uvPerS * i) / RATE_HZ));
        moved.forEach((epoch, i) => {
          expect(epoch.dfCpm).toBeCloseTo(plain[i].dfCpm ?? Number.NaN, 6);
          expect(epoch.dpDb).toBeCloseTo(plain[i].dpDb ?? Number.NaN, 6);
        });
      }),
      always(15),
    );
  });

  it('of the same stretch later in the recording is the same, as much later', () => {
    fc.assert(
      fc.property(leads, fc.integer({ min: 1, max: 240 }), (made, quarters) => {
        const signal = signalOf(made);
        const before = noise(quarters, 1, 50, quarters);
        const whole = Float64Array.from([...before, ...signal]);
        const byS = quarters / RATE_HZ;
        const { rhythm } = slowWaveRhythm({
          slow: slowOf(whole),
          spoiled: [{ fromS: 0, toS: byS }],
          phases: [{ name: 'whole', fromS: byS, toS: byS + 60 * MINUTES }],
          settings: DEFAULT_SETTINGS,
          breathing: null,
        });
        const plain = epochsOf(signal);
        expect(rhythm.epochs).toHaveLength(plain.length);
        rhythm.epochs.forEach((epoch, i) => {
          expect(epoch.fromS - byS).toBeCloseTo(plain[i].fromS, 9);
          expect(epoch.dfCpm).toBe(plain[i].dfCpm);
          expect(epoch.dpDb).toBe(plain[i].dpDb);
          expect(epoch.rhythm).toBe(plain[i].rhythm);
        });
      }),
      always(15),
    );
  });

  it('does not depend on what was recorded in a spoiled stretch', () => {
    fc.assert(
      fc.property(
        leads,
        fc.nat(2400),
        fc.integer({ min: 2, max: 240 }),
        numbers(-1e5, 1e5),
        (made, first, count, uv) => {
          const signal = signalOf(made);
          const [fromS, lengthS] = [first / RATE_HZ, count / RATE_HZ];
          const spoiled = [{ fromS, toS: fromS + lengthS }];
          const wild = signal.map((value, i) => (i >= first && i < first + count ? uv : value));
          const [a, b] = [signal, wild].map((one) => rhythmOfLead(one, { spoiled }).rhythm.epochs);
          expect(a.map(({ dfCpm, dpDb, kept }) => [dfCpm, dpDb, kept])).toEqual(
            b.map(({ dfCpm, dpDb, kept }) => [dfCpm, dpDb, kept]),
          );
        },
      ),
      always(15),
    );
  });
});

describe('the spectrum of an epoch', () => {
  const of = (signal: Float64Array, kept = new Uint8Array(signal.length).fill(1)) => {
    const spectra = windowSpectra({
      signal,
      kept,
      rateHz: RATE_HZ,
      lengthS: 240,
      powerResponse: null,
    });
    return { density: spectra.density(spectra.prepare(0)), binCpm: spectra.binCpm };
  };

  it('has a peak share from 0 to 1 at any frequency', () => {
    fc.assert(
      fc.property(leads, numbers(1, 9), (made, cpm) => {
        const signal = signalOf(made);
        const { density, binCpm } = of(signal);
        const band = { lowCpm: 1, highCpm: 9 };
        const share = peakShare(density, binCpm, cpm, band);
        expect(share).toBeGreaterThanOrEqual(0);
        expect(share).toBeLessThanOrEqual(1);
      }),
      always(30),
    );
  });

  it('divided by a response is that of the lead before it', () => {
    fc.assert(
      fc.property(leads, numbers(0.2, 5), (made, gain) => {
        const signal = signalOf(made);
        const spectra = windowSpectra({
          signal: times(gain, signal),
          kept: new Uint8Array(signal.length).fill(1),
          rateHz: RATE_HZ,
          lengthS: 240,
          powerResponse: () => gain * gain,
        });
        const { density } = of(signal);
        const got = spectra.density(spectra.prepare(0));
        expect(
          largestDifference(got.subarray(1), density.subarray(1)) / sizeOf(density),
        ).toBeLessThan(1e-12);
      }),
      always(20),
    );
  });
});

describe('crests', () => {
  const options = { rateHz: RATE_HZ, highCpm: 9, unclean: [] };

  it('come as much later as the wave, and at any gain at the same times', () => {
    fc.assert(
      fc.property(numbers(1.5, 8), numbers(0, 20), numbers(0.1, 1_000), (cpm, byS, uv) => {
        const of = (shiftS: number, height: number) =>
          [
            ...crestTimes(
              leadOf(8, (t) => wave(height, cpm, t - shiftS)),
              options,
            ),
          ].filter((t) => t > 60 && t < 400);
        const period = 60 / cpm;
        for (const t of of(byS, uv)) {
          const turns = (t - byS) / period;
          expect(Math.abs(turns - Math.round(turns)) * period).toBeLessThan(0.02);
        }
        expect(of(byS, 2 * uv)).toEqual(of(byS, uv));
        const count = of(byS, uv).length;
        expect(Math.abs(count - 340 / period)).toBeLessThan(1.01);
      }),
      always(40),
    );
  });
});
