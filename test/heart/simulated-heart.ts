/** Invented heartbeats with known times, for tests: sums of Gaussian waves about each beat. */
export interface Wave {
  readonly atS: number;
  readonly sdS: number;
  readonly size: number;
}

/** A small generator of our own for tests (mulberry32-like mixing), so that inputs stay put. */
export function testRandom(seed: number) {
  let state = seed >>> 0;
  const uniform = () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
  const normal = () => Math.sqrt(-2 * Math.log(1 - uniform())) * Math.cos(2 * Math.PI * uniform());
  return { uniform, normal };
}

export const NARROW: readonly Wave[] = [
  { atS: -0.16, sdS: 0.022, size: 0.1 },
  { atS: -0.028, sdS: 0.008, size: -0.12 },
  { atS: 0, sdS: 0.011, size: 1 },
  { atS: 0.03, sdS: 0.01, size: -0.28 },
  { atS: 0.27, sdS: 0.045, size: 0.28 },
];
/** Deep S: biphasic. */
export const BIPHASIC: readonly Wave[] = [
  { atS: -0.16, sdS: 0.022, size: 0.08 },
  { atS: 0, sdS: 0.011, size: 1 },
  { atS: 0.03, sdS: 0.013, size: -0.9 },
  { atS: 0.27, sdS: 0.05, size: -0.2 },
];
export const TALL_T: readonly Wave[] = [
  { atS: -0.16, sdS: 0.022, size: 0.12 },
  { atS: 0, sdS: 0.011, size: 1 },
  { atS: 0.03, sdS: 0.01, size: -0.3 },
  { atS: 0.26, sdS: 0.04, size: 1.05 },
];
/** Broad and slow: conduction delay. */
export const BROAD: readonly Wave[] = [
  { atS: -0.17, sdS: 0.022, size: 0.1 },
  { atS: 0, sdS: 0.02, size: 0.8 },
  { atS: 0.045, sdS: 0.022, size: 0.7 },
  { atS: 0.3, sdS: 0.06, size: -0.4 },
];
export const VENTRICULAR: readonly Wave[] = [
  { atS: 0, sdS: 0.03, size: 1.15 },
  { atS: 0.1, sdS: 0.045, size: -0.6 },
  { atS: 0.28, sdS: 0.06, size: -0.4 },
];

export interface TrueBeat {
  readonly timeS: number;
  readonly beatClass: 'N' | 'S' | 'V';
  readonly size: number;
}

export interface HeartPlan {
  readonly seed: number;
  readonly seconds: number;
  readonly meanRrS: number;
  /** Standard deviation of each RR beyond breathing, as a fraction of the mean. */
  readonly spread?: number;
  /** Breathing at 0.25 Hz moves RR by this fraction. */
  readonly breathRr?: number;
  /** Breathing moves the beats' height by this fraction of the mean. */
  readonly breathHeight?: number;
  /** Chance of a V, an S beat after each N. */
  readonly ventricular?: number;
  readonly supraventricular?: number;
  readonly earlySize?: number;
}

/** Beats with their times, classes and relative sizes; a V beat is followed by a longer pause than an S beat. */
export function planBeats(plan: HeartPlan): TrueBeat[] {
  const random = testRandom(plan.seed);
  const v = plan.ventricular ?? 0;
  const s = plan.supraventricular ?? 0;
  const beats: TrueBeat[] = [{ timeS: 0.5, beatClass: 'N', size: 1 }];
  let pause = 1;
  for (let last = beats[0]; last.timeS < plan.seconds - 0.5 - 3 * plan.meanRrS; ) {
    const breath = Math.sin(2 * Math.PI * 0.25 * last.timeS);
    const size = 1 + (plan.breathHeight ?? 0) * breath;
    const varied = 1 + (plan.spread ?? 0.02) * random.normal() + (plan.breathRr ?? 0.03) * breath;
    const rr = plan.meanRrS * varied;
    const kind = last.beatClass === 'N' ? random.uniform() : 1;
    if (kind < v) {
      last = { timeS: last.timeS + rr * (0.55 + 0.1 * random.uniform()), beatClass: 'V', size };
      pause = 1.4;
    } else if (kind < v + s) {
      const timeS = last.timeS + rr * (0.6 + 0.08 * random.uniform());
      last = { timeS, beatClass: 'S', size: size * (plan.earlySize ?? 1) };
      pause = 1.15;
    } else {
      last = { timeS: last.timeS + rr * pause, beatClass: 'N', size };
      pause = 1;
    }
    beats.push(last);
  }
  return beats;
}

/** Adds the beats' waves to a signal; heightUv is the height of a wave of size 1. */
export function addBeats(
  signal: Float64Array,
  rateHz: number,
  beats: readonly TrueBeat[],
  heightUv: number,
  shape: readonly Wave[],
  ventricular: readonly Wave[] = VENTRICULAR,
): Float64Array {
  for (const beat of beats) {
    for (const wave of beat.beatClass === 'V' ? ventricular : shape) {
      const centre = beat.timeS + wave.atS;
      const from = Math.max(0, Math.ceil((centre - 5 * wave.sdS) * rateHz));
      const to = Math.min(signal.length - 1, Math.floor((centre + 5 * wave.sdS) * rateHz));
      for (let i = from; i <= to; i += 1) {
        const u = (i / rateHz - centre) / wave.sdS;
        signal[i] += heightUv * beat.size * wave.size * Math.exp(-0.5 * u * u);
      }
    }
  }
  return signal;
}

export interface NoisePlan {
  readonly seed: number;
  readonly whiteUv?: number;
  /** Muscle noise (white less its own running mean) in bursts: rms inside, mean seconds between bursts, their length. */
  readonly burstUv?: number;
  readonly burstEveryS?: number;
  readonly burstS?: number;
  readonly slowUv?: number;
  readonly breathUv?: number;
  readonly humUv?: number;
}

/** Adds slow wave, breathing, hum, white noise and muscle bursts. */
export function addNoise(signal: Float64Array, rateHz: number, plan: NoisePlan): Float64Array {
  const random = testRandom(plan.seed);
  let burstLeft = 0;
  let a = 0;
  let b = 0;
  for (let i = 0; i < signal.length; i += 1) {
    const t = i / rateHz;
    const white = random.normal();
    if (burstLeft <= 0 && random.uniform() < 1 / ((plan.burstEveryS ?? 20) * rateHz))
      burstLeft = (plan.burstS ?? 2) * (0.5 + random.uniform()) * rateHz;
    burstLeft -= 1;
    a += 0.35 * (white - a);
    b += 0.35 * (a - b);
    const muscle = burstLeft > 0 ? 1.25 * (white - b) : 0;
    signal[i] +=
      (plan.whiteUv ?? 0) * random.normal() +
      (plan.burstUv ?? 0) * muscle +
      (plan.slowUv ?? 0) * Math.sin(2 * Math.PI * 0.05 * t) +
      (plan.breathUv ?? 0) * Math.sin(2 * Math.PI * 0.25 * t) +
      (plan.humUv ?? 0) * Math.sin(2 * Math.PI * 50 * t + 1);
  }
  return signal;
}
