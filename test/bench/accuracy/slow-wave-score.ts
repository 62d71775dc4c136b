import { convolveSame } from '../../../src/numeric/fir';
import { welch } from '../../../src/numeric/spectrum';
import { hannPeriodic } from '../../../src/numeric/windows';
import { gainTaps } from '../../../src/separate/fitted-gain';
import { createSlowSampler } from '../../../src/separate/slow-rate';
import { type LeadSources, SOURCES, type StudyTruth } from '../../../src/simulate/simulate-study';
import { spoiledOf } from './heart-score';

const RATE_HZ = 4;
const WINDOW_S = 240;
const SIZE = 4096;
const LOWEST_HZ = 0.5 / 60;
/** Ends of the study that every filter feels. */
const END_S = 60;

/** Signal over what is not signal in the drawn wave, dB, outside spoiled stretches. */
export interface SlowWaveScore {
  readonly drawnDb: number;
  /** The best fixed linear filter (Wiener 1949), from the spectra of the known sources over the same minutes. */
  readonly bestDb: number;
  /** The lead as it is. */
  readonly rawDb: number;
}

/** A signal at 4 Hz, as the program makes it. */
export function at4Hz(samples: Float64Array, rateHz: number): Float64Array {
  const sampler = createSlowSampler(rateHz);
  sampler.push(samples);
  return sampler.finish();
}

function cleanMask(truth: StudyTruth, length: number): Uint8Array {
  const mask = new Uint8Array(length).fill(1);
  mask.fill(0, 0, END_S * RATE_HZ).fill(0, length - END_S * RATE_HZ);
  for (const { fromS, toS } of spoiledOf(truth, 5))
    mask.fill(0, Math.max(0, Math.floor(fromS * RATE_HZ)), Math.max(0, Math.ceil(toS * RATE_HZ)));
  return mask;
}

/** Signal over error in dB after the best scale, over the samples of a mask; a constant counts as neither. */
function signalToError(truth: Float64Array, drawn: Float64Array, mask: Uint8Array): number {
  const [s, d] = [truth, drawn].map((x) => x.filter((_, i) => mask[i] === 1));
  const mean = (x: Float64Array) => x.reduce((sum, one) => sum + one, 0) / x.length;
  const [ms, md] = [mean(s), mean(d)];
  let [sd, dd, ss] = [0, 0, 0];
  for (let i = 0; i < s.length; i += 1) {
    sd += (s[i] - ms) * (d[i] - md);
    dd += (d[i] - md) ** 2;
    ss += (s[i] - ms) ** 2;
  }
  return 10 * Math.log10(ss / (ss - (sd * sd) / dd));
}

/** Mean periodogram of half-overlapping Hann windows, padded fourfold, mean and line of each taken off. */
function meanDensity(x: Float64Array): Float64Array {
  const taper = hannPeriodic(WINDOW_S * RATE_HZ);
  return welch(x, {
    rateHz: RATE_HZ,
    taper,
    step: taper.length / 2,
    size: SIZE,
    detrend: 'line',
  });
}

/**
 * What the best fixed linear filter draws (Wiener 1949: S / (S + N), from the spectra of the known sources without
 * artefacts), on a lead without artefacts. Below half a cycle a minute, where the taken-off line leaves nothing to tell
 * drift by, it passes nothing.
 */
function bestSignalToError(signal: Float64Array, rest: Float64Array, mask: Uint8Array): number {
  const s = meanDensity(signal);
  const n = meanDensity(rest);
  const gain = s.map((power, k) =>
    (k * RATE_HZ) / SIZE < LOWEST_HZ ? 0 : power / (power + n[k] + 1e-12),
  );
  const drawn = convolveSame(
    signal.map((value, i) => value + rest[i]),
    gainTaps(gain, SIZE, WINDOW_S * RATE_HZ),
    'reflect-odd',
  );
  return signalToError(signal, drawn, mask);
}

/** The drawn slow wave of a lead against the wave that went in, beside the best that a fixed linear filter could do. */
export function slowWaveScore(
  drawn: Float64Array,
  lead: Float64Array,
  sources: LeadSources,
  truth: StudyTruth,
  rateHz: number,
): SlowWaveScore {
  const wave = at4Hz(sources['slow wave'], rateHz);
  const rest = new Float64Array(lead.length);
  for (const source of SOURCES) {
    if (source === 'slow wave' || source === 'artefacts') continue;
    for (let i = 0; i < rest.length; i += 1) rest[i] += sources[source][i];
  }
  const mask = cleanMask(truth, wave.length);
  return {
    drawnDb: signalToError(wave, drawn, mask),
    bestDb: bestSignalToError(wave, at4Hz(rest, rateHz), mask),
    rawDb: signalToError(wave, at4Hz(lead, rateHz), mask),
  };
}
