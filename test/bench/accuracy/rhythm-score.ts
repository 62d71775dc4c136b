import { hannPeriodic } from '../../../src/numeric/windows';
import type { Epoch, Rhythm } from '../../../src/recording/rhythm';
import { DEFAULT_SETTINGS } from '../../../src/recording/settings';
import type { StudyTruth } from '../../../src/simulate/simulate-study';
import { rhythmOf } from '../../../src/stomach/rhythm-class';

const { rhythmBands } = DEFAULT_SETTINGS;
/** A frequency that moves by less inside an epoch is steady. */
const STEADY_CPM = 0.2;
/** The nearer a steady frequency lies to a limit, the less its class says. */
const CLEAR_OF_LIMIT_CPM = 0.1;

export interface RhythmScore {
  /** DF less the true frequency, of kept epochs of steady rhythm, cpm. */
  readonly dfErrors: readonly number[];
  /** Kept epochs of steady rhythm clear of the limits, and how many of them got the class. */
  readonly steady: number;
  readonly right: number;
  /** Kept epochs with a true change of class by over a quarter of their weight, and how many are called mixed. */
  readonly changing: number;
  readonly mixed: number;
  /** Kept epochs in which breathing inside the search band is stronger than the wave, and how many are not decidable for it. */
  readonly breathing: number;
  readonly knownAsBreathing: number;
  /** Kept epochs of a study without a slow wave, and how many were given a rhythm. */
  readonly silent: number;
  readonly falseRhythm: number;
  readonly what: Readonly<Record<string, number>>;
}

interface EpochTruth {
  readonly cpm: number;
  readonly least: number;
  readonly most: number;
  /** Weight of the rhythm class with the most and of the rest. */
  readonly minority: number;
}

function truthOf(truth: StudyTruth, cpm: Float64Array, { fromS, toS }: Epoch): EpochTruth {
  const first = Math.round(fromS * truth.rateHz);
  const count = Math.round((toS - fromS) * truth.rateHz);
  const taper = hannPeriodic(count);
  const [amplitude] = truth.slowAmplitudeUv;
  let [weight, sum, least, most] = [0, 0, Number.POSITIVE_INFINITY, 0];
  const classes = new Map<Rhythm, number>();
  for (let i = 0; i < count; i += 1) {
    const value = cpm[first + i];
    const w = (taper[i] * amplitude[first + i]) ** 2;
    weight += w;
    sum += w * value;
    least = Math.min(least, value);
    most = Math.max(most, value);
    const rhythm = rhythmOf(value, rhythmBands);
    classes.set(rhythm, (classes.get(rhythm) ?? 0) + w);
  }
  return { cpm: sum / weight, least, most, minority: 1 - Math.max(...classes.values()) / weight };
}

const LIMITS = [rhythmBands.normoLowCpm, rhythmBands.normoHighCpm];

/** True where breathing lies inside the search band and is stronger than the wave over an epoch. */
function breathingLeads(truth: StudyTruth, breathingUv: number, { fromS, toS }: Epoch): boolean {
  const middle = Math.round(((fromS + toS) / 2) * truth.rateHz);
  const rate = truth.breathsPerMin?.[middle] ?? Number.POSITIVE_INFINITY;
  return rate < rhythmBands.highCpm && breathingUv > truth.slowAmplitudeUv[0][middle];
}

/** Rhythm of the epochs of a lead against the true course of the frequency; `breathingUv` is the peak of breathing on it. */
export function rhythmScore(
  epochs: readonly Epoch[],
  truth: StudyTruth,
  breathingUv: number,
): RhythmScore {
  const dfErrors: number[] = [];
  const what: Record<string, number> = {};
  const count = {
    steady: 0,
    right: 0,
    changing: 0,
    mixed: 0,
    breathing: 0,
    knownAsBreathing: 0,
    silent: 0,
    falseRhythm: 0,
  };
  const isRhythm = (one: Epoch) =>
    one.rhythm === 'brady' || one.rhythm === 'normo' || one.rhythm === 'tachy';
  for (const one of epochs) {
    if (!one.kept) continue;
    if (breathingLeads(truth, breathingUv, one)) {
      count.breathing += 1;
      if (one.rhythm === 'undecided') count.knownAsBreathing += 1;
      continue;
    }
    if (!truth.slowCpm) {
      count.silent += 1;
      if (isRhythm(one) || one.rhythm === 'mixed') count.falseRhythm += 1;
      continue;
    }
    const real = truthOf(truth, truth.slowCpm, one);
    if (real.minority > 0.25) {
      count.changing += 1;
      if (one.rhythm === 'mixed') count.mixed += 1;
    }
    if (real.most - real.least > STEADY_CPM) continue;
    if (isRhythm(one) && one.dfCpm !== null) dfErrors.push(one.dfCpm - real.cpm);
    if (LIMITS.some((limit) => Math.abs(limit - real.cpm) < CLEAR_OF_LIMIT_CPM)) continue;
    count.steady += 1;
    const wanted = rhythmOf(real.cpm, rhythmBands);
    if (one.rhythm === wanted) count.right += 1;
    else {
      const key = `${wanted} as ${one.rhythm}${one.flags.length > 0 ? ` (${one.flags.join(' ')})` : ''}`;
      what[key] = (what[key] ?? 0) + 1;
    }
  }
  return { dfErrors, ...count, what };
}
