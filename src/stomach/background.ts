import { exp, log, pow } from '../numeric/elementary';
import { type LogPoint, lineAt, type PowerLawLine, powerLawLine } from '../numeric/power-law-line';
import { median } from '../numeric/statistics';
import type { Cpm } from '../units/rate';
import type { Seconds } from '../units/time';
import type { Band, SpectrumPeak } from './dominant-peak';
import { EULER, logFrequencies } from './smooth-level';

/** Where the background is estimated; 0.5 cpm keeps clear of what taking off a line takes away. */
const FIT_CPM = { lowCpm: 0.5, highCpm: 15 };
/** Kept clear of the peak (its main lobe and a margin) and of its half and multiples, for 240 s. */
const PEAK_CLEARANCE_CPM = 0.75;
const HARMONIC_CLEARANCE_CPM = 0.5;
const HARMONICS = [0.5, 2, 3];
const CLEARANCE_LENGTH_S = 240;
/** A half below this (for 240 s) is not looked for; clearing it would leave slow peaks without a lower flank. */
const LEAST_HALF_CPM = 1;
/** How far the flanks reach whose median may lift the background, for 240 s, and the least of independent values in them. */
const FLANK_REACH_CPM = 2.75;
const LEAST_FLANK_VALUES = 4;
/** Logarithm of the median of an exponential variable of mean 1. */
const LOG_MEDIAN = -0.36651292058166435;
/** Drift as it is taken off reaches this many unpadded bins. */
const DRIFT_REACH_CELLS = 4;
/** Bins so far above a first fit (natural logarithm) are other lines, not background. */
const OUTLIER_LOG = 3;
/** Independent values of a Hann periodogram lie this many unpadded bins apart (its noise bandwidth). */
const HANN_BANDWIDTH_BINS = 1.5;

/** A spectrum with what is needed to judge a peak of it. */
export interface Spectrum {
  readonly density: Float64Array;
  readonly binCpm: number;
  readonly lengthS: Seconds;
  readonly spoiledFraction: number;
  /** Density with lines taken off; null where nothing is spoiled and lines do not reach far. */
  readonly without: ((frequenciesCpm: readonly Cpm[]) => Float64Array) | null;
}

/** The recording's own background at a peak. */
export interface Background {
  /** Expected density of the background at the peak, uV2/Hz. */
  readonly density: number;
  /** Variance of the fitted logarithm there over that of one independent value. */
  readonly leverage: number;
}

interface SpectrumPoint extends LogPoint {
  readonly cpm: Cpm;
}

function backgroundPoints(
  density: Float64Array,
  binCpm: number,
  peakCpm: Cpm,
  widening: number,
): SpectrumPoint[] {
  const floor = 1e-12 * density.reduce((most, value) => Math.max(most, value), 1e-280);
  const multiples = HARMONICS.filter((ratio) => ratio * peakCpm >= LEAST_HALF_CPM * widening);
  const points: SpectrumPoint[] = [];
  const logs = logFrequencies(binCpm, density.length);
  for (let k = Math.ceil(FIT_CPM.lowCpm / binCpm); k < density.length - 1; k++) {
    const cpm = k * binCpm;
    if (cpm > FIT_CPM.highCpm) break;
    if (Math.abs(cpm - peakCpm) < PEAK_CLEARANCE_CPM * widening) continue;
    const near = (ratio: number) =>
      Math.abs(cpm - ratio * peakCpm) < HARMONIC_CLEARANCE_CPM * widening;
    if (multiples.some(near)) continue;
    points.push({ cpm, x: logs[k], y: log(Math.max(floor, density[k])) });
  }
  return points;
}

/** How far (natural logarithm) the flanks of a peak lie above the line: 0 where they do not, or are too short to tell. */
function raiseOf(
  points: readonly SpectrumPoint[],
  line: PowerLawLine,
  peakCpm: Cpm,
  { reachCpm, least }: { readonly reachCpm: number; readonly least: number },
): number {
  const flanks = points.filter(({ cpm }) => Math.abs(cpm - peakCpm) <= reachCpm);
  if (flanks.length < least) return 0;
  return Math.max(0, median(flanks.map(({ x, y }) => y - lineAt(line, x))) - LOG_MEDIAN - EULER);
}

/**
 * The background that a peak of one epoch's density stands on: a line of 1/f^b (b from 0 to 3)
 * fitted to the logarithms of density and frequency in 0.5-15 cpm, without the peak's own main
 * lobe, its half (from 1 cpm on), double and triple, and without bins far above a first fit; lifted
 * to the median of the flanks within 2.75 cpm where that is higher, since a background may have a
 * broad hump. Null where too little is left.
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
  const first = powerLawLine(points);
  const kept = points.filter(({ x, y }) => y - lineAt(first, x) < OUTLIER_LOG);
  const line = powerLawLine(kept);
  const x = log(peakCpm);
  const binsPerValue = (HANN_BANDWIDTH_BINS * 60) / lengthS / binCpm;
  const spread = line.squares > 0 ? (x - line.meanX) ** 2 / line.squares : 0;
  const raise = raiseOf(kept, line, peakCpm, {
    reachCpm: FLANK_REACH_CPM * widening,
    least: LEAST_FLANK_VALUES * binsPerValue,
  });
  return {
    density: exp(lineAt(line, x) + EULER + raise),
    leverage: binsPerValue * (1 / line.count + spread),
  };
}

/** What the fit's own error adds to the threshold, per unit of leverage, and beside it. */
const PER_LEVERAGE = 1.25;
const BESIDE = 0.12;
/** What holes add, per spoiled fraction: side peaks to choose the highest from (measured in test/stomach/false-rhythm). */
const PER_SPOILED = 0.6;
const CALIBRATED_FALSE_ALARM = 0.05;
/** A peak so far above what is asked (natural logarithm) is no hump's. */
const FAR_ABOVE_LOG = 2;

/**
 * How far above its background (natural logarithm of the ratio) the highest of the peaks of a band
 * must stand. For white noise of known level the highest of m values exceeds -ln(1 - (1 - p)^(1/m))
 * times the mean with probability p, m the band's width over the resolution; the rest makes up for
 * the background being estimated. Calibrated on noise of 1/f^b, b = 0 to 2.5, in
 * test/reference/stomach-background.py: where 5 % are asked for, epochs of 240 s give 2.2 to 3.5 %
 * false alarms, epochs of 180 and 300 s 1.9 to 4.1 %.
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

/** Frequencies at which a slow drift is fitted before it is taken off. */
const driftCpm = (lengthS: Seconds): readonly Cpm[] => [0, 60 / lengthS, 120 / lengthS];

/** A spectrum without what a strong peak and drift spread over it from the holes of a spoiled window. */
export function besidePeak({ density, lengthS, without }: Spectrum, peakCpm: Cpm): Float64Array {
  return without ? without([...driftCpm(lengthS), peakCpm]) : density;
}

/**
 * What a spoiled window is judged by. The holes spread a strong drift and the peak's own line over
 * all frequencies; taken off by least squares before the transform, they do not. Below the search
 * band the drift is background and stays.
 */
function freedOfLeaks(
  { density, binCpm, lengthS, without }: Spectrum,
  peak: SpectrumPeak,
  besideCpm: readonly Cpm[],
) {
  if (!without) return { height: peak.density, background: density };
  const cellCpm = 60 / lengthS;
  const leaking = [...driftCpm(lengthS), ...besideCpm];
  const background = without([...leaking, peak.cpm]);
  background.set(density.subarray(0, Math.ceil((DRIFT_REACH_CELLS * cellCpm) / binCpm)));
  return { height: Math.min(peak.density, without(leaking)[peak.bin]), background };
}

/** True where a peak stands out of the local background at the false-alarm rate, as one of `independent`. */
export function standsOut(
  spectrum: Spectrum,
  peak: SpectrumPeak,
  options: {
    readonly falseAlarm: number;
    readonly independent: number;
    /** Stronger lines, which the holes of a spoiled window spread. */
    readonly besideCpm?: readonly Cpm[];
    /** The least background at the peak that the windows beside it allow, uV2/Hz; asked for near the limit only. */
    readonly leastBackground?: () => number;
    /** A longer window that holds this one: its background is as good, and known nearer to slow peaks. */
    readonly whole?: Spectrum;
  },
): boolean {
  if (!(peak.density > 0)) return false;
  const { binCpm, lengthS, spoiledFraction } = spectrum;
  const { height, background: density } = freedOfLeaks(spectrum, peak, options.besideCpm ?? []);
  const thresholdOver = ({ leverage }: Background) =>
    peakThreshold(options.falseAlarm, options.independent, leverage) +
    PER_SPOILED * spoiledFraction;
  const background = backgroundAt(density, binCpm, peak.cpm, lengthS);
  if (!background) return false;
  const threshold = thresholdOver(background);
  const above = log(height / background.density) - threshold;
  if (above > FAR_ABOVE_LOG) return true;
  if (above > 0)
    return !options.leastBackground || log(height / options.leastBackground()) > threshold;
  const { whole } = options;
  const longer = whole && backgroundAt(whole.density, whole.binCpm, peak.cpm, whole.lengthS);
  return longer ? log(height / longer.density) > thresholdOver(longer) : false;
}
