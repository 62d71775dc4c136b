import { burg } from '../src/numeric/burg';
import { dpss } from '../src/numeric/dpss';
import { cos, log10, sin } from '../src/numeric/elementary';
import { createFft } from '../src/numeric/fft';
import { lombScargle } from '../src/numeric/lomb-scargle';
import { logParabola } from '../src/numeric/peaks';
import { binHz, powerDensity } from '../src/numeric/spectrum';
import { wilson } from '../src/numeric/statistics';
import {
  effectiveAverages,
  hannPeriodic,
  noiseBandwidthBins,
  overlapCorrelation,
} from '../src/numeric/windows';
import { ARITHMETIC, type CheckValue, within, withinShare } from './check-value';

const HARRIS = 'Harris 1978';
const RATE_HZ = 4;
const taper = hannPeriodic(960);

/** Four minutes at 4 Hz of 100 uV at some cpm. */
export const tone = (cpm: number, phase = 0): Float64Array =>
  Float64Array.from(
    { length: 960 },
    (_, i) => 100 * cos((2 * Math.PI * cpm * i) / (60 * RATE_HZ) + phase),
  );

const largestAt = (density: Float64Array): number =>
  density.reduce((best, value, k) => (value > density[best] ? k : best), 0);

/** Bin of the largest density, and its place in cpm by a parabola through the logarithm. */
function peakOf(signal: Float64Array, size: number): { bin: number; cpm: number; density: number } {
  const density = powerDensity(signal, taper, RATE_HZ, size);
  const bin = largestAt(density);
  const { offset } = logParabola(density[bin - 1], density[bin], density[bin + 1]);
  return { bin, cpm: (bin + offset) * binHz(RATE_HZ, size) * 60, density: density[bin] };
}

function totalPower(signal: Float64Array): number {
  const density = powerDensity(signal, taper, RATE_HZ, 960);
  return density.reduce((sum, value) => sum + value, 0) * binHz(RATE_HZ, 960);
}

/** Loss in dB of a line halfway between two bins. */
function scallopDb(): number {
  let half = 0;
  let whole = 0;
  for (let i = 0; i < 960; i += 1) {
    half += taper[i] * cos((Math.PI * (i - 480)) / 960);
    whole += taper[i];
  }
  return -20 * log10(half / whole);
}

function lombPeakHz(): number {
  const times = Float64Array.of(0, 0.8, 1.7, 2.5, 3.6, 4.4, 5.1, 6.3, 7, 8.2);
  const freqs = Float64Array.from({ length: 4001 }, (_, k) => 0.05 + k * 1e-4);
  const values = times.map((t) => sin(2 * Math.PI * 0.25 * t));
  return freqs[largestAt(lombScargle(times, values, freqs))];
}

function transformedPower(): number {
  const out = new Float64Array(8);
  createFft(4).forwardReal(Float64Array.of(1, 2, 3, 4), out);
  return out.reduce((sum, value) => sum + value * value, 0) / 4;
}

/** Transforms, spectra, tapers, and the interval of a share. */
export const SPECTRUM_CHECKS: readonly CheckValue[] = [
  {
    id: 'CV-10',
    what: '100 µV at 3 cpm, 240 s, Hann: power density at its peak, µV²/Hz',
    source: ARITHMETIC,
    expected: [800_000],
    tolerance: withinShare(1e-6),
    got: () => [peakOf(tone(3), 960).density],
  },
  {
    id: 'CV-10',
    what: 'the same wave: its frequency, cpm',
    source: ARITHMETIC,
    expected: [3],
    tolerance: withinShare(1e-6),
    got: () => [peakOf(tone(3), 960).cpm],
  },
  {
    id: 'CV-10',
    what: 'the same wave: power in all, µV²',
    source: ARITHMETIC,
    expected: [5000],
    tolerance: withinShare(1e-6),
    got: () => [totalPower(tone(3))],
  },
  {
    id: 'CV-11',
    what: 'A wave at 3.1 cpm between two bins: bin, cpm unpadded, cpm padded four times',
    source: ARITHMETIC,
    expected: [12, 3.103, 3.1],
    tolerance: within(0.0005),
    got() {
      const { bin, cpm } = peakOf(tone(3.1, 0.3), 960);
      return [bin, cpm, peakOf(tone(3.1, 0.3), 3840).cpm];
    },
  },
  {
    id: 'CV-31',
    what: 'Lomb-Scargle of ten uneven samples of 0.25 Hz: its peak, Hz',
    source: 'arithmetic, after Lomb 1976 and Scargle 1982',
    expected: [0.2501],
    tolerance: within(0.005),
    got: () => [lombPeakHz()],
  },
  {
    id: 'CV-49',
    what: 'Hann of 960 points: noise bandwidth in bins, scalloping in dB, overlap correlation at 75 %',
    source: HARRIS,
    expected: [1.5, 1.4236, 0.65915],
    tolerance: within(1e-4),
    got: () => [noiseBandwidthBins(taper), scallopDb(), overlapCorrelation(taper, 240)],
  },
  {
    id: 'CV-50',
    what: 'What 27 and 57 spectra at 75 % overlap are worth',
    source: 'Welch 1967',
    expected: [14.298, 29.883],
    tolerance: within(0.001),
    got: () => [27, 57].map((count) => effectiveAverages(count, taper, 240)),
  },
  {
    id: 'CV-51',
    what: 'Sum of squares of 1 2 3 4 by their transform (Parseval)',
    source: ARITHMETIC,
    expected: [30],
    tolerance: within(1e-12),
    got: () => [transformedPower()],
  },
  {
    id: 'CV-52',
    what: 'Burg’s reflections of 1 2 3 4',
    source: 'arithmetic, after Burg 1975',
    expected: [-0.9302326, 0.9386632],
    tolerance: within(1e-6),
    got: () => burg(Float64Array.of(1, 2, 3, 4), 2).reflections,
  },
  {
    id: 'CV-55',
    what: 'Concentrations of the Slepian tapers, NW 2.5, 960 points',
    source: 'definition of Slepian 1978, by dense eigenvectors',
    expected: [0.999997, 0.999843, 0.996216, 0.952126],
    tolerance: within(1e-4),
    got: () => dpss(960, 2.5, 4).concentrations,
  },
  {
    id: 'CV-58',
    what: 'Wilson’s interval of 5 of 7 and of 21 of 30',
    source: 'Wilson 1927',
    expected: [0.359, 0.918, 0.521, 0.833],
    tolerance: within(0.001),
    got() {
      const [few, more] = [wilson(5, 7), wilson(21, 30)];
      return [few.low, few.high, more.low, more.high];
    },
  },
  {
    id: 'CV-59',
    what: 'The density of CV-10 in µV²/cpm',
    source: ARITHMETIC,
    expected: [13_333.3],
    tolerance: within(0.1),
    got: () => [peakOf(tone(3), 960).density / 60],
  },
];
