import { atOnce } from '../numeric/in-steps';
import { coverageOf } from '../recording/adequacy';
import { BEAT_CLASSES, type BeatList, firstBeatAt } from '../recording/beat';
import { type Figures, type FigureValue, numberFigure, withheld } from '../recording/figure';
import { FIGURES } from '../recording/figure-catalogue';
import type { Adequacy } from '../recording/findings';
import type { BreathingSeries, HeartSegment, RrSeries } from '../recording/heart-series';
import type { Phase } from '../recording/phase';
import type { Settings } from '../recording/settings';
import type { Interval } from '../recording/span';
import type { Hertz } from '../units/rate';
import { secondsToTicks } from '../units/ticks';
import type { Seconds } from '../units/time';
import { breathingFigure, breathsIn } from './breathing-figure';
import type { PartOfHeart } from './part';
import { intervalsWithin } from './rr-series';
import { regularNn } from './segments';
import { segmentsOnce } from './segments-once';
import { spectralFigures } from './spectral-figures';
import { timeFigures } from './time-figures';
import { timeDomain } from './variability';

export interface HeartFiguresInput {
  /** The RR series of just these beats and blocked stretches. */
  readonly rr: RrSeries;
  readonly beats: BeatList;
  /** Rate that the beats' ticks count in. */
  readonly rateHz: Hertz;
  readonly part: Phase;
  /** Spoiled spans for the heart and gaps. */
  readonly blocked: readonly Interval[];
  readonly settings: Settings;
  /** Standard deviation of the R times; NaN where not known. */
  readonly timingSdMs: number;
  readonly breathing: BreathingSeries;
}

export interface HeartFigures {
  /** Every figure of the heart and breathing but movement_pct, which no beat can tell. */
  readonly figures: Figures;
  readonly segments: readonly HeartSegment[];
  readonly keptS: Seconds;
  readonly adequacy: Adequacy;
}

/** How many beats of a part are of each class. */
function classCounts({ beats, rateHz, part }: HeartFiguresInput): readonly number[] {
  const counts = BEAT_CLASSES.map(() => 0);
  const first = firstBeatAt(beats, secondsToTicks(part.fromS, rateHz));
  const end = firstBeatAt(beats, secondsToTicks(part.toS, rateHz));
  for (let i = first; i < end; i += 1) counts[beats.classes[i]] += 1;
  return counts;
}

function countFigures(input: HeartFiguresInput, heart: PartOfHeart): Figures {
  const counts = classCounts(input);
  const sum = (classes: readonly string[]) =>
    counts.reduce((total, n, i) => total + (classes.includes(BEAT_CLASSES[i]) ? n : 0), 0);
  const all = heart.end - heart.first;
  const nn = heart.allTime.nnCount;
  const nnShare: FigureValue =
    all > 0
      ? numberFigure((100 * nn) / all, `${nn} of ${all} intervals`)
      : withheld('no two beats in this part');
  const lengthS = input.part.toS - input.part.fromS;
  return {
    nn_share_pct: nnShare,
    beats: numberFigure(sum(BEAT_CLASSES)),
    ectopic_beats: numberFigure(sum(['S', 'V', 'F']), `of ${sum(BEAT_CLASSES)} beats`),
    heart_kept_min: numberFigure(heart.keptS / 60, `of ${(lengthS / 60).toFixed(1)} min`),
  };
}

/** One part of the study as its heart figures see it. */
export function* partOfHeart(input: HeartFiguresInput): Generator<void, PartOfHeart> {
  const { rr, part, settings, timingSdMs, breathing } = input;
  const { first, end } = intervalsWithin(rr, part.fromS, part.toS);
  const segments = yield* segmentsOnce(input);
  const regular = regularNn(rr, segments);
  const { keptS, adequacy } = coverageOf(input.blocked, part.fromS, part.toS);
  return {
    part,
    rr,
    first,
    end,
    settings: settings.variability,
    segments,
    regular,
    regularTime: timeDomain(rr.rrMs, regular, first, end),
    allTime: timeDomain(rr.rrMs, rr.nn, first, end),
    keptS,
    adequacy,
    breathsPerMinute: breathsIn(breathing, part).median,
    timingSdMs,
  };
}

/**
 * All figures of the heart and of breathing for one part of the study (a phase, or a named piece of one) as numbers.md
 * defines them: each a number with what it stands on and the marks it needs, or withheld with its reason.
 * Figures of variability leave out irregular segments; heart rate and mean NN do not.
 */
export const heartFigures = (input: HeartFiguresInput): HeartFigures =>
  atOnce(heartFiguresInSteps(input));

/** heartFigures with a rest now and then. */
export function* heartFiguresInSteps(input: HeartFiguresInput): Generator<void, HeartFigures> {
  const heart = yield* partOfHeart(input);
  return {
    figures: {
      ...timeFigures(heart),
      ...spectralFigures(heart),
      ...countFigures(input, heart),
      breathing_bpm: breathingFigure(input.breathing, input.part),
    },
    segments: heart.segments.map((segment) => segment.shown),
    keptS: heart.keptS,
    adequacy: heart.adequacy,
  };
}

/** Every figure of the heart withheld for one reason ("no heartbeat can be read in this recording"). */
export function withheldHeartFigures(reason: string): Figures {
  return Object.fromEntries(
    FIGURES.filter((one) => one.organ === 'heart').map((one) => [one.key, withheld(reason)]),
  );
}
