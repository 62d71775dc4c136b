import { log } from '../numeric/elementary';
import { medianInPlace } from '../numeric/statistics';
import type { Energy } from './energy-pass';

/** T waves crest in this time after the QRS complex, and before this part of the RR interval (common practice, no source). */
const FIRST_S = 0.14;
const LAST_S = 0.45;
const PART_OF_RR = 0.7;

/** Latest crest of a T wave after its QRS complex where the RR interval is `rrS`. */
export const latestWaveS = (rrS: number) => Math.min(LAST_S, PART_OF_RR * rrS);
/** A usual after-wave below this part of its beat's energy is no rival. */
const LEAST_PART = 0.12;
/** What follows with more than this part of its beat's energy is another beat, as where every second beat is early. */
const MOST_PART = 0.83;
/** An energy this many times the usual after-wave's is no after-wave. */
const CLEARLY_MORE = 1.9;
const MOST_COST = 12;
/** Evidence from which a beat is taken for sure. */
const SURE_SCORE = 4;
const MOST_HOSTS = 600;
/** Places between two rests. */
const PLACES_A_STEP = 2000;

/** A beat that has an after-wave. */
export interface Host {
  readonly sample: number;
  readonly shape: number;
}

/** A place weighed as a beat. */
export interface Weighed extends Host {
  readonly energyUv: number;
  /** Evidence that it is a beat; positive for. */
  readonly score: number;
  /** What its shape says against a beat if it may be a T wave; 0 or less. */
  readonly asT: number;
}

/**
 * What speaks against each place (ascending) being a beat because it may be the T wave of a likely beat before it; 0 or less.
 * The energy that usually follows a beat is learned for each shape (`courses`, as part of the beat's own
 * energy), so that a T wave is known by coming after every beat at its time and of its size, however tall it is.
 */
export function* afterWaveCosts(
  places: readonly Weighed[],
  courses: ReadonlyMap<number, Float64Array>,
  energy: Energy,
  rateHz: number,
  rrAt: (sample: number) => number,
  weight: number,
): Generator<void, Float64Array> {
  const costs = new Float64Array(places.length);
  for (let j = 0, first = 0; j < places.length; j += 1) {
    if (j % PLACES_A_STEP === PLACES_A_STEP - 1) yield;
    const latest = latestWaveS(rrAt(places[j].sample));
    while (places[first].sample < places[j].sample - LAST_S * rateHz) first += 1;
    for (let i = first; i < j; i += 1) {
      const delayS = (places[j].sample - places[i].sample) / rateHz;
      if (delayS < FIRST_S || delayS > latest || !(places[i].score > 0)) continue;
      const sure = Math.min(1, places[i].score / SURE_SCORE);
      const at = Math.round((delayS - FIRST_S) * energy.envelopeHz);
      const course = courses.get(places[i].shape) ?? courses.get(-1);
      const usual = course ? greatestNear(course, at) : 0;
      costs[j] = Math.min(
        costs[j],
        sure * (weight * waveCost(places[j].energyUv / places[i].energyUv, usual) + places[j].asT),
      );
    }
  }
  return costs;
}

/** Cost of a wave of this energy where `usual` is common, both as part of the beat's energy. */
function waveCost(part: number, usual: number): number {
  if (usual < LEAST_PART || usual > MOST_PART || !(part >= 0)) return 0;
  const excess = log(Math.max(1e-9, part / usual)) / log(CLEARLY_MORE);
  return -MOST_COST * Math.min(1, Math.max(0, 2 - 2 * excess));
}

function greatestNear(course: Float64Array, at: number): number {
  let greatest = 0;
  for (let k = at - 2; k <= at + 2; k += 1) if (course[k] > greatest) greatest = course[k];
  return greatest;
}

/** Energy after the beats of each shape with beats enough, and of all beats as -1: medians over `hosts`. */
export function* usualCourses(
  hosts: readonly Host[],
  energy: Energy,
  rateHz: number,
): Generator<void, Map<number, Float64Array>> {
  const courses = new Map([[-1, usualCourse(hosts, energy, rateHz)]]);
  for (const shape of new Set(hosts.map((host) => host.shape))) {
    const own = hosts.filter((host) => host.shape === shape);
    yield;
    if (own.length >= 8) courses.set(shape, usualCourse(own, energy, rateHz));
  }
  return courses;
}

/** Median energy from FIRST_S to LAST_S after the beats, as part of the energy at the beat. */
function usualCourse(hosts: readonly Host[], energy: Energy, rateHz: number): Float64Array {
  const { envelope, envelopeHz } = energy;
  const every = Math.max(1, Math.floor(hosts.length / MOST_HOSTS));
  const course = new Float64Array(Math.round((LAST_S - FIRST_S) * envelopeHz) + 1);
  const few = new Float64Array(Math.ceil(hosts.length / every));
  for (let k = 0; k < course.length; k += 1) {
    let count = 0;
    for (let h = 0; h < hosts.length; h += every) {
      const at = Math.round((hosts[h].sample / rateHz) * envelopeHz);
      const own = Math.max(envelope[at - 1], envelope[at], envelope[at + 1]);
      const part = envelope[at + k + Math.round(FIRST_S * envelopeHz)] / own;
      if (part >= 0) few[count++] = part;
    }
    course[k] = count > 0 ? medianInPlace(few, count) : 0;
  }
  return course;
}
