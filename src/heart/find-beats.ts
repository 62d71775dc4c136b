import { medianInPlace } from '../numeric/statistics';
import { afterWaveCosts, type Host } from './after-wave';
import { learnShapes, type Shape } from './beat-shapes';
import { type Energy, energyPass, type HeartSignal, type Levels, levelsOf } from './energy-pass';
import { evidenceOf, firstEvidence } from './evidence';
import { bestPath, type RhythmAt } from './rhythm-path';
import { rhythmFromBeats, rhythmFromEnergy } from './rhythm-track';
import { type Candidate, shapePass } from './shape-pass';

export interface FoundBeats {
  readonly beats: readonly Candidate[];
  readonly shapes: readonly Shape[];
}

const NEIGHBOURS = 7;

/** Finds the beats: first by energy and rhythm, then by shape, energy and rhythm together. */
export function* findBeats(signal: HeartSignal): Generator<number, FoundBeats> {
  const { rateHz, samples } = signal;
  const energy = yield* scaled(energyPass(signal), 0, 0.3);
  const levels = levelsOf(energy, Math.ceil(samples.length / rateHz));
  yield 0.3;
  const fallback = rhythmFromEnergy(energy, levels);
  yield 0.3;
  const first = yield* firstBeats(energy, levels, rateHz, fallback);
  const shapes = yield* scaled(learnShapes(signal, first), 0.3, 0.5);
  const candidates = yield* scaled(shapePass(signal, shapes, energy, first), 0.5, 0.9);
  let times = first.map((sample) => sample / rateHz);
  let beats: Candidate[] = [];
  for (let round = 0; round < 2; round += 1) {
    const sizes = usualSizes(round === 0 ? candidates.filter((c) => c.likeness > 0.7) : beats);
    const scores = candidates.map((candidate) => {
      const s = Math.min(levels.beat.length - 1, Math.floor(candidate.sample / rateHz));
      return evidenceOf(candidate, sizes(candidate.sample), levels.beat[s], levels.noise[s]);
    });
    const hosts = round === 0 ? likeliest(candidates, first, rateHz) : beats;
    const rhythm = rhythmFromBeats(times, fallback);
    const path = likelyPath(candidates, scores, hosts, { energy, rateHz, rhythm });
    beats = path.map((i) => candidates[i]);
    times = beats.map((beat) => beat.sample / rateHz);
    yield 0.92;
  }
  return { beats: present(beats), shapes };
}

/** Runs a pass and reports its part of the whole. */
function* scaled<T>(pass: Generator<number, T>, from: number, to: number): Generator<number, T> {
  for (;;) {
    const step = pass.next();
    if (step.done) return step.value;
    yield from + (to - from) * step.value;
  }
}

interface Surroundings {
  readonly energy: Energy;
  readonly rateHz: number;
  readonly rhythm: (timeS: number) => RhythmAt;
}

/** The likeliest beats among places, T waves of likely beats held back. */
function likelyPath(
  places: readonly (Host & { readonly energyUv: number })[],
  scores: readonly number[],
  hosts: readonly Host[],
  { energy, rateHz, rhythm }: Surroundings,
): number[] {
  const weighed = places.map((place, i) => ({ ...place, score: scores[i] }));
  const rrAt = (sample: number) => rhythm(sample / rateHz).rrS;
  const costs = afterWaveCosts(weighed, hosts, energy, rateHz, rrAt);
  const times = places.map((place) => place.sample / rateHz);
  return bestPath(
    times,
    costs.map((cost, i) => cost + scores[i]),
    rhythm,
  );
}

function* firstBeats(
  energy: Energy,
  levels: Levels,
  rateHz: number,
  start: (timeS: number) => RhythmAt,
): Generator<number, number[]> {
  const { crests } = energy;
  const times = crests.map(({ sample }) => sample / rateHz);
  const scores = crests.map(({ sample, energyUv }) => {
    const s = Math.min(levels.beat.length - 1, Math.floor(sample / rateHz));
    return firstEvidence(energyUv, levels.beat[s], levels.noise[s]);
  });
  const places = crests.map((crest) => ({ ...crest, shape: 0 }));
  let rhythm = start;
  let path: number[] = bestPath(times, scores, rhythm);
  for (let round = 0; round < 2; round += 1) {
    const hosts = path.map((i) => places[i]);
    rhythm = rhythmFromBeats(
      path.map((i) => times[i]),
      rhythm,
    );
    path = likelyPath(places, scores, hosts, { energy, rateHz, rhythm });
    yield 0.3;
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

/** The usual size of beats near a sample: the median of those about it. */
function usualSizes(beats: readonly Candidate[]): (sample: number) => number {
  const few = new Float64Array(2 * NEIGHBOURS + 1);
  const sizes = beats.map((_, i) => {
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

/** Beats to each side that tell whether there is a heartbeat at all. */
const PRESENCE_NEIGHBOURS = 15;
/** Noise alone gives a median likeness or a median size over noise below these. */
const LEAST_LIKENESS = 0.8;
const LEAST_OVER_NOISE = 2.8;
/** A size over noise that needs no likeness. */
const CLEAR_OVER_NOISE = 3.6;

/** The beats of stretches where most of them stand out of the noise or are like their shapes: noise alone has no heartbeat. */
function present(beats: readonly Candidate[]): Candidate[] {
  const likeness = new Float64Array(2 * PRESENCE_NEIGHBOURS + 1);
  const overNoise = new Float64Array(2 * PRESENCE_NEIGHBOURS + 1);
  return beats.filter((_, i) => {
    const first = Math.max(0, i - PRESENCE_NEIGHBOURS);
    const last = Math.min(beats.length - 1, i + PRESENCE_NEIGHBOURS);
    for (let j = first; j <= last; j += 1) {
      likeness[j - first] = beats[j].likeness;
      overNoise[j - first] = beats[j].overNoise;
    }
    const count = last - first + 1;
    const clear = medianInPlace(overNoise, count);
    return (
      clear > CLEAR_OVER_NOISE ||
      (clear > LEAST_OVER_NOISE && medianInPlace(likeness, count) > LEAST_LIKENESS)
    );
  });
}
