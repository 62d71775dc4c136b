import { intervalsWithin, rrSeries } from '../../../src/heart/rr-series';
import { timeDomain } from '../../../src/heart/variability';
import { lombBandPowers } from '../../../src/heart/variability-spectrum';
import { median } from '../../../src/numeric/statistics';
import { BEAT_CLASSES, type BeatList } from '../../../src/recording/beat';
import type { RrSeries } from '../../../src/recording/heart-series';
import { DEFAULT_SETTINGS } from '../../../src/recording/settings';
import { type Interval, joinIntervals } from '../../../src/recording/span';
import type { StudyTruth } from '../../../src/simulate/simulate-study';
import { TICKS_PER_SAMPLE } from '../../../src/units/ticks';
import { type MatchCounts, matchBeats } from '../../heart/score';

import type { Analysed } from './analysed';
import { type SpanScore, spanScore } from './span-score';

/** Beats this near a spoiled stretch are not scored: what is spoiled has no sharp edge. */
const MARGIN_S = 1;

/** One 5 min segment that was not withheld, in percent of the truth; RMSSD also in ms. */
export interface SegmentErrors {
  /** No spoiled stretch and no ectopic beat in it. */
  readonly clean: boolean;
  readonly sdnnPct: number;
  readonly rmssdPct: number;
  readonly rmssdMs: number;
  readonly floorMs: number;
  readonly lfPct: number;
  readonly hfPct: number;
}

export interface HeartScore {
  readonly beats: MatchCounts;
  /** Classes of matched beats: how many of each true class, and how many of those were given it. */
  readonly classes: Readonly<
    Record<'N' | 'S' | 'V', { readonly of: number; readonly right: number }>
  >;
  readonly timingSdMs: number;
  readonly segments: readonly SegmentErrors[];
  /** Segments that were withheld: those called irregular, and those of others that hold nothing spoiled and few ectopic beats. */
  readonly irregular: number;
  readonly withheld: number;
  /** 5 min segments, whatever became of them. */
  readonly all: number;
  readonly spans: SpanScore;
  /** What is said to have been seen; none of these studies holds anything to see. */
  readonly seen: number;
  /** Phases whose LF/HF bears the mark of slow breathing where breathing is not, or lacks it where it is. */
  readonly wrongMarks: number;
}

const inside = (stretches: readonly Interval[], timeS: number) =>
  stretches.some(({ fromS, toS }) => timeS >= fromS && timeS < toS);

export const spoiledOf = (truth: StudyTruth, marginS: number): readonly Interval[] =>
  joinIntervals(
    truth.spoiled.map(({ fromS, toS }) => ({ fromS: fromS - marginS, toS: toS + marginS })),
  );

function truthBeats(truth: StudyTruth, rateHz: number): BeatList {
  const { beats } = truth;
  return {
    ticks: Float64Array.from(beats, ({ timeS }) => Math.round(timeS * rateHz * TICKS_PER_SAMPLE)),
    classes: Uint8Array.from(beats, ({ beatClass }) => BEAT_CLASSES.indexOf(beatClass)),
    origins: new Uint8Array(beats.length),
  };
}

/** Standard deviation of the differences, their median taken out: a constant delay does no harm to intervals. */
function spread(values: readonly number[]): number {
  const mean = values.reduce((sum, one) => sum + one, 0) / values.length;
  return Math.sqrt(values.reduce((sum, one) => sum + (one - mean) ** 2, 0) / (values.length - 1));
}

/** Breathing this near to 9 a minute may be marked or not. */
const NEARLY_9 = 0.5;

/** Phases whose mark of slow breathing beside LF/HF is wrong. */
function wrongMarksOf({ findings }: Analysed, { breathsPerMin, rateHz }: StudyTruth): number {
  return findings.phases.filter(({ figures, fromS, toS }) => {
    const ratio = figures.lf_hf_ratio;
    if (!breathsPerMin || ratio.kind !== 'number') return false;
    const breaths = median(breathsPerMin.subarray(fromS * rateHz, toS * rateHz));
    const marked = ratio.marks.includes('breathing below 9 a minute');
    return Math.abs(breaths - 9) > NEARLY_9 && marked !== breaths < 9;
  }).length;
}

function figuresOf(rr: RrSeries, fromS: number, toS: number) {
  const { first, end } = intervalsWithin(rr, fromS, toS);
  const { sdnnMs, rmssdMs } = timeDomain(rr.rrMs, rr.nn, first, end);
  const nn = Array.from({ length: end - first }, (_, i) => first + i).filter((i) => rr.nn[i] === 1);
  const { lfHz, hfHz } = DEFAULT_SETTINGS.variability;
  const [lf, hf] = lombBandPowers(
    Float64Array.from(nn, (i) => rr.timesS[i]),
    Float64Array.from(nn, (i) => rr.rrMs[i]),
    [lfHz, hfHz],
  );
  return { sdnnMs, rmssdMs, lf, hf, count: nn.length, all: end - first };
}

const offBy = (value: number, truth: number) => (100 * (value - truth)) / truth;

/** Heartbeats, their times and the variability figures of a study against its truth. */
export function heartScore(found: Analysed, truth: StudyTruth, rateHz: number): HeartScore {
  const spoiled = spoiledOf(truth, MARGIN_S);
  const foundS = Array.from(found.beats.ticks, (tick) => tick / (rateHz * TICKS_PER_SAMPLE));
  const scored = truth.beats.filter(({ timeS }) => !inside(spoiled, timeS));
  const all = matchBeats(
    truth.beats.map(({ timeS }) => timeS),
    foundS,
  );
  const extra = all.extra.filter((d) => !inside(spoiled, foundS[d])).length;
  const pairs = all.pairs.filter(([r]) => !inside(spoiled, truth.beats[r].timeS));
  const classes = { N: { of: 0, right: 0 }, S: { of: 0, right: 0 }, V: { of: 0, right: 0 } };
  for (const [r, d] of pairs) {
    const { beatClass } = truth.beats[r];
    if (beatClass !== 'N' && beatClass !== 'S' && beatClass !== 'V') continue;
    classes[beatClass].of += 1;
    if (BEAT_CLASSES[found.beats.classes[d]] === beatClass) classes[beatClass].right += 1;
  }
  const normal = pairs.filter(([r]) => truth.beats[r].beatClass === 'N');
  return {
    beats: {
      truePositive: pairs.length,
      falseNegative: scored.length - pairs.length,
      falsePositive: extra,
    },
    classes,
    timingSdMs: 1000 * spread(normal.map(([r, d]) => foundS[d] - truth.beats[r].timeS)),
    ...segmentScores(found, truth, rateHz),
    spans: spanScore(found.spans, truth),
    seen: found.findings.seen.length,
    wrongMarks: wrongMarksOf(found, truth),
  };
}

/** The printed figures of each 5 min segment against those of all its true NN intervals. */
function segmentScores(
  found: Analysed,
  truth: StudyTruth,
  rateHz: number,
): Pick<HeartScore, 'segments' | 'irregular' | 'withheld' | 'all'> {
  const spoiled = spoiledOf(truth, MARGIN_S);
  const rr = rrSeries(truthBeats(truth, rateHz), rateHz, []);
  const segments: SegmentErrors[] = [];
  let [irregular, withheld, all] = [0, 0, 0];
  for (const { fromS, toS, state, sdnnMs, lfMs2, hfMs2 } of found.segments) {
    if (toS - fromS < 299) continue;
    all += 1;
    const real = figuresOf(rr, fromS, toS);
    const spoiledHere = spoiled.some((one) => one.fromS < toS && one.toS > fromS);
    if (state === 'irregular') irregular += 1;
    else if (state !== 'used' && !spoiledHere && real.count >= 0.93 * real.all) withheld += 1;
    if (state !== 'used' || sdnnMs === null || lfMs2 === null || hfMs2 === null) continue;
    const { rmssdMs } = figuresOf(found.rr, fromS, toS);
    segments.push({
      clean: !spoiledHere && real.count === real.all,
      sdnnPct: offBy(sdnnMs, real.sdnnMs),
      rmssdPct: offBy(rmssdMs, real.rmssdMs),
      rmssdMs: rmssdMs - real.rmssdMs,
      floorMs: Math.sqrt(6) * found.timingSdMs,
      lfPct: offBy(lfMs2, real.lf),
      hfPct: offBy(hfMs2, real.hf),
    });
  }
  return { segments, irregular, withheld, all };
}
