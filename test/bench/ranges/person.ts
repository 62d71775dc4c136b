import { createRandom, type Random } from '../../../src/numeric/random';
import { RATE_HZ } from '../../stomach/leads';

/**
 * An invented person at rest: every tendency is a number, and about each the person wanders as a first-order Markov process
 * (Ornstein and Uhlenbeck 1930) of one correlation time. Truth is the tendency, what endless rest would show; half an hour of it
 * shows a little more or less.
 */
export interface Person {
  /** Time by which a wander has forgotten itself to a third, in minutes. */
  readonly wanderMin: number;
  readonly dfCpm: number;
}

/** SD of DF about its tendency, and of the logarithm of every amplitude. */
const DF_SD_CPM = 0.25;
const AMPLITUDE_SD = 0.35;
const STOMACH_UV = { fasting: 60, fed: 90 } as const;
/** Rest of the lead: Markov processes of these times, of equal rms. */
const NOISE_S = [1, 4, 16, 64];
const NOISE_UV = 15;

const RR_MS = { fasting: 880, fed: 820 } as const;
const HF_MS = { fasting: 30, fed: 24 } as const;
const LF_MS = 25;
const BREATHS_PER_MIN = 15;
const LF_HZ = 0.1;
/** Slower movements of the intervals, about like 1/f, and a trend over half an hour. */
const SLOW_S = [10, 60, 300];
const SLOW_MS = 12;
const WHITE_MS = 4;
const TREND_MS = 20;
const HALF_HOUR_S = 1800;

export type State = 'fasting' | 'fed';

/** A wander of variance 1, asked for at ascending times. */
function wander(random: Random, timeS: number): (stepS: number) => number {
  let value = random.gaussian();
  let [lastS, keep, fresh] = [0, 1, 0];
  return (stepS) => {
    if (stepS !== lastS) {
      keep = Math.exp(-stepS / timeS);
      fresh = Math.sqrt(1 - keep * keep);
      lastS = stepS;
    }
    value = keep * value + fresh * random.gaussian();
    return value;
  };
}

/** A lead of the stomach at 4 Hz, in uV. */
export function stomachLead(person: Person, state: State, minutes: number, seed: number) {
  const random = createRandom(seed);
  const df = wander(random, 60 * person.wanderMin);
  const height = wander(random, 60 * person.wanderMin);
  const noises = NOISE_S.map((timeS) => wander(random, timeS));
  const stepS = 1 / RATE_HZ;
  let cycles = random.uniform();
  return Float64Array.from({ length: minutes * 60 * RATE_HZ }, () => {
    cycles += (stepS * (person.dfCpm + DF_SD_CPM * df(stepS))) / 60;
    const uv = STOMACH_UV[state] * Math.exp(AMPLITUDE_SD * height(stepS));
    const rest = noises.reduce((sum, next) => sum + next(stepS), 0) / Math.sqrt(noises.length);
    return uv * Math.cos(2 * Math.PI * cycles) + NOISE_UV * rest;
  });
}

/** Intervals between heartbeats in ms, as many as fill the minutes and two more. */
export function intervals(person: Person, state: State, minutes: number, seed: number) {
  const random = createRandom(seed);
  const [hf, lf] = [0, 1].map(() => wander(random, 60 * person.wanderMin));
  const [breathing, swing] = [wander(random, 30), wander(random, 30)];
  const slow = SLOW_S.map((timeS) => wander(random, timeS));
  let [breaths, swings] = [random.uniform(), random.uniform()];
  const rrMs: number[] = [];
  for (let [t, rest] = [0, 2]; rest > 0; rest -= t > 60 * minutes ? 1 : 0) {
    const stepS = (rrMs.at(-1) ?? RR_MS[state]) / 1000;
    breaths += (stepS * (BREATHS_PER_MIN + breathing(stepS))) / 60;
    swings += stepS * (LF_HZ + 0.01 * swing(stepS));
    const trend = TREND_MS * ((t % HALF_HOUR_S) / HALF_HOUR_S - 0.5);
    const drift = slow.reduce((sum, next) => sum + SLOW_MS * next(stepS), 0);
    const rr =
      RR_MS[state] +
      HF_MS[state] * Math.exp(AMPLITUDE_SD * hf(stepS)) * Math.cos(2 * Math.PI * breaths) +
      LF_MS * Math.exp(AMPLITUDE_SD * lf(stepS)) * Math.cos(2 * Math.PI * swings) +
      drift +
      trend +
      WHITE_MS * random.gaussian();
    rrMs.push(rr);
    t += rr / 1000;
  }
  return rrMs;
}
