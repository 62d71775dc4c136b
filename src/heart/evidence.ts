import { log } from '../numeric/elementary';
import type { Candidate } from './shape-pass';

/**
 * Spread of the logarithm of a beat's energy about the usual. A choice, wider than that of usual beats (0.11 by
 * `npm run bench -- evidence`): breathing alone may move it by half, and early beats are low.
 */
const ENERGY_SPREAD = 0.35;
/** Crests of noise against its own level, and the spread of the logarithm of that: 1.4 and 0.30 in the bench; the former is a choice. */
const NOISE_CREST = 2.2;
const NOISE_SPREAD = 0.35;
/** Weaker QRS energy than this is no heartbeat: that of an R peak of about 1 uV. */
const LEAST_ENERGY_UV = 0.5;
const NONE = -9;

const logOf = (x: number) => log(Math.max(1e-4, x));
const within = (x: number, low: number, high: number) => Math.min(high, Math.max(low, x));

/** Log density of a beat's energy (times the usual), from its least value on. */
function energyFit(times: number): number {
  if (!(times > 0)) return NONE;
  return Math.max(NONE, -0.5 * (log(times) / ENERGY_SPREAD) ** 2);
}

/** Log density of a crest of noise that is `overNoise` times the noise's level, from its least value on. */
function noiseFit(overNoise: number, least: number): number {
  if (!(overNoise > NOISE_CREST)) return 0;
  return Math.max(least, -0.5 * (log(overNoise / NOISE_CREST) / NOISE_SPREAD) ** 2);
}

/**
 * Evidence of the QRS energy alone that a crest is a beat: the log-likelihood ratio, up to a constant, of a beat of usual
 * energy against a crest of noise. About -9 to 7.
 */
function energyEvidence(energyUv: number, beatUv: number, noiseUv: number): number {
  if (!(energyUv > LEAST_ENERGY_UV && beatUv > LEAST_ENERGY_UV)) return NONE;
  return energyFit(energyUv / beatUv) - noiseFit(energyUv / (noiseUv + 1e-12), -7);
}

/** The same for a first look, that must find beats to learn from: usual beats count as standing out of the noise. */
export function firstEvidence(energyUv: number, beatUv: number, noiseUv: number): number {
  return 2 + energyEvidence(energyUv, beatUv, Math.min(noiseUv, beatUv / 4));
}

/** What a beat costs where no shape could be learned: a choice, of which the bench did not notice 1 to 6. */
const SHAPELESS_COST = 3;

/**
 * Weights of what is known of a place in the log-odds that it is a beat, by logistic regression (Cox 1958) on 48 invented
 * records at four heights (test/reference/heart-evidence.py); the part a rhythm has in it is left to the path. Above `from` (up to
 * `to`) each acts as a line.
 */
const CONSTANT = -2.8;
/** Unlikeness: logarithm of the part of the window's amplitude that the shape leaves over. */
const UNLIKE = { weight: -4, from: -3.5 };
/** Size beside that of the beats near it, as a logarithm, below 1 and above. */
const SMALL = 2.45;
const LARGE = -0.5;
/** Logarithm of the share of beats that have the shape. */
const SHARE = 0.47;
/** Likeness to a P or T wave of the usual beats. */
const LIKE_WAVE = { weight: -18, from: 0.8 };
/** Quickness: energy of the QRS band beside that of the shape band, as a logarithm. */
const QUICK = { weight: 3.2, from: -0.3 };
/** Size over noise, as a logarithm. */
const OVER_NOISE = { weight: 0.6, from: -2, to: 5 };
/** Energy beside that of the usual beat, as a logarithm, from 0.3 times on; and what changes above 1. */
const ENERGY = { weight: 1.25, from: -1.2 };
const MORE_ENERGY = -3.2;

/**
 * Where noise leaves a usual beat less like its shape than `seen`, only what is as like as `sure` is believed: a choice, which
 * the bench notices at 25 uV alone.
 */
const UNSEEN = { weight: -8, seen: 0.6, unsure: 0.6, sure: 0.9 };

/**
 * Noise makes a beat less like its shape: what it takes from a usual beat's likeness is given back by this, up to so much. In
 * the bench places lack 7 to 9 times it, up to 0.25; with 7 more beats are found and more is taken for one.
 */
const NOISY = { weight: 5, most: 0.25 };

/** What speaks against a place where noise hides a usual beat; 0 where it does not, or where the shape is plain all the same. */
function unseen({ bestLikeness, likeness }: Candidate): number {
  const hidden = Math.max(0, 1 - bestLikeness / UNSEEN.seen);
  const unsure = within((UNSEEN.sure - likeness) / (UNSEEN.sure - UNSEEN.unsure), 0, 1);
  return UNSEEN.weight * hidden * unsure;
}

/** What likeness to a P or T wave says against a beat; of a T wave only where there is a beat that it may belong to. */
export const waveEvidence = (alike: number): number =>
  LIKE_WAVE.weight * Math.max(0, alike - LIKE_WAVE.from);

/**
 * Evidence of shape, quickness and energy together: log-odds of a beat without what the rhythm and its size say, about -15
 * to 15. `beatUv` and `noiseUv` are the levels of its second.
 */
export function placeEvidence(candidate: Candidate, beatUv: number, noiseUv: number): number {
  const { energyUv, shape, likeness, share, likeP, overNoise, rmsUv } = candidate;
  if (!(energyUv > LEAST_ENERGY_UV && beatUv > LEAST_ENERGY_UV)) return NONE;
  if (shape < 0) return energyEvidence(energyUv, beatUv, noiseUv) - SHAPELESS_COST;
  const unlike = 0.5 * log(Math.max(1e-3, 1 - likeness ** 2));
  const energy = within(logOf(energyUv / beatUv), -4, 3);
  const quick = within(logOf(energyUv / rmsUv), -3, 2);
  return (
    CONSTANT +
    NOISY.weight * Math.min(NOISY.most, 1 - candidate.bestLikeness) +
    unseen(candidate) +
    UNLIKE.weight * Math.max(UNLIKE.from, unlike) +
    SHARE * log(share) +
    waveEvidence(likeP) +
    QUICK.weight * Math.max(0, quick - QUICK.from) +
    OVER_NOISE.weight * within(logOf(overNoise), OVER_NOISE.from, OVER_NOISE.to) +
    ENERGY.weight * Math.max(0, energy - ENERGY.from) +
    MORE_ENERGY * Math.max(0, energy)
  );
}

/** What the size of a place says beside that of the beats near it; 0 where no shape gives it one. */
export function sizeEvidence(
  { shape, size, sample }: Candidate,
  usual: (sample: number) => number,
): number {
  if (shape < 0) return 0;
  const large = within(logOf(size / usual(sample)), -4, 3);
  return (large < 0 ? SMALL : LARGE) * large;
}
