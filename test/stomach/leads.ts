import { createFft, nextPowerOfTwo } from '../../src/numeric/fft';
import { createRandom } from '../../src/numeric/random';
import type { BreathingSeries } from '../../src/recording/heart-series';
import type { SlowOutput } from '../../src/recording/separated';
import { DEFAULT_SETTINGS, type Settings } from '../../src/recording/settings';
import type { Interval } from '../../src/recording/span';
import { slowWaveRhythm } from '../../src/stomach/slow-wave-rhythm';

export const RATE_HZ = 4;

/** A 4 Hz lead of `minutes` minutes from a function of time in seconds. */
export function leadOf(minutes: number, uvAt: (t: number) => number): Float64Array {
  return Float64Array.from({ length: minutes * 60 * RATE_HZ }, (_, i) => uvAt(i / RATE_HZ));
}

/** A cosine of some uV at cpm cycles per minute. */
export const wave = (uv: number, cpm: number, t: number, phase = 0) =>
  uv * Math.cos((2 * Math.PI * cpm * t) / 60 + phase);

/** Gaussian noise of 1/f^exponent power and the rms given, from the seed alone. */
export function noise(length: number, exponent: number, rmsUv: number, seed: number) {
  const random = createRandom(seed);
  const size = nextPowerOfTwo(2 * length);
  const spectrum = new Float64Array(2 * size);
  for (let k = 1; k < size / 2; k++) {
    const gain = (k / size) ** (-exponent / 2);
    const [re, im] = [gain * random.gaussian(), gain * random.gaussian()];
    spectrum.set([re, im], 2 * k);
    spectrum.set([re, -im], 2 * (size - k));
  }
  const out = new Float64Array(2 * size);
  createFft(size).inverse(spectrum, out);
  const x = Float64Array.from({ length }, (_, i) => out[2 * i]);
  const rms = Math.sqrt(x.reduce((sum, value) => sum + value * value, 0) / length);
  return x.map((value) => (rmsUv * value) / rms);
}

export function slowOf(signal: Float64Array, rateHz = RATE_HZ): SlowOutput {
  return {
    lead: '#1',
    rateHz,
    recorded: signal,
    slowWave: signal,
    forSpectra: signal,
    powerResponse: null,
    unclean: [],
    leadSAt: () => 0,
    notes: [],
  };
}

export interface Circumstances {
  readonly spoiled?: readonly Interval[];
  readonly breathing?: BreathingSeries;
  readonly settings?: Settings;
}

/** Rhythm of a whole lead as one phase. */
export function rhythmOfLead(signal: Float64Array, more: Circumstances = {}) {
  return slowWaveRhythm({
    slow: slowOf(signal),
    spoiled: more.spoiled ?? [],
    phases: [{ name: 'whole', fromS: 0, toS: signal.length / RATE_HZ }],
    settings: more.settings ?? DEFAULT_SETTINGS,
    breathing: more.breathing ?? null,
  });
}

/** Breathing at one rate all through. */
export function steadyBreathing(perMinute: number, minutes: number): BreathingSeries {
  return {
    centresS: Float64Array.from({ length: minutes }, (_, i) => 60 * i + 30),
    perMinute: new Float64Array(minutes).fill(perMinute),
    from: 'lead',
  };
}

/** How many epochs have each rhythm. */
export function tally(epochs: readonly { readonly rhythm: string | null }[]) {
  const counts: Record<string, number> = {};
  for (const { rhythm } of epochs) counts[rhythm ?? 'lost'] = (counts[rhythm ?? 'lost'] ?? 0) + 1;
  return counts;
}
