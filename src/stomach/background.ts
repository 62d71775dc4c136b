import { exp, log, pow } from '../numeric/elementary';
import type { Cpm } from '../units/rate';
import type { Seconds } from '../units/time';
import type { Band, SpectrumPeak } from './dominant-peak';

/** Where the background is estimated; 0.5 cpm keeps clear of what taking off a line takes away. */
const FIT_CPM = { lowCpm: 0.5, highCpm: 15 };
/** Kept clear of the peak (its main lobe and a margin) and of its half and multiples, for 240 s. */
const PEAK_CLEARANCE_CPM = 0.75;
const HARMONIC_CLEARANCE_CPM = 0.5;
const HARMONICS = [0.5, 2, 3];
const CLEARANCE_LENGTH_S = 240;
/** Bins so far above a first fit (natural logarithm) are other lines, not background. */
const OUTLIER_LOG = 3;
/** Exponents of a 1/f^b background that are believed. */
const LEAST_EXPONENT = 0;
const MOST_EXPONENT = 3;
/** Mean of the logarithm of an exponential variable of mean 1 is minus this (Euler's constant). */
const EULER = 0.5772156649015329;
/** Independent values of a Hann periodogram lie this many unpadded bins apart (its noise bandwidth). */
const HANN_BANDWIDTH_BINS = 1.5;

/** The recording's own background at a peak. */
export interface Background {
  /** Expected density of the background at the peak, uV2/Hz. */
  readonly density: number;
  /** Variance of the fitted logarithm there over that of one independent value. */
  readonly leverage: number;
}

interface LogPoint {
  readonly x: number;
  readonly y: number;
}

interface LogLine {
  readonly meanX: number;
  readonly meanY: number;
  readonly slope: number;
  readonly squares: number;
  readonly count: number;
}

function logLine(points: readonly LogPoint[]): LogLine {
  const count = points.length;
  const meanX = points.reduce((sum, point) => sum + point.x, 0) / count;
  const meanY = points.reduce((sum, point) => sum + point.y, 0) / count;
  let squares = 0;
  let product = 0;
  for (const { x, y } of points) {
    squares += (x - meanX) ** 2;
    product += (x - meanX) * (y - meanY);
  }
  const exponent = squares > 0 ? -product / squares : 0;
  const slope = -Math.min(MOST_EXPONENT, Math.max(LEAST_EXPONENT, exponent));
  return { meanX, meanY, slope, squares, count };
}

const lineAt = (line: LogLine, x: number) => line.meanY + line.slope * (x - line.meanX);

function backgroundPoints(
  density: Float64Array,
  binCpm: number,
  peakCpm: Cpm,
  widening: number,
): LogPoint[] {
  const floor = 1e-12 * density.reduce((most, value) => Math.max(most, value), 1e-280);
  const points: LogPoint[] = [];
  for (let k = Math.ceil(FIT_CPM.lowCpm / binCpm); k < density.length - 1; k++) {
    const cpm = k * binCpm;
    if (cpm > FIT_CPM.highCpm) break;
    if (Math.abs(cpm - peakCpm) < PEAK_CLEARANCE_CPM * widening) continue;
    const near = (ratio: number) =>
      Math.abs(cpm - ratio * peakCpm) < HARMONIC_CLEARANCE_CPM * widening;
    if (HARMONICS.some(near)) continue;
    points.push({ x: log(cpm), y: log(Math.max(floor, density[k])) });
  }
  return points;
}

/**
 * The 1/f^b background (b from 0 to 3) that a peak of one epoch's density stands on: a line fitted
 * to the logarithms of density and frequency in 0.5-15 cpm, without the peak's own main lobe, its
 * half, double and triple, and without bins far above a first fit. Null where too little is left.
 */
export function backgroundAt(
  density: Float64Array,
  binCpm: number,
  peakCpm: Cpm,
  lengthS: Seconds,
): Background | null {
  const widening = CLEARANCE_LENGTH_S / lengthS;
  const points = backgroundPoints(density, binCpm, peakCpm, widening);
  if (points.length < 8) return null;
  const first = logLine(points);
  const line = logLine(points.filter(({ x, y }) => y - lineAt(first, x) < OUTLIER_LOG));
  const x = log(peakCpm);
  const binsPerValue = (HANN_BANDWIDTH_BINS * 60) / lengthS / binCpm;
  const spread = line.squares > 0 ? (x - line.meanX) ** 2 / line.squares : 0;
  return {
    density: exp(lineAt(line, x) + EULER),
    leverage: binsPerValue * (1 / line.count + spread),
  };
}

/** What the fit's own error adds to the threshold, per unit of leverage, and beside it. */
const PER_LEVERAGE = 1.25;
const BESIDE = 0.08;
const CALIBRATED_FALSE_ALARM = 0.05;

/**
 * How far above its background (natural logarithm of the ratio) the highest of the peaks of a band
 * must stand. For white noise of known level the highest of m values exceeds -ln(1 - (1 - p)^(1/m))
 * times the mean with probability p, m the band's width over the resolution; the rest makes up for
 * the background being estimated. Calibrated on noise of 1/f^b, b = 0 to 2.5, in
 * test/reference/stomach-background.py: where 5 % are asked for, epochs of 240 s give 3.4 to 5.4 %
 * false alarms, epochs of 180 and 300 s 2.4 to 6 %.
 */
export function peakThreshold(falseAlarm: number, independent: number, leverage: number): number {
  if (!(falseAlarm > 0 && falseAlarm < 1))
    throw new Error(`a false-alarm rate lies between 0 and 1, not at ${falseAlarm}`);
  const known = -log(1 - pow(1 - falseAlarm, 1 / Math.max(1, independent)));
  const tail = (log(falseAlarm) / log(CALIBRATED_FALSE_ALARM)) ** 2;
  return log(known) + BESIDE * tail + PER_LEVERAGE * leverage;
}

/** Resolution cells of an epoch's spectrum in a band: its width in unpadded bins. */
export function independentValues(band: Band, lengthS: Seconds): number {
  return ((band.highCpm - band.lowCpm) * lengthS) / 60;
}

/** True where a peak stands out of the local background at the false-alarm rate, as one of `independent`. */
export function standsOut(
  density: Float64Array,
  binCpm: number,
  peak: SpectrumPeak,
  options: { readonly lengthS: Seconds; readonly falseAlarm: number; readonly independent: number },
): boolean {
  if (!(peak.density > 0)) return false;
  const background = backgroundAt(density, binCpm, peak.cpm, options.lengthS);
  if (!background) return false;
  const threshold = peakThreshold(options.falseAlarm, options.independent, background.leverage);
  return log(peak.density / background.density) > threshold;
}
