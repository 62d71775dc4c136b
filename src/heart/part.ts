import type { FigureValue } from '../recording/figure';
import { withheld } from '../recording/figure';
import type { Adequacy } from '../recording/findings';
import type { RrSeries } from '../recording/heart-series';
import type { Phase } from '../recording/phase';
import type { Settings } from '../recording/settings';
import type { Seconds } from '../units/time';
import type { SegmentResult } from './segments';
import type { TimeDomain } from './variability';

/** One part of the study as the figures see it. */
export interface PartOfHeart {
  readonly part: Phase;
  readonly rr: RrSeries;
  /** Intervals [first, end) lie wholly in the part. */
  readonly first: number;
  readonly end: number;
  readonly settings: Settings['variability'];
  readonly segments: readonly SegmentResult[];
  /** NN intervals outside irregular segments, and the time-domain figures of these and of all NN. */
  readonly regular: Uint8Array;
  readonly regularTime: TimeDomain;
  readonly allTime: TimeDomain;
  readonly keptS: Seconds;
  readonly adequacy: Adequacy;
  /** Median breathing rate of the part; NaN where it is not known. */
  readonly breathsPerMinute: number;
  readonly timingSdMs: number;
}

/** "1 segment", "6 segments". */
export const counted = (segments: number): string =>
  segments === 1 ? '1 segment' : `${segments} segments`;

export const minutes = (seconds: Seconds): string => (seconds / 60).toFixed(1);

/** Segments that stand for the part: the full ones, or the single short one. */
export function judgedSegments(heart: PartOfHeart): readonly SegmentResult[] {
  const full = heart.segments.filter((segment) => segment.full);
  return full.length > 0 ? full : heart.segments;
}

const inState = (segments: readonly SegmentResult[], state: SegmentResult['shown']['state']) =>
  segments.filter((segment) => segment.shown.state === state);

/** Seconds of the part's irregular segments. */
export function irregularSeconds(heart: PartOfHeart): Seconds {
  return inState(heart.segments, 'irregular').reduce(
    (sum, { shown }) => sum + shown.toS - shown.fromS,
    0,
  );
}

/** What to print beside a figure from which irregular segments were left out; empty where there was none. */
export function irregularMarks(heart: PartOfHeart): readonly string[] {
  const judged = judgedSegments(heart);
  const count = inState(judged, 'irregular').length;
  return count > 0 ? [`${count} of ${counted(judged.length)} irregular, left out`] : [];
}

/** What to print beside a figure of NN intervals where too many intervals are none; empty where enough are. */
export function sparseMarks(heart: PartOfHeart): readonly string[] {
  const share = heart.allTime.nnCount / (heart.end - heart.first);
  return share < heart.settings.minNnShare
    ? [`only ${Math.round(100 * share)} % of the intervals are NN`]
    : [];
}

/** Why no segment carries a figure, in words that count the segments by reason. */
export function noSegmentReason(heart: PartOfHeart): FigureValue {
  const judged = judgedSegments(heart);
  const irregular = inState(judged, 'irregular').length;
  const few = inState(judged, 'too-few-nn').length;
  const percent = Math.round(100 * heart.settings.minNnShare);
  const parts = [
    irregular > 0 ? `${irregular} of ${judged.length} irregular` : '',
    few > 0 ? `${few} of ${judged.length} under ${percent} % NN` : '',
  ].filter((text) => text !== '');
  return withheld(`no segment carries it: ${parts.join(', ') || 'too short'}`);
}

/** A reason to withhold every figure of variability, or null. */
export function nothingRegular(heart: PartOfHeart): FigureValue | null {
  if (heart.end === heart.first) return withheld('no two beats in this part');
  if (heart.allTime.nnCount === 0) return withheld('no NN interval in this part');
  if (heart.regularTime.nnCount > 0) return null;
  const judged = judgedSegments(heart);
  return withheld(`the rhythm is irregular in ${judged.length} of ${counted(judged.length)}`);
}
