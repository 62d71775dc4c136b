import { exp, sin } from '../numeric/elementary';
import type { Random } from '../numeric/random';
import type { Interval } from '../recording/span';
import type { Seconds } from '../units/time';
import { EPISODES } from './ecg-episodes';

/** Where a beat of an invented surface ECG comes from; it decides the shape. */
export type EcgOrigin =
  | 'sinus'
  | 'atrial'
  | 'aberrant'
  | 'junctional'
  | 'ventricular'
  | 'fusion'
  | 'paced';

export interface EcgBeat {
  readonly timeS: Seconds;
  readonly origin: EcgOrigin;
  /** Which of the heart's ventricular foci, from 0 on; 0 for other origins. */
  readonly focus: number;
  /** Interval before it. */
  readonly rrS: Seconds;
  /** How long before it its P wave lies; null without one. */
  readonly prS: Seconds | null;
}

/** Rhythms that a stretch may have, by their usual names. */
export type EcgRhythmName =
  | 'sinus'
  | 'fibrillation'
  | 'flutter'
  | 'bigeminy'
  | 'trigeminy'
  | 'idioventricular'
  | 'paced'
  | 'wenckebach'
  | 'block'
  | 'tachycardia'
  | 'ventricularRun';

export interface EcgRhythmSpec {
  readonly base: EcgRhythmName;
  readonly rateBpm: number;
  /** Swing of RR with breathing, its slow wander and its unforeseeable part, each as a share of RR. */
  readonly breathing: number;
  readonly wander: number;
  readonly jitter: number;
  readonly breathsPerMin: number;
  /** Chance after each sinus beat of what is named. */
  readonly chances: {
    readonly ventricular: number;
    readonly atrial: number;
    readonly pause: number;
  };
  /** Of atrial early beats the share conducted aberrantly, and not at all; of ventricular ones that are followed by another. */
  readonly aberrant: number;
  readonly blocked: number;
  readonly again: number;
  readonly foci: number;
  /** Other rhythms in between: after some `everyS` comes one of some `lengthS`. */
  readonly episodes: readonly {
    readonly rhythm: EcgRhythmName;
    readonly everyS: Seconds;
    readonly lengthS: Seconds;
  }[];
}

export interface EcgRhythm {
  readonly beats: readonly EcgBeat[];
  /** P waves that no QRS complex follows, by their own times. */
  readonly lonePS: readonly Seconds[];
  /** Stretches with fibrillation and flutter waves instead of P waves. */
  readonly fibrillation: readonly Interval[];
  readonly flutter: readonly Interval[];
}

/** A rhythm being written, beat by beat. */
export interface EcgWalk {
  readonly spec: EcgRhythmSpec;
  readonly random: Random;
  readonly beats: EcgBeat[];
  readonly lonePS: Seconds[];
  /** Time of the last beat. */
  timeS: Seconds;
  /** Slow wander of the interval, as a share. */
  wander: number;
  /** Beats of the running group, for rhythms that count. */
  count: number;
}

const USUAL_PR_S = 0.16;
const WANDER_S = 40;
const FASTEST_RR_S = 0.26;

/** A number between two, evenly. */
export const between = (random: Random, low: number, high: number): number =>
  low + (high - low) * random.uniform();

/** A positive number about a median, its logarithm spread by `spread`. */
export const about = (random: Random, median: number, spread: number): number =>
  median * exp(spread * random.gaussian());

/** The interval the sinus node would leave next. */
export function sinusInterval(walk: EcgWalk): Seconds {
  const { spec, random } = walk;
  const rrS = 60 / spec.rateBpm;
  const keep = exp(-rrS / WANDER_S);
  walk.wander = keep * walk.wander + spec.wander * Math.sqrt(1 - keep * keep) * random.gaussian();
  const breath = sin((2 * Math.PI * spec.breathsPerMin * walk.timeS) / 60);
  const change = spec.breathing * breath + walk.wander + spec.jitter * random.gaussian();
  return Math.max(FASTEST_RR_S, rrS * Math.max(0.45, 1 + change));
}

/** Adds a beat `afterS` behind the last one. */
export function addBeat(
  walk: EcgWalk,
  afterS: Seconds,
  origin: EcgOrigin,
  prS: Seconds | null = null,
  focus = 0,
): void {
  const rrS = Math.max(0.22, afterS);
  walk.timeS += rrS;
  walk.beats.push({ timeS: walk.timeS, origin, focus, rrS, prS });
}

/** A sinus beat, or what comes in its stead: an early beat, a blocked P wave, a pause. */
export function sinusStep(walk: EcgWalk): void {
  const { spec, random } = walk;
  const rrS = sinusInterval(walk);
  const draw = random.uniform();
  const { ventricular, atrial, pause } = spec.chances;
  if (draw < ventricular) ventricularStep(walk, rrS);
  else if (draw < ventricular + atrial) atrialStep(walk, rrS);
  else if (draw < ventricular + atrial + pause) pauseStep(walk, rrS);
  else addBeat(walk, rrS, 'sinus', USUAL_PR_S);
}

function ventricularStep(walk: EcgWalk, rrS: Seconds): void {
  const { random, spec } = walk;
  const focus = random.below(spec.foci);
  if (random.uniform() < 0.12) {
    addBeat(walk, rrS * between(random, 0.9, 1), 'fusion', USUAL_PR_S - 0.03, focus);
    return;
  }
  const startS = walk.timeS;
  addBeat(walk, Math.max(0.32, rrS * between(random, 0.42, 0.8)), 'ventricular', null, focus);
  while (random.uniform() < spec.again)
    addBeat(walk, between(random, 0.32, 0.55), 'ventricular', null, random.below(spec.foci));
  const sinceS = walk.timeS - startS;
  const interpolated = rrS > 0.85 && sinceS < 0.6 * rrS && random.uniform() < 0.25;
  const nextS = interpolated ? 1.04 * rrS : (Math.floor(sinceS / rrS) + 2) * rrS;
  addBeat(walk, nextS - sinceS, 'sinus', USUAL_PR_S);
}

function atrialStep(walk: EcgWalk, rrS: Seconds): void {
  const { random, spec } = walk;
  const early = between(random, 0.5, 0.86);
  const kind = random.uniform();
  if (kind < spec.blocked) {
    walk.lonePS.push(walk.timeS + Math.max(0.3, 0.45 * rrS));
    addBeat(walk, rrS * between(random, 1.35, 1.6), 'sinus', USUAL_PR_S);
    return;
  }
  const aberrant = kind < spec.blocked + spec.aberrant;
  addBeat(walk, Math.max(0.3, early * rrS), aberrant ? 'aberrant' : 'atrial', 0.14);
  addBeat(walk, rrS * between(random, 1.02, 1.25), 'sinus', USUAL_PR_S);
}

function pauseStep(walk: EcgWalk, rrS: Seconds): void {
  const { random } = walk;
  const longS = Math.max(1.7 * rrS, between(random, 1.6, 6));
  const rescue = random.uniform();
  if (longS < 2.4 || rescue < 0.4) addBeat(walk, longS, 'sinus', USUAL_PR_S);
  else if (rescue < 0.8) addBeat(walk, between(random, 1.5, 2.4), 'junctional');
  else addBeat(walk, between(random, 1.6, 2.6), 'ventricular');
}

/** Draws the rhythm of a record. The same spec and random numbers give the same rhythm. */
export function ecgRhythm(spec: EcgRhythmSpec, durationS: Seconds, random: Random): EcgRhythm {
  const walk: EcgWalk = {
    spec,
    random,
    beats: [],
    lonePS: [],
    timeS: 0.1 + 0.5 * random.uniform(),
    wander: 0,
    count: 0,
  };
  const stretches: { rhythm: EcgRhythmName; fromS: Seconds; toS: Seconds }[] = [];
  const waits = spec.episodes.map(({ everyS }) => about(random, everyS, 0.5));
  while (walk.timeS < durationS) {
    const due = waits.findIndex((atS) => atS <= walk.timeS);
    const rhythm = due < 0 ? spec.base : spec.episodes[due].rhythm;
    const lengthS = due < 0 ? 0 : about(random, spec.episodes[due].lengthS, 0.4);
    const next = due < 0 ? Math.min(durationS, ...waits) : walk.timeS + lengthS;
    const fromS = walk.timeS;
    walk.count = 0;
    while (walk.timeS < Math.min(next, durationS)) EPISODES[rhythm](walk);
    stretches.push({ rhythm, fromS, toS: walk.timeS });
    if (due >= 0) waits[due] = walk.timeS + about(random, spec.episodes[due].everyS, 0.5);
  }
  const named = (name: EcgRhythmName) => stretches.filter(({ rhythm }) => rhythm === name);
  return {
    beats: walk.beats.filter(({ timeS }) => timeS < durationS),
    lonePS: walk.lonePS.filter((timeS) => timeS < durationS),
    fibrillation: named('fibrillation'),
    flutter: named('flutter'),
  };
}
