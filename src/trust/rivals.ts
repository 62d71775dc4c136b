import { coherenceAt } from '../numeric/coherence-at';
import { crossSpectrum } from '../numeric/cross-spectrum';
import { hannPeriodic } from '../numeric/windows';
import { type Cpm, cpmToHz, type Hertz } from '../units/rate';

/** Segments over which rivals are looked at. */
const SEGMENT_S = 120;
const STEP_S = 30;
const FALSE_ALARM = 0.05;
/** Breathing this near to a whole multiple of DF may fall into step with the slow wave (common practice, no source). */
const NEAR_MULTIPLE = 0.1;
const MOST_MULTIPLE = 6;
/** Half width of the bands whose power is compared. */
const BAND_CPM: Cpm = 0.5;

/** What breathing and intervals share at DF. */
export interface BreathingAtDf {
  /** Magnitude-squared; null where breathing or clean segments are wanting. */
  readonly coherence: number | null;
  readonly level: number;
}

/** Coherence of intervals and breathing at DF; both on one grid, NaN in holes. */
export function breathingAtDf(
  course: Float64Array,
  breathing: Float64Array,
  rateHz: Hertz,
  dfCpm: Cpm,
): BreathingAtDf {
  const { coherence, level } = coherenceAt(course, breathing, {
    rateHz,
    freqHz: cpmToHz(dfCpm),
    segmentS: SEGMENT_S,
    stepS: STEP_S,
    falseAlarm: FALSE_ALARM,
  });
  return { coherence, level };
}

/** The whole multiple of DF, 1 to 6, that a breathing rate is within a tenth of DF of; null where there is none. */
export function nearMultiple(breathsPerMinute: number, dfCpm: Cpm): number | null {
  const times = breathsPerMinute / dfCpm;
  const whole = Math.round(times);
  return whole >= 1 && whole <= MOST_MULTIPLE && Math.abs(times - whole) <= NEAR_MULTIPLE
    ? whole
    : null;
}

/**
 * Power of a course about twice DF over that about DF, each within 0.5 cpm; null where no segment of two minutes is whole
 * or nothing moves at DF.
 */
export function powerAtDouble(course: Float64Array, rateHz: Hertz, dfCpm: Cpm): number | null {
  const length = Math.round(SEGMENT_S * rateHz);
  const step = Math.max(1, Math.round(STEP_S * rateHz));
  const whole = (from: number) => !course.subarray(from, from + length).some(Number.isNaN);
  let from = 0;
  while (from + length <= course.length && !whole(from)) from += step;
  if (from + length > course.length) return null;
  const options = {
    rateHz,
    taper: hannPeriodic(length),
    step,
    size: length,
    detrend: 'line',
  } as const;
  const { cross } = crossSpectrum(course, course, options);
  const near = (cpm: Cpm): number => {
    const [low, high] = [cpm - BAND_CPM, cpm + BAND_CPM].map(
      (edge) => (cpmToHz(edge) * length) / rateHz,
    );
    let sum = 0;
    for (let k = Math.ceil(low); k <= high; k += 1) sum += cross[2 * k] ?? 0;
    return sum;
  };
  const atDf = near(dfCpm);
  return atDf > 0 ? near(2 * dfCpm) / atDf : null;
}
