import type { BeatList } from '../recording/beat';
import type { RrSeries } from '../recording/heart-series';
import type { Phase } from '../recording/phase';
import type { Settings } from '../recording/settings';
import type { Interval } from '../recording/span';
import type { Hertz } from '../units/rate';
import { rhythmIntervals } from './rr-series';
import { type Laid, layOut, type SegmentResult, segmentOf } from './segments';

interface Known {
  readonly rhythm: Uint8Array;
  readonly segments: Map<string, SegmentResult>;
}

/** An RR series is never changed in place, so what was worked out for it holds as long as it lives. */
const known = new WeakMap<RrSeries, Known>();

export interface SegmentsAsked {
  readonly rr: RrSeries;
  readonly beats: BeatList;
  readonly rateHz: Hertz;
  readonly part: Phase;
  readonly blocked: readonly Interval[];
  readonly settings: Settings;
}

function keyOf({ fromS, toS }: Laid, alone: boolean, { variability }: Settings): string {
  const { segmentS, lfHz, hfHz, minNnShare } = variability;
  return [fromS, toS, alone, segmentS, ...lfHz, ...hfHz, minNnShare].join(' ');
}

/**
 * The segments of a part of the study. Phases and pieces of them share most segments ("fed" and "fed 0-30"), and an edit
 * asks for all of them at once, so each is worked out once for a series.
 */
export function segmentsOnce(asked: SegmentsAsked): readonly SegmentResult[] {
  const { rr, part, settings } = asked;
  let about = known.get(rr);
  if (!about) {
    const rhythm = rhythmIntervals(asked.beats, asked.rateHz, asked.blocked);
    about = { rhythm, segments: new Map() };
    known.set(rr, about);
  }
  const { rhythm, segments } = about;
  const laid = layOut(part, settings.variability.segmentS);
  return laid.map((one) => {
    const alone = laid.length === 1;
    const key = keyOf(one, alone, settings);
    const held =
      segments.get(key) ??
      segmentOf({ rr, rhythm, settings: settings.variability }, part.name, one, alone);
    segments.set(key, held);
    return { ...held, shown: { ...held.shown, phase: part.name } };
  });
}
