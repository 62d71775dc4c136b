import {
  grunwaldLetnikov,
  grunwaldLetnikovResponse,
  grunwaldLetnikovWeights,
} from '../src/numeric/grunwald-letnikov';
import {
  savitzkyGolay,
  savitzkyGolayCutoff,
  savitzkyGolayGain,
  savitzkyGolayWeights,
} from '../src/numeric/savitzky-golay';
import { reciprocalGamma } from '../src/numeric/special';
import { firstOrderHighPassDb } from '../src/separate/filter-warnings';
import { ARITHMETIC, type CheckValue, EXACT, within } from './check-value';

const SAVITZKY = 'Savitzky & Golay 1964, recomputed';
const PODLUBNY = 'Podlubny 1999 (recurrence)';
const OLDHAM = 'Oldham & Spanier 1974';

const impulse = Float64Array.of(0, 0, 0, 0, 1, 0, 0, 0, 0);
const squares = Float64Array.of(0, 1, 4, 9, 16, 25, 36);
const sum = (x: Float64Array) => x.reduce((total, value) => total + value, 0);

/** Largest departure of a smoothed cubic from itself inside, over its largest value. */
function cubicError(window: number): number {
  const cubic = Float64Array.from({ length: 4 * window }, (_, i) => {
    const t = i / (2 * window) - 1;
    return 2 * t * t * t - t * t + 5;
  });
  const smooth = savitzkyGolay(cubic, window, 3);
  return cubic.reduce((most, value, i) => Math.max(most, Math.abs(smooth[i] - value)), 0) / 6;
}

const STEP = 0.01;
const ramp = Float64Array.from({ length: 101 }, (_, i) => i * STEP);
const ones = new Float64Array(101).fill(1);

/** Gain of order one half at 250 Hz with endless memory. */
function gain(freqHz: number): number {
  const { re, im } = grunwaldLetnikovResponse(0.5, 1 / 250, Number.POSITIVE_INFINITY, freqHz);
  return Math.hypot(re, im);
}

function halfTwice(count: number): Float64Array {
  const w = grunwaldLetnikovWeights(0.5, count);
  return Float64Array.from({ length: count }, (_, n) => {
    let total = 0;
    for (let k = 0; k <= n; k += 1) total += w[k] * w[n - k];
    return total;
  });
}

/** Smoothing, the fractional derivative, and the tilt of a high-pass. */
export const FILTER_CHECKS: readonly CheckValue[] = [
  {
    id: 'CV-01',
    what: 'Savitzky-Golay, 5 points, quadratic: a unit impulse',
    source: SAVITZKY,
    expected: [-3 / 35, 12 / 35, 17 / 35, 12 / 35, -3 / 35],
    tolerance: within(1e-12),
    got: () => savitzkyGolay(impulse, 5, 2).subarray(2, 7),
  },
  {
    id: 'CV-02',
    what: 'Savitzky-Golay, 25 points, quadratic: centre, edge, sum of the weights',
    source: SAVITZKY,
    expected: [467 / 5175, -253 / 5175, 1],
    tolerance: within(1e-9),
    got() {
      const weights = savitzkyGolayWeights(25, 2);
      return [weights[12], weights[0], sum(weights)];
    },
  },
  {
    id: 'CV-03',
    what: 'Savitzky-Golay, cubic, 5 and 1001 points: change of a cubic, over its size',
    source: ARITHMETIC,
    expected: [0, 0],
    tolerance: within(1e-9),
    got: () => [cubicError(5), cubicError(1001)],
  },
  {
    id: 'CV-04',
    what: 'Savitzky-Golay, 5 points: gain at a quarter and at half of the rate',
    source: ARITHMETIC,
    expected: [23 / 35, -13 / 35],
    tolerance: within(1e-12),
    got() {
      const weights = savitzkyGolayWeights(5, 2);
      return [savitzkyGolayGain(weights, 0.5), savitzkyGolayGain(weights, 1)];
    },
  },
  {
    id: 'CV-05',
    what: 'Savitzky-Golay, 5 points: slope of t² at 3',
    source: ARITHMETIC,
    expected: [6],
    tolerance: within(1e-12),
    got: () => [savitzkyGolay(squares, 5, 2, 1)[3]],
  },
  {
    id: 'CV-06',
    what: 'Savitzky-Golay, 25 points, quadratic: cut-off over half of the rate',
    source: ARITHMETIC,
    expected: [0.08544],
    tolerance: within(1e-4),
    got: () => [savitzkyGolayCutoff(25, 2)],
  },
  {
    id: 'CV-07',
    what: 'Grünwald-Letnikov weights, order 0.5',
    source: PODLUBNY,
    expected: [1, -0.5, -0.125, -0.0625, -0.0390625],
    tolerance: EXACT,
    got: () => grunwaldLetnikovWeights(0.5, 5),
  },
  {
    id: 'CV-08',
    what: 'Half derivative of t at 1, steps of 0.01',
    source: `${OLDHAM}; the step’s error by arithmetic`,
    expected: [1.1269696],
    tolerance: within(1e-6),
    got: () => [grunwaldLetnikov(ramp, 0.5, STEP)[100]],
  },
  {
    id: 'CV-08b',
    what: 'Half derivative of t at 4, exact',
    source: OLDHAM,
    expected: [2.2567583342],
    tolerance: within(1e-9),
    got: () => [2 * reciprocalGamma(1.5)],
  },
  {
    id: 'CV-08c',
    what: 'Half derivative of 1 at 1, steps of 0.01',
    source: `${OLDHAM}; the step’s error by arithmetic`,
    expected: [0.5634848],
    tolerance: within(1e-6),
    got: () => [grunwaldLetnikov(ones, 0.5, STEP)[100]],
  },
  {
    id: 'CV-08d',
    what: 'Weights of order 0.5 convolved with themselves: those of order 1',
    source: PODLUBNY,
    expected: [1, -1, 0, 0, 0, 0],
    tolerance: within(1e-12),
    got: () => halfTwice(6),
  },
  {
    id: 'CV-08e',
    what: 'Gain of order 0.5 at 250 Hz: at 1.25 Hz, at 0.05 Hz',
    source: ARITHMETIC,
    expected: [2.802438, 0.560499],
    tolerance: within(1e-5),
    got: () => [gain(1.25), gain(0.05)],
  },
  {
    id: 'CV-08e',
    what: 'Gain of order 0.5 at 250 Hz: 1.25 Hz over 0.05 Hz',
    source: ARITHMETIC,
    expected: [4.9999],
    tolerance: within(1e-4),
    got: () => [gain(1.25) / gain(0.05)],
  },
  {
    id: 'CV-08f',
    what: 'Sum of the weights of order 0.5 up to the tenth',
    source: PODLUBNY,
    expected: [0.176197052],
    tolerance: within(1e-9),
    got: () => [sum(grunwaldLetnikovWeights(0.5, 11))],
  },
  {
    id: 'CV-56',
    what: 'First-order high-pass of 0.05 Hz at 1, 3 and 9 cpm, dB',
    source: ARITHMETIC,
    expected: [-10, -3.01, -0.46],
    tolerance: within(0.01),
    got: () => [1, 3, 9].map((cpm) => firstOrderHighPassDb(0.05, cpm)),
  },
];
