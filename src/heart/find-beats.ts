import { mapInSteps, quietly, scaled } from '../numeric/in-steps';
import { medianInPlace } from '../numeric/statistics';
import { afterWaveCosts, type Host, usualCourses } from './after-wave';
import { learnShapes, type Shape } from './beat-shapes';
import {
  type Crest,
  type Energy,
  energyPass,
  type HeartSignal,
  type Levels,
  levelsOf,
} from './energy-pass';
import { firstEvidence, placeEvidence, sizeEvidence, waveEvidence } from './evidence';
import { bestPath, type RhythmAt } from './rhythm-path';
import { rhythmFromBeats, rhythmFromEnergy } from './rhythm-track';
import { type Candidate, shapePass } from './shape-pass';
import type { Place } from './unsure-places';

export interface FoundBeats {
  readonly beats: readonly Weighed[];
  readonly shapes: readonly Shape[];
  /** All places that were weighed, ascending; the score of each holds what it is worth as a T wave too. */
  readonly places: readonly Place[];
}

/** A place with its evidence: log-odds of a beat without what the rhythm says. */
export type Weighed = Candidate & { readonly score: number };

const NEIGHBOURS = 7;
/** Looks by shape, energy and rhythm together; the first without rhythm. */
const ROUNDS = 3;
/** Likeness of the places that sizes are learned from before beats are known. */
const ALIKE = 0.7;
/** A rhythm that says nothing: the first look by shape is to find beats of any rhythm. */
const NO_RHYTHM: RhythmAt = { rrS: 0.8, spread: 10, sure: 0, rare: 0 };
/** What a T wave's time and energy weigh beside its shape, by the same regression as the evidence. */
const WAVE_WEIGHT = 0.37;

/**
 * Finds the beats: first by energy and rhythm, then by shape, energy and rhythm together. `eager` is added to the log-odds of
 * every place; above 0, beats of stretches that look like noise alone are given too.
 */
export function* findBeats(signal: HeartSignal, eager = 0): Generator<number, FoundBeats> {
  const { rateHz, samples } = signal;
  const energy = yield* scaled(energyPass(signal), 0, 0.3);
  const levels = yield* quietly(levelsOf(energy, Math.ceil(samples.length / rateHz)), 0.3);
  yield 0.3;
  const fallback = yield* quietly(rhythmFromEnergy(energy, levels), 0.3);
  yield 0.3;
  const first = yield* firstBeats(energy, levels, rateHz, fallback);
  const shapes = yield* scaled(learnShapes(signal, first), 0.3, 0.5);
  const candidates = yield* scaled(shapePass(signal, shapes, energy, first), 0.5, 0.9);
  const evidence = yield* evidenceOf(candidates, levels, rateHz);
  let beats: Weighed[] = [];
  let places: Place[] = [];
  for (let round = 0; round < ROUNDS; round += 1) {
    const alike = round === 0 ? candidates.filter(({ likeness }) => likeness > ALIKE) : beats;
    const sizes = yield* quietly(usualSizes(alike), 0.92);
    const score = (value: number, i: number) => value + eager + sizeEvidence(candidates[i], sizes);
    const scores = yield* quietly(mapInSteps(evidence, score), 0.92);
    yield 0.92;
    const hosts = round === 0 ? likeliest(candidates, first, rateHz) : beats;
    yield 0.92;
    const times = beats.map((beat) => beat.sample / rateHz);
    const rhythm =
      round === 0 ? () => NO_RHYTHM : yield* quietly(rhythmFromBeats(times, fallback), 0.92);
    yield 0.92;
    const around = { energy, rateHz, rhythm, done: 0.92 };
    const { path, worth } = yield* likelyPath(candidates, scores, hosts, around, WAVE_WEIGHT);
    const taken = mapInSteps(path, (i) => ({ ...candidates[i], score: scores[i] }));
    beats = yield* quietly(taken, 0.92);
    yield 0.92;
    const asPlace = ({ sample, shape, energyUv, likeP, likeT }: Candidate, i: number) => ({
      sample,
      shape,
      energyUv,
      likeP,
      likeT,
      score: worth[i],
    });
    if (round === ROUNDS - 1) places = yield* quietly(mapInSteps(candidates, asPlace), 0.92);
    yield 0.92;
  }
  const kept = eager > 0 ? beats : yield* present(beats, shapes);
  return { beats: kept, shapes, places };
}

/** Places weighed between two steps. */
const PLACES_A_STEP = 2000;

function* evidenceOf(
  candidates: readonly Candidate[],
  levels: Levels,
  rateHz: number,
): Generator<number, number[]> {
  const evidence: number[] = [];
  for (const candidate of candidates) {
    const s = Math.min(levels.beat.length - 1, Math.floor(candidate.sample / rateHz));
    evidence.push(placeEvidence(candidate, levels.beat[s], levels.noise[s]));
    if (evidence.length % PLACES_A_STEP === 0) yield 0.9;
  }
  return evidence;
}

interface Surroundings {
  readonly energy: Energy;
  readonly rateHz: number;
  readonly rhythm: (timeS: number) => RhythmAt;
  /** Part of the whole that is done. */
  readonly done: number;
}

/** The likeliest beats among places, T waves of likely beats held back; yields `done` in between. */
function* likelyPath(
  places: readonly (Host & { readonly energyUv: number; readonly likeT: number })[],
  scores: readonly number[],
  hosts: readonly Host[],
  { energy, rateHz, rhythm, done }: Surroundings,
  weight: number,
): Generator<number, { readonly path: number[]; readonly worth: readonly number[] }> {
  const weighed = yield* quietly(
    mapInSteps(places, ({ sample, shape, energyUv, likeT }, i) => ({
      sample,
      shape,
      energyUv,
      score: scores[i],
      asT: waveEvidence(likeT),
    })),
    done,
  );
  const rrAt = (sample: number) => rhythm(sample / rateHz).rrS;
  yield done;
  const courses = yield* quietly(usualCourses(hosts, energy, rateHz), done);
  yield done;
  const costs = yield* quietly(
    afterWaveCosts(weighed, courses, energy, rateHz, rrAt, weight),
    done,
  );
  yield done;
  const times = places.map((place) => place.sample / rateHz);
  const worth = scores.map((score, i) => score + costs[i]);
  const path = yield* quietly(bestPath(times, worth, rhythm), done);
  return { path, worth };
}

function* firstBeats(
  energy: Energy,
  levels: Levels,
  rateHz: number,
  start: (timeS: number) => RhythmAt,
): Generator<number, number[]> {
  const { crests } = energy;
  const times = crests.map(({ sample }) => sample / rateHz);
  const evidence = ({ sample, energyUv }: Crest) => {
    const s = Math.min(levels.beat.length - 1, Math.floor(sample / rateHz));
    return firstEvidence(energyUv, levels.beat[s], levels.noise[s]);
  };
  const scores = yield* quietly(mapInSteps(crests, evidence), 0.3);
  yield 0.3;
  const asPlace = ({ sample, energyUv }: Crest) => ({ sample, energyUv, shape: 0, likeT: 0 });
  const places = yield* quietly(mapInSteps(crests, asPlace), 0.3);
  let rhythm = start;
  let path: number[] = yield* quietly(bestPath(times, scores, rhythm), 0.3);
  for (let round = 0; round < 2; round += 1) {
    const hosts = path.map((i) => places[i]);
    const found = path.map((i) => times[i]);
    rhythm = yield* quietly(rhythmFromBeats(found, rhythm), 0.3);
    yield 0.3;
    const around = { energy, rateHz, rhythm, done: 0.3 };
    path = (yield* likelyPath(places, scores, hosts, around, 1)).path;
  }
  return path.map((i) => crests[i].sample);
}

/** The candidate nearest to each beat of the first look. */
function likeliest(
  candidates: readonly Candidate[],
  first: readonly number[],
  rateHz: number,
): Candidate[] {
  const hosts: Candidate[] = [];
  let at = 0;
  for (const sample of first) {
    while (
      at < candidates.length - 1 &&
      Math.abs(candidates[at + 1].sample - sample) <= Math.abs(candidates[at].sample - sample)
    )
      at += 1;
    if (at < candidates.length && Math.abs(candidates[at].sample - sample) < 0.08 * rateHz)
      hosts.push(candidates[at]);
  }
  return hosts;
}

/** The usual size of beats near a sample: the median of those about it. Takes a rest now and then. */
function* usualSizes(beats: readonly Candidate[]): Generator<void, (sample: number) => number> {
  const few = new Float64Array(2 * NEIGHBOURS + 1);
  const sizes = yield* mapInSteps(beats, (_, i) => {
    const first = Math.max(0, i - NEIGHBOURS);
    const last = Math.min(beats.length - 1, i + NEIGHBOURS);
    for (let j = first; j <= last; j += 1) few[j - first] = beats[j].size;
    return medianInPlace(few, last - first + 1);
  });
  let at = 0;
  return (sample) => {
    if (beats.length === 0) return 1;
    while (at > 0 && beats[at].sample > sample) at -= 1;
    while (at < beats.length - 1 && beats[at + 1].sample <= sample) at += 1;
    return Math.min(4, Math.max(0.25, sizes[at]));
  };
}

/** Beats looked at between two steps. */
const BEATS_A_STEP = 1000;
/** Beats to each side that tell whether there is a heartbeat at all. */
const PRESENCE_NEIGHBOURS = 20;
/** Noise alone gives shapes whose beats are little like one another, and median likeness and size over noise below these. */
const LEAST_COHERENCE = 0.65;
const LEAST_LIKENESS = 0.8;
const LEAST_OVER_NOISE = 3.6;
/** Beats of shapes this much alike need no more than some evidence, as where T waves fill all there is between them. */
const SURE_COHERENCE = 0.75;
const LEAST_EVIDENCE = 1;

/** The beats of stretches where most of them are like their shapes or stand out of the noise: noise alone has no heartbeat. */
function* present(
  beats: readonly Weighed[],
  shapes: readonly Shape[],
): Generator<number, Weighed[]> {
  const few = new Float64Array(2 * PRESENCE_NEIGHBOURS + 1);
  const medianAbout = (i: number, value: (beat: Weighed) => number) => {
    const first = Math.max(0, i - PRESENCE_NEIGHBOURS);
    const last = Math.min(beats.length - 1, i + PRESENCE_NEIGHBOURS);
    for (let j = first; j <= last; j += 1) few[j - first] = value(beats[j]);
    return medianInPlace(few, last - first + 1);
  };
  const coherence = ({ shape }: Weighed) => shapes[shape]?.coherence ?? 0;
  const isPresent = (i: number) => {
    if (medianAbout(i, ({ overNoise }) => overNoise) > LEAST_OVER_NOISE) return true;
    const alike = medianAbout(i, coherence);
    return (
      (alike > LEAST_COHERENCE && medianAbout(i, ({ likeness }) => likeness) > LEAST_LIKENESS) ||
      (alike > SURE_COHERENCE && medianAbout(i, ({ score }) => score) > LEAST_EVIDENCE)
    );
  };
  const kept: Weighed[] = [];
  for (let i = 0; i < beats.length; i += 1) {
    if (isPresent(i)) kept.push(beats[i]);
    if (i % BEATS_A_STEP === BEATS_A_STEP - 1) yield 0.92;
  }
  return kept;
}
