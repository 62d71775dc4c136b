import type { BeatClass } from '../recording/beat';
import type { Shape } from './beat-shapes';
import type { RhythmAt } from './rhythm-path';
import type { Candidate } from './shape-pass';

/** Early: an interval below this part of the usual one. */
const EARLY = 0.87;
/** Early enough to be called supraventricular on timing alone, in a regular rhythm. */
const CLEARLY_EARLY = 0.8;
/** A rhythm whose intervals spread by less (logarithm of RR) is regular. */
const REGULAR_SPREAD = 0.11;
/** Slower shapes than this part of the main shape's mean frequency are wide. */
const WIDE = 0.85;
/** Less like its best shape than a usual beat by this much, a beat is of no known shape. */
const UNLIKE = 0.25;
/** The same for an early beat in a clean stretch: its own shape is looked at. */
const EARLY_UNLIKE = 0.1;
/** Below this many noise standard deviations a complex is not clear, unless it is as like its shape as this. */
const UNCLEAR = 2.5;
const PLAIN_LIKENESS = 0.9;
/** Above these a complex is clear. */
const CLEAR = 3.5;
const CLEAR_LIKENESS = 0.75;
/** A shape whose beats are less like one another may be noise. */
const COHERENT = 0.7;

/** Shapes slower than this are wide whenever their beats come. */
const VERY_WIDE = 0.65;
/** Shapes that are somewhat wide are ventricular where so many of their beats are early; those hardly wider where these are. */
const OFTEN_EARLY = 0.4;
const MOSTLY_EARLY = 0.7;
/** Beats classed between two rests. */
const BEATS_A_STEP = 100;

/** What the shape of a group of beats says. */
type ShapeKind = 'main' | 'usual' | 'wide';

/**
 * Classes of the beats (ANSI/AAMI EC57 letters) from shape, against the study's own averages, and timing: N like the most
 * frequent shape; V of a shape that is very wide beside it, or wide and mostly early; S like N but early in a regular rhythm; Q not
 * clear. F is left to people. A proposal to be reviewed, not a diagnosis. `meanHz` gives a candidate's own mean frequency.
 * Takes a rest now and then.
 */
export function* classifyBeats(
  beats: readonly Candidate[],
  shapes: readonly Shape[],
  rhythmAt: (sample: number) => RhythmAt,
  meanHz: (beat: Candidate) => number,
): Generator<void, BeatClass[]> {
  const ratios = beats.map((beat, i) =>
    i > 0 ? (beat.sample - beats[i - 1].sample) / rhythmAt(beat.sample).rrS : 1,
  );
  const main = mainShape(beats, shapes.length);
  const kinds = shapes.map((_, k) => shapeKind(k, main, shapes, beats, ratios));
  const classOf = (beat: Candidate, i: number): BeatClass => {
    const rhythm = rhythmAt(beat.sample);
    if (!isOfShape(beat)) return oddClass(beat, ratios[i], shapes[main], meanHz);
    if (beat.overNoise < UNCLEAR && beat.likeness < PLAIN_LIKENESS) return 'Q';
    const tolerance = EARLY_UNLIKE + (1 - beat.bestLikeness) / 2;
    if (ratios[i] < EARLY && beat.likeness < beat.bestLikeness - tolerance) {
      const odd = oddClass(beat, ratios[i], shapes[main], meanHz);
      if (odd !== 'Q') return odd;
    }
    const sure = clearlyOfShape(beat) && shapes[beat.shape].coherence > COHERENT;
    if (kinds[beat.shape] === 'wide')
      return sure ? 'V' : oddClass(beat, ratios[i], shapes[main], meanHz);
    const early =
      ratios[i] < CLEARLY_EARLY && rhythm.spread < REGULAR_SPREAD && clearlyOfShape(beat);
    return early && ratios[i - 1] > CLEARLY_EARLY ? 'S' : 'N';
  };
  const classes: BeatClass[] = [];
  for (const beat of beats) {
    classes.push(classOf(beat, classes.length));
    if (classes.length % BEATS_A_STEP === 0) yield;
  }
  return classes;
}

/** Whether a beat is of the shape that fits it best. */
export const isOfShape = (beat: Candidate) =>
  beat.shape >= 0 && beat.likeness > beat.bestLikeness - UNLIKE;

/** A class other than N wants more than the likeness that noise lends. */
function clearlyOfShape({ likeness, bestLikeness, overNoise }: Candidate): boolean {
  return overNoise > CLEAR && bestLikeness > CLEAR_LIKENESS && likeness > CLEAR_LIKENESS;
}

function mainShape(beats: readonly Candidate[], count: number): number {
  const counts = new Array<number>(Math.max(1, count)).fill(0);
  for (const beat of beats) if (beat.shape >= 0) counts[beat.shape] += 1;
  return counts.indexOf(Math.max(...counts));
}

function shapeKind(
  k: number,
  main: number,
  shapes: readonly Shape[],
  beats: readonly Candidate[],
  ratios: readonly number[],
): ShapeKind {
  if (k === main) return 'main';
  let own = 0;
  let early = 0;
  beats.forEach((beat, i) => {
    if (beat.shape !== k) return;
    own += 1;
    if (ratios[i] < EARLY || (i > 0 && beats[i - 1].shape === k && ratios[i] < 1)) early += 1;
  });
  const pace = meanFrequency(shapes[k].average) / meanFrequency(shapes[main].average);
  const wide =
    pace < VERY_WIDE ||
    (pace < WIDE && early >= OFTEN_EARLY * own) ||
    (pace < 1 && early >= MOSTLY_EARLY * own);
  return wide ? 'wide' : 'usual';
}

/** Root of the mean square of slope over that of value: grows with the mean frequency (Hjorth 1970). */
export function meanFrequency(x: Float64Array): number {
  let slope = 0;
  let value = 1e-30;
  for (let i = 1; i < x.length; i += 1) {
    slope += (x[i] - x[i - 1]) ** 2;
    value += x[i] ** 2;
  }
  return Math.sqrt(slope / value);
}

function oddClass(
  beat: Candidate,
  ratio: number,
  main: Shape | undefined,
  meanHz: (beat: Candidate) => number,
): BeatClass {
  if (!main || beat.bestLikeness < 0.9) return 'Q';
  const wide = meanHz(beat) < WIDE * meanFrequency(main.average);
  return wide && ratio < EARLY ? 'V' : 'Q';
}
