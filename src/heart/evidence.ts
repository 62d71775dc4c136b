import { log } from '../numeric/elementary';
import type { Candidate } from './shape-pass';

/** Spread of the logarithm of a beat's size about the usual: breathing alone moves it by half. */
const SIZE_SPREAD = 0.35;
/** Crests of noise against its own level, and the spread of the logarithm of that. */
const NOISE_CREST = 2.2;
const NOISE_SPREAD = 0.35;
const LIKENESS_SPREAD = 0.12;
/** Weaker QRS energy than this is no heartbeat: that of an R peak of about 1 uV. */
const LEAST_ENERGY_UV = 0.5;
/** Where noise leaves a usual beat less like its shape than this, a beat can hardly be seen, and less and less is believed. */
const SEEABLE = 0.6;
const UNSEEN_COST = 10;

/** Log density of a beat's size (times the usual), from its least value on. */
function sizeFit(size: number): number {
  if (!(size > 0)) return -9;
  return Math.max(-9, -0.5 * (log(size) / SIZE_SPREAD) ** 2);
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
  if (!(energyUv > LEAST_ENERGY_UV && beatUv > LEAST_ENERGY_UV)) return -9;
  return sizeFit(energyUv / beatUv) - noiseFit(energyUv / (noiseUv + 1e-12), -7);
}

/** The same for a first look, that must find beats to learn from: usual beats count as standing out of the noise. */
export function firstEvidence(energyUv: number, beatUv: number, noiseUv: number): number {
  return 2 + energyEvidence(energyUv, beatUv, Math.min(noiseUv, beatUv / 4));
}

/**
 * Evidence of the shape: size and likeness against noise. `usualSize` is the size of beats near it. About -25 to 14.
 */
function shapeEvidence(candidate: Candidate, usualSize: number): number {
  const { size, likeness, overNoise, bestLikeness } = candidate;
  const short = Math.max(0, 0.93 * bestLikeness - likeness) / LIKENESS_SPREAD;
  const fit = Math.max(-6, -0.5 * short ** 2);
  const more = likeness > 0.8 ? 20 * (likeness - 0.8) : 0;
  const clear = Math.max(overNoise, clearByFit(likeness));
  const unseen = (UNSEEN_COST * Math.max(0, SEEABLE - bestLikeness)) / SEEABLE;
  return sizeFit(size / usualSize) + fit + more - noiseFit(clear, -10) - unseen;
}

/** Independent values of a window, and how far over noise its fit must be before that counts as more than chance. */
const WINDOW_FREEDOM = 8;
const FIT_BY_CHANCE = 3;

/** Size over noise as the complex itself shows it: a fit this good leaves little room for noise, whatever lies around. */
function clearByFit(likeness: number): number {
  const rest = Math.sqrt(Math.max(1e-4, 1 - likeness ** 2) / WINDOW_FREEDOM);
  return Math.max(0, likeness) / rest - FIT_BY_CHANCE;
}

/** What a beat unlike every learned shape costs. */
const UNLIKE_COST = 3;

/** Evidence of shape and energy together: of the better of a beat of a learned shape and one of a new shape. */
export function evidenceOf(
  candidate: Candidate,
  usualSize: number,
  beatUv: number,
  noiseUv: number,
): number {
  const alone = energyEvidence(candidate.energyUv, beatUv, noiseUv) - UNLIKE_COST;
  if (!(beatUv > LEAST_ENERGY_UV)) return -9;
  return candidate.shape < 0 ? alone : Math.max(alone, shapeEvidence(candidate, usualSize));
}
