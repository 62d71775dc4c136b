import { createRandom } from '../../src/numeric/random';

const { exp, sin } = Math;

/** An abdominal lead made up for these tests alone, in uV; nothing of it comes from the program's own simulator. */
export interface Abdomen {
  readonly lengthS: number;
  readonly rateHz: number;
  readonly seed: number;
  readonly slowUv: number;
  /** Factor of the slow wave and its change at half time, as after a meal. */
  readonly fedFactor: number;
  readonly breathUv: number;
  readonly qrsUv: number;
  readonly muscleUv: number;
  /** Settling of the electrodes at the start. */
  readonly driftUv: number;
  readonly stepUv: number;
}

export const QUIET: Abdomen = {
  lengthS: 3600,
  rateHz: 250,
  seed: 1,
  slowUv: 120,
  fedFactor: 1.6,
  breathUv: 60,
  qrsUv: 250,
  muscleUv: 4,
  driftUv: 3000,
  stepUv: 0.2,
};

type RandomNumbers = ReturnType<typeof createRandom>;

/** Adds beats of about 70 a minute: a biphasic QRS of 80 ms and a T wave, one in thirty a wide beat twice as high. */
function addBeats(x: Float64Array, { rateHz, qrsUv }: Abdomen, random: RandomNumbers): void {
  let timeS = 0.5;
  while (timeS < x.length / rateHz) {
    const wide = random.uniform() < 1 / 30;
    const [height, width] = wide ? [2 * qrsUv, 0.03] : [qrsUv, 0.012];
    const from = Math.max(0, Math.floor((timeS - 0.15) * rateHz));
    for (let i = from; i < Math.min(x.length, (timeS + 0.5) * rateHz); i += 1) {
      const u = (i / rateHz - timeS) / width;
      const t = (i / rateHz - timeS - 0.28) / 0.05;
      const depth = u - 2.2;
      x[i] += height * (exp(-u * u) - 0.4 * exp(-depth * depth)) + 0.25 * qrsUv * exp(-t * t);
    }
    timeS += 0.86 * (1 + 0.05 * sin(2 * Math.PI * 0.25 * timeS) + 0.03 * random.gaussian());
  }
}

/** The clean lead: slow wave that waxes and wanes, breathing with deep breaths, beats, muscle, drift, random walk. */
export function abdomen(made: Abdomen): Float64Array {
  const { lengthS, rateHz, seed, slowUv, fedFactor, breathUv, muscleUv, driftUv } = made;
  const random = createRandom(seed);
  const x = new Float64Array(Math.round(lengthS * rateHz));
  let [slowPhase, breathPhase, walk, depth] = [0, 0, 0, 1];
  for (let i = 0; i < x.length; i += 1) {
    const t = i / rateHz;
    slowPhase += (2 * Math.PI * (0.05 + 0.004 * sin(t / 90))) / rateHz;
    breathPhase += (2 * Math.PI * (0.26 + 0.04 * sin(t / 37))) / rateHz;
    walk += (4 * random.gaussian()) / Math.sqrt(rateHz) - (0.002 * walk) / rateHz;
    depth += (0.3 * (1 - depth)) / rateHz;
    if (random.uniform() < 1 / (240 * rateHz)) depth = 2.2;
    const fed = 1 + (fedFactor - 1) / (1 + exp(-(t - lengthS / 2) / 120));
    const waxing = 1 + 0.4 * sin(t / 41) + 0.2 * sin(t / 17);
    const slow = slowUv * fed * waxing * (sin(slowPhase) + 0.25 * sin(2 * slowPhase + 1));
    const muscle = muscleUv * (1 + 0.3 * sin(breathPhase)) * random.gaussian();
    x[i] =
      slow +
      breathUv * depth * sin(breathPhase) +
      muscle +
      walk +
      driftUv * exp(-t / 400) +
      0.02 * t;
  }
  addBeats(x, made, random);
  return x;
}

/** Rounds to the digitiser's steps and holds the lead within its ends. */
export function digitised(
  x: Float64Array,
  stepUv: number,
  railsUv: readonly [number, number] = [-16000, 16000],
): Float64Array {
  return x.map((value) =>
    Math.min(railsUv[1], Math.max(railsUv[0], stepUv * Math.round(value / stepUv))),
  );
}

/** A stretch that was spoiled on purpose. */
export interface Spoiled {
  readonly fromS: number;
  readonly toS: number;
  readonly cause: 'flat' | 'rail' | 'step' | 'burst' | 'gap';
  readonly target: 'stomach' | 'heart' | 'both';
}

type Spoil = (x: Float64Array, rateHz: number, random: RandomNumbers) => Spoiled;

function each(
  x: Float64Array,
  rateHz: number,
  [fromS, toS]: readonly [number, number],
  change: (value: number, u: number, t: number) => number,
): void {
  const to = Math.min(x.length, Math.round(toS * rateHz));
  for (let i = Math.round(fromS * rateHz); i < to; i += 1)
    x[i] = change(x[i], (i / rateHz - fromS) / (toS - fromS), i / rateHz - fromS);
}

/** Muscle of `uv` (standard deviation), swelling and fading within a tenth of its length. */
export const muscle =
  (fromS: number, lengthS: number, uv: number): Spoil =>
  (x, rateHz, random) => {
    const toS = fromS + lengthS;
    each(x, rateHz, [fromS, toS], (value, u) => {
      const swell = Math.min(1, 10 * u, 10 * (1 - u));
      return value + swell * uv * random.gaussian();
    });
    return { fromS, toS, cause: 'burst', target: 'heart' };
  };

/** A slow heave of the baseline by `uv` and back, in two or three swings, without muscle. */
export const heave =
  (fromS: number, lengthS: number, uv: number): Spoil =>
  (x, rateHz) => {
    const toS = fromS + lengthS;
    each(x, rateHz, [fromS, toS], (value, u) => {
      const window = sin(Math.PI * u);
      return value + uv * window * window * sin(5 * Math.PI * u);
    });
    return { fromS, toS, cause: 'burst', target: 'stomach' };
  };

/** Moving about: heave and muscle, with a few jerks of the cable. */
export const moving =
  (fromS: number, lengthS: number, uv: number): Spoil =>
  (x, rateHz, random) => {
    for (let at = 0; at < lengthS; at += 12)
      heave(fromS + at, Math.min(12, lengthS - at), uv)(x, rateHz, random);
    muscle(fromS, lengthS, uv / 15)(x, rateHz, random);
    for (let k = 0; k < lengthS / 3; k += 1) {
      const at = fromS + lengthS * random.uniform();
      each(x, rateHz, [at, at + 0.15], (value, u) => value + uv * sin(Math.PI * u));
    }
    return { fromS, toS: fromS + lengthS, cause: 'burst', target: 'both' };
  };

/** A jump of `uv` that settles with the given time constant (Infinity: it stays). Four constants are spoiled: 2 % is left then. */
export const jump =
  (fromS: number, uv: number, settleS: number): Spoil =>
  (x, rateHz) => {
    const endS = x.length / rateHz;
    each(x, rateHz, [fromS, endS], (value, _, t) => value + uv * exp(-t / settleS));
    const lasting = Number.isFinite(settleS) ? 4 * settleS : 1;
    return { fromS: fromS - 0.5, toS: fromS + lasting, cause: 'step', target: 'stomach' };
  };

const filled =
  (cause: Spoiled['cause'], value: (before: number) => number) =>
  (fromS: number, lengthS: number): Spoil =>
  (x, rateHz) => {
    const before = x[Math.round(fromS * rateHz)];
    each(x, rateHz, [fromS, fromS + lengthS], () => value(before));
    return { fromS, toS: fromS + lengthS, cause, target: 'both' };
  };

export const flat = filled('flat', (before) => before);
export const gap = filled('gap', () => Number.NaN);
export const rail = filled('rail', () => 1e6);

/** The lead with all of these done to it, and where. */
export function spoil(
  clean: Float64Array,
  rateHz: number,
  seed: number,
  how: readonly Spoil[],
): { readonly x: Float64Array; readonly spoiled: readonly Spoiled[] } {
  const x = Float64Array.from(clean);
  const random = createRandom(seed);
  return { x, spoiled: how.map((one) => one(x, rateHz, random)) };
}
