import {
  about,
  addBeat,
  between,
  type EcgRhythmName,
  type EcgWalk,
  sinusInterval,
  sinusStep,
} from './ecg-rhythm';

const PR_S = 0.16;
/** Cycle of atrial flutter (300 a minute; common practice). */
export const FLUTTER_CYCLE_S = 0.2;

/** Intervals that nothing foretells; a short one after a long one may be conducted aberrantly (Gouaux and Ashman 1947). */
function fibrillationStep(walk: EcgWalk): void {
  const { spec, random, beats } = walk;
  const rrS = Math.max(0.3, about(random, 60 / spec.rateBpm, 0.23));
  if (random.uniform() < spec.chances.ventricular) {
    const focus = random.below(spec.foci);
    addBeat(walk, Math.max(0.32, rrS * between(random, 0.5, 0.9)), 'ventricular', null, focus);
    return;
  }
  const longBefore = (beats.at(-1)?.rrS ?? 0) > 1.25 * rrS;
  const aberrant = longBefore && random.uniform() < 0.5 * spec.aberrant;
  addBeat(walk, rrS, aberrant ? 'aberrant' : 'sinus');
}

function flutterStep(walk: EcgWalk): void {
  const { random } = walk;
  if (walk.count < 2 || random.uniform() < 0.1) walk.count = 2 + random.below(3);
  addBeat(walk, walk.count * FLUTTER_CYCLE_S + 0.008 * random.gaussian(), 'sinus');
}

/** Every beat of a group of `size` a sinus beat but the last, which is early and ventricular. */
const grouped = (size: number) => (walk: EcgWalk) => {
  const rrS = sinusInterval(walk);
  for (let k = 1; k < size; k += 1) addBeat(walk, k === 1 ? 1.35 * rrS : rrS, 'sinus', PR_S);
  const coupling = between(walk.random, 0.52, 0.6) + 0.02 * walk.random.gaussian();
  addBeat(walk, Math.max(0.34, coupling * rrS), 'ventricular', null, 0);
};

function idioventricularStep(walk: EcgWalk): void {
  const { random } = walk;
  if (walk.count === 0) walk.count = random.uniform() < 0.5 ? 38 : 75;
  addBeat(walk, (60 / walk.count) * (1 + 0.03 * random.gaussian()), 'ventricular');
}

function pacedStep(walk: EcgWalk): void {
  const { random, spec } = walk;
  const rrS = 60 / spec.rateBpm;
  const draw = random.uniform();
  if (draw < spec.chances.ventricular) {
    addBeat(walk, rrS * between(random, 0.5, 0.8), 'ventricular', null, random.below(spec.foci));
  } else if (draw < 0.03) addBeat(walk, rrS * between(random, 0.8, 0.99), 'sinus', PR_S);
  else addBeat(walk, rrS, 'paced');
}

/** PR grows and RR shrinks until a P wave is not conducted (Wenckebach 1899). */
function wenckebachStep(walk: EcgWalk): void {
  const rrS = sinusInterval(walk);
  if (walk.count >= 4) {
    walk.lonePS.push(walk.timeS + rrS - 0.26);
    addBeat(walk, 1.75 * rrS, 'sinus', PR_S);
    walk.count = 0;
  } else addBeat(walk, rrS * (1.06 - 0.02 * walk.count), 'sinus', PR_S + 0.04 * walk.count);
  walk.count += 1;
}

/** Two P waves to each QRS complex. */
function blockStep(walk: EcgWalk): void {
  const rrS = sinusInterval(walk);
  walk.lonePS.push(walk.timeS + 0.85 * rrS - PR_S);
  addBeat(walk, 1.7 * rrS, 'sinus', PR_S);
}

function tachycardiaStep(walk: EcgWalk): void {
  if (walk.count === 0) walk.count = Math.round(between(walk.random, 140, 200));
  addBeat(walk, (60 / walk.count) * (1 + 0.012 * walk.random.gaussian()), 'atrial');
}

function ventricularRunStep(walk: EcgWalk): void {
  const { random } = walk;
  if (walk.count === 0) walk.count = Math.round(between(random, 110, 190));
  addBeat(walk, (60 / walk.count) * (1 + 0.05 * random.gaussian()), 'ventricular', null, 0);
}

/** How each rhythm goes on by a beat or a few. */
export const EPISODES: Readonly<Record<EcgRhythmName, (walk: EcgWalk) => void>> = {
  sinus: sinusStep,
  fibrillation: fibrillationStep,
  flutter: flutterStep,
  bigeminy: grouped(2),
  trigeminy: grouped(3),
  idioventricular: idioventricularStep,
  paced: pacedStep,
  wenckebach: wenckebachStep,
  block: blockStep,
  tachycardia: tachycardiaStep,
  ventricularRun: ventricularRunStep,
};
