import type { Range } from '../numeric/chance-range';
import { type DecidedCell, extremeRatio } from '../numeric/extreme-ratio';
import type { Settings } from '../recording/settings';
import type { Interval } from '../recording/span';
import { decidedAbout, mendedBy, reaches, type Undecided } from './decisions';
import { rhythmFlags, rrSeries } from './rr-series';
import { type Laid, layOut, type SegmentResult, segmentOf } from './segments';

/** Up to so many decisions in a segment every combination is tried. */
const MOST_TRIED = 5;

/** A segment with what it becomes by each decision that reaches it. */
export interface UndecidedSegment {
  readonly laid: Laid;
  readonly decisions: readonly number[];
  readonly stands: SegmentResult;
  /** Every combination, by its mask, or each decision by itself where they are too many. */
  readonly tried: readonly SegmentResult[];
  readonly all: boolean;
}

/**
 * The segments of a part with what decisions make of them, a segment a step: every combination of up to five decisions, else
 * one decision at a time. `known` keeps what was tried before for the same beats.
 */
export function* undecidedSegments(
  undecided: Undecided,
  part: Interval,
  settings: Settings['variability'],
  known: Map<string, SegmentResult>,
): Generator<number, readonly UndecidedSegment[]> {
  const felt = reaches(undecided);
  const laid = layOut(part, settings.segmentS);
  const found: UndecidedSegment[] = [];
  for (const one of laid) {
    const decisions = felt.flatMap((reach, k) =>
      reach.fromS < one.toS && reach.toS > one.fromS ? [k] : [],
    );
    const all = decisions.length <= MOST_TRIED;
    const masks = all
      ? Array.from({ length: 1 << decisions.length }, (_, mask) => mendedBy(mask, decisions))
      : [[], ...decisions.map((k) => [k])];
    const tried: SegmentResult[] = [];
    for (const mended of masks) {
      const key = [one.fromS, one.toS, laid.length === 1, ...mended].join(' ');
      const result =
        known.get(key) ??
        segmentAfter(
          undecided,
          { laid: one, decisions, mended, alone: laid.length === 1 },
          settings,
        );
      known.set(key, result);
      tried.push(result);
      yield found.length / laid.length;
    }
    found.push({ laid: one, decisions, stands: tried[0], tried, all });
  }
  return found;
}

interface SegmentAsked {
  readonly laid: Laid;
  readonly decisions: readonly number[];
  readonly mended: readonly number[];
  readonly alone: boolean;
}

function segmentAfter(
  undecided: Undecided,
  { laid, decisions, mended, alone }: SegmentAsked,
  settings: Settings['variability'],
): SegmentResult {
  const { rateHz } = undecided;
  const { beats, blocked } = decidedAbout(undecided, laid, decisions, mended);
  const rr = rrSeries(beats, rateHz, blocked);
  return segmentOf({ rr, rhythm: rhythmFlags(beats, rateHz, blocked), settings }, '', laid, alone);
}

/** A figure of segments: a mean of one value over those that carry it, or the ratio of two means over the same ones. */
interface SegmentFigure {
  readonly above: (segment: SegmentResult) => number | null;
  readonly below: (segment: SegmentResult) => number | null;
}

const one = (value: number | null) => (value === null ? null : 1);
const lf = ({ shown }: SegmentResult) => shown.lfMs2;
const hf = ({ shown }: SegmentResult) => shown.hfMs2;
const sdnn = ({ full, shown }: SegmentResult) => (full ? shown.sdnnMs : null);

const SEGMENT_FIGURES: Readonly<Record<string, SegmentFigure>> = {
  sdnn_ms: { above: sdnn, below: (segment) => one(sdnn(segment)) },
  lf_ms2: { above: lf, below: (segment) => one(lf(segment)) },
  hf_ms2: { above: hf, below: (segment) => one(hf(segment)) },
  lf_hf_ratio: { above: lf, below: hf },
};

/** The lowest and highest of a figure with whether that is exact. */
export interface Extremes extends Range {
  readonly exact: boolean;
}

/**
 * The lowest and highest that SDNN, LF, HF and LF/HF of a part can be over all ways of deciding. Exact where every combination
 * was tried in each segment and no decision reaches two; where one does, nothing lies outside; where a segment has more than
 * five decisions, what each does by itself was added up.
 */
export function extremesOfSegments(
  segments: readonly UndecidedSegment[],
): Readonly<Record<string, Extremes>> {
  const full = segments.filter(({ laid }) => laid.full);
  const judged = full.length > 0 ? full : segments;
  const reached = judged.flatMap(({ decisions }) => decisions);
  const exact = judged.every(({ all }) => all) && new Set(reached).size === reached.length;
  const found = Object.entries(SEGMENT_FIGURES).map(([key, figure]): [string, Extremes] => {
    const [low, high] = ([-1, 1] as const).map((sign) => {
      const cells = judged.map((segment, k) => cellOf(segment, figure, sign, k));
      return extremeRatio({ above: 0, below: 0 }, cells, sign);
    });
    return [key, { low, high, exact }];
  });
  const ratio = found.find(([key]) => key === 'lf_hf_ratio')?.[1];
  return Object.fromEntries([...found, ...(ratio ? normalised(ratio) : [])]);
}

function normalised({ low, high, exact }: Extremes): readonly (readonly [string, Extremes])[] {
  const lfShare = (ratio: number) => (100 * ratio) / (1 + ratio);
  return [
    ['lf_nu_pct', { low: lfShare(low), high: lfShare(high), exact }],
    ['hf_nu_pct', { low: 100 - lfShare(high), high: 100 - lfShare(low), exact }],
  ];
}

/** A segment as a cell of its own: its decisions are named apart, so that it is decided by itself. */
function cellOf(
  { tried, stands, all, decisions }: UndecidedSegment,
  figure: SegmentFigure,
  sign: 1 | -1,
  place: number,
): DecidedCell {
  const pairs = all
    ? tried.map((segment) => pairOf(segment, figure))
    : addedUp(stands, tried, figure, sign);
  return {
    decisions: Array.from({ length: all ? decisions.length : 2 }, (_, bit) => 100 * place + bit),
    above: Float64Array.from(pairs, ([above]) => above),
    below: Float64Array.from(pairs, ([, below]) => below),
  };
}

type Pair = readonly [above: number, below: number];

function pairOf(segment: SegmentResult, { above, below }: SegmentFigure): Pair {
  const [a, b] = [above(segment), below(segment)];
  return a === null || b === null ? [0, 0] : [a, b];
}

/** As it stands, with all effects of one direction added up, and gone where a decision alone takes it away. */
function addedUp(
  stands: SegmentResult,
  tried: readonly SegmentResult[],
  figure: SegmentFigure,
  sign: 1 | -1,
): readonly Pair[] {
  const now = pairOf(stands, figure);
  const moved = tried.map((segment) => pairOf(segment, figure));
  const there = moved.filter(([, below]) => below > 0);
  const from = now[1] > 0 ? now : (there[0] ?? now);
  const summed = (k: 0 | 1, way: number) =>
    addedTo(
      from[k],
      there.map((pair) => pair[k]),
      way,
    );
  const isRatio = there.some(([, below]) => below !== 1);
  const extreme: Pair = [summed(0, sign), isRatio ? summed(1, -sign) : from[1]];
  const gone = moved.find(([, below]) => below === 0);
  return [now, extreme, gone ?? now, gone ? extreme : now];
}

/**
 * A power or spread with what many decisions do to it, those of one direction added up. What adds to a signal adds at most by
 * its amplitude, so upwards the roots are added where that gives more; never below 0.
 */
function addedTo(from: number, alone: readonly number[], way: number): number {
  const sumOf = (scale: (value: number) => number) =>
    alone.reduce(
      (sum, value) => sum + way * Math.max(0, way * (scale(value) - scale(from))),
      scale(from),
    );
  const plain = sumOf((value) => value);
  return way < 0 ? Math.max(0, plain) : Math.max(plain, sumOf(Math.sqrt) ** 2);
}
