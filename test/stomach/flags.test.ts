import { describe, expect, test } from 'vitest';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import { phaseLock } from '../../src/stomach/harmonic';
import { rhythmOf } from '../../src/stomach/rhythm-class';
import { leadOf, noise, RATE_HZ, rhythmOfLead, steadyBreathing, tally, wave } from './leads';

const MINUTES = 30;
const background = noise(RATE_HZ * 60 * MINUTES, 1, 8, 23);
const withNoise = (uvAt: (t: number) => number) =>
  leadOf(MINUTES, (t) => uvAt(t) + background[Math.round(t * RATE_HZ)]);
const flagged = (epochs: readonly { readonly flags: readonly string[] }[], flag: string): number =>
  epochs.filter(({ flags }) => flags.includes(flag)).length;

/** A wave whose frequency wanders slowly about a mean: its phase in radians at t. */
const wandering = (cpm: number, t: number, depth: number, turnS: number) =>
  (2 * Math.PI * cpm * t) / 60 + depth * Math.sin((2 * Math.PI * t) / turnS);

describe('harmonic', () => {
  test('a sawtooth at 3 cpm is normogastria at 3.00, not tachygastria (CV-22)', () => {
    const signal = withNoise((t) => 150 * (((3 * t) / 60) % 1) - 75);
    const { epochs } = rhythmOfLead(signal).rhythm;
    expect(tally(epochs)).toEqual({ normo: 27 });
    for (const { dfCpm } of epochs) expect(dfCpm).toBeCloseTo(3, 1);
  });

  test('a second harmonic stronger than its wave gives way to it and is flagged', () => {
    const signal = withNoise((t) => wave(50, 3, t) + wave(90, 6, t, 1));
    const { epochs } = rhythmOfLead(signal).rhythm;
    expect(flagged(epochs, 'harmonic')).toBe(27);
    expect(tally(epochs)).toEqual({ normo: 27 });
    for (const { dfCpm, dpDb } of epochs) {
      expect(dfCpm).toBeCloseTo(3, 1);
      expect(dpDb).toBeCloseTo(53, 0);
    }
  });

  test('a harmonic that wanders with its wave stays locked to it', () => {
    const signal = withNoise((t) => {
      const phase = wandering(3, t, 0.45, 200);
      return 60 * Math.cos(phase) + 90 * Math.cos(2 * phase + 0.7);
    });
    const { epochs } = rhythmOfLead(signal).rhythm;
    expect(flagged(epochs, 'harmonic')).toBeGreaterThanOrEqual(24);
  });

  test('a rhythm near the double that goes its own way is tachygastria', () => {
    const signal = withNoise((t) => wave(50, 3, t) + wave(90, 6.2, t));
    const { epochs } = rhythmOfLead(signal).rhythm;
    expect(flagged(epochs, 'harmonic')).toBe(0);
    expect(tally(epochs)).toEqual({ tachy: 27 });
  });

  test('phase lock is 1 for a harmonic and low for a line 0.25 cpm beside it', () => {
    const locked = leadOf(4, (t) => wave(50, 3, t) + wave(90, 6, t, 1));
    const loose = leadOf(4, (t) => wave(50, 3, t) + wave(90, 6.25, t, 1));
    const part = (samples: Float64Array) => ({
      samples,
      kept: new Uint8Array(samples.length).fill(1),
      rateHz: RATE_HZ,
      lengthS: 240,
    });
    expect(phaseLock(part(locked), 3)).toBeGreaterThan(0.98);
    expect(phaseLock(part(loose), 3)).toBeLessThan(0.6);
  });
});

describe('half', () => {
  test('every second cycle larger puts the peak at half of the crest rate: shown as such', () => {
    const signal = withNoise((t) => wave(100, 3, t) + wave(130, 1.5, t));
    const { epochs } = rhythmOfLead(signal).rhythm;
    expect(flagged(epochs, 'half')).toBeGreaterThanOrEqual(24);
    for (const { dfCpm } of epochs) expect(dfCpm).toBeCloseTo(1.5, 1);
  });

  test('a plain wave is not flagged', () => {
    const { epochs } = rhythmOfLead(withNoise((t) => wave(100, 3, t))).rhythm;
    expect(epochs.flatMap(({ flags }) => flags)).toEqual([]);
  });
});

describe('breathing', () => {
  const signal = withNoise((t) => wave(80, 6, t));

  test('at 6 a minute makes a 6 cpm peak undecided, not tachygastria', () => {
    const { epochs } = rhythmOfLead(signal, { breathing: steadyBreathing(6, MINUTES) }).rhythm;
    expect(flagged(epochs, 'breathing')).toBe(27);
    expect(tally(epochs)).toEqual({ undecided: 27 });
  });

  test('at 15 a minute leaves the same peak tachygastria', () => {
    const { epochs } = rhythmOfLead(signal, { breathing: steadyBreathing(15, MINUTES) }).rhythm;
    expect(tally(epochs)).toEqual({ tachy: 27 });
  });

  test('whose line is stronger than a peak at half of its rate makes that undecided', () => {
    const lead = withNoise((t) => wave(60, 4.4, t) + wave(90, 8.8, t + 0.002 * t));
    const { epochs } = rhythmOfLead(lead, { breathing: steadyBreathing(8.8, MINUTES) }).rhythm;
    expect(tally(epochs)).toEqual({ undecided: 27 });
  });

  test('at twice a strong slow wave does not make the wave undecided', () => {
    const lead = withNoise((t) => wave(100, 3, t) + wave(40, 6.05, t));
    const { epochs } = rhythmOfLead(lead, { breathing: steadyBreathing(6.05, MINUTES) }).rhythm;
    expect(tally(epochs)).toEqual({ normo: 27 });
  });
});

describe('drift', () => {
  test('strong below 1 cpm does not become bradygastria', () => {
    const signal = withNoise((t) => wave(600, 0.5, t) + wave(60, 1.4, t));
    const { epochs } = rhythmOfLead(signal).rhythm;
    expect(tally(epochs).brady ?? 0).toBe(0);
  });

  test('a random walk of millivolts is no bradygastria', () => {
    const { epochs } = rhythmOfLead(noise(RATE_HZ * 3600 * 4, 2, 2000, 9)).rhythm;
    expect((tally(epochs).brady ?? 0) / epochs.length).toBeLessThan(0.05);
  });

  test('under a slow wave leaves it normogastria', () => {
    const signal = withNoise(
      (t) => wave(100, 3, t) + 2000 * Math.exp(-t / 300) + wave(300, 0.4, t),
    );
    expect(tally(rhythmOfLead(signal).rhythm.epochs)).toEqual({ normo: 27 });
  });

  test('a true 1.5 cpm wave on a quiet lead is bradygastria', () => {
    const { epochs } = rhythmOfLead(withNoise((t) => wave(100, 1.5, t))).rhythm;
    expect(tally(epochs)).toEqual({ brady: 27 });
  });
});

describe('a step from 3 to 5 cpm at half an hour (CV-15)', () => {
  const phaseAt = (t: number) => (t < 1800 ? 3 * t : 3 * 1800 + 5 * (t - 1800)) / 60;
  const signal = leadOf(60, (t) => 100 * Math.cos(2 * Math.PI * phaseAt(t)));
  const { epochs } = rhythmOfLead(signal).rhythm;
  const bandOf = (df: number | null) => rhythmOf(df ?? 0, DEFAULT_SETTINGS.rhythmBands);

  test('leaves 29 of 57 epochs with DF in 2-4 cpm, give or take the tied one', () => {
    expect(epochs).toHaveLength(57);
    const normal = epochs.filter(({ dfCpm }) => bandOf(dfCpm) === 'normo').length;
    expect(Math.abs(normal - 29)).toBeLessThanOrEqual(1);
  });

  test('makes the epochs that hold both rhythms mixed, and no other', () => {
    const mixed = epochs.filter(({ rhythm }) => rhythm === 'mixed');
    expect(mixed.length).toBeGreaterThanOrEqual(1);
    for (const { fromS, toS } of mixed) {
      expect(fromS).toBeLessThan(1800);
      expect(toS).toBeGreaterThan(1800);
    }
  });
});

describe('offset, line and gain', () => {
  const base = withNoise((t) => wave(100, 3, t) + wave(30, 7, t));
  const plain = rhythmOfLead(base).rhythm.epochs;

  test('1000 uV and 10 uV a minute more leave DF and rhythm, and power within 0.1 dB (CV-61)', () => {
    const moved = rhythmOfLead(base.map((uv, i) => uv + 1000 + i / 24)).rhythm.epochs;
    moved.forEach((epoch, i) => {
      expect(epoch.rhythm).toBe(plain[i].rhythm);
      expect(epoch.dfCpm).toBeCloseTo(plain[i].dfCpm ?? 0, 6);
      expect(Math.abs((epoch.dpDb ?? 0) - (plain[i].dpDb ?? 0))).toBeLessThan(0.1);
    });
  });

  test('twice the gain adds 6.021 dB to every DP and changes nothing else (CV-62)', () => {
    const doubled = rhythmOfLead(base.map((uv) => 2 * uv)).rhythm.epochs;
    doubled.forEach((epoch, i) => {
      expect((epoch.dpDb ?? 0) - (plain[i].dpDb ?? 0)).toBeCloseTo(6.021, 3);
      expect(epoch.dfCpm).toBeCloseTo(plain[i].dfCpm ?? 0, 9);
      expect(epoch.rhythm).toBe(plain[i].rhythm);
      expect(epoch.flags).toEqual(plain[i].flags);
    });
  });
});
