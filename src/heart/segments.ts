import { firstAtOrAfter } from '../numeric/first-at-or-after';
import type { HeartSegment, RrSeries } from '../recording/heart-series';
import type { Phase } from '../recording/phase';
import type { Settings } from '../recording/settings';
import type { Seconds } from '../units/time';
import type { Band } from './band-power';
import { FEWEST_FOR_RHYTHM, isIrregularStretch } from './irregularity';
import { intervalsWithin, type RhythmFlags } from './rr-series';
import { timeDomain } from './variability';
import { lombBandPowers, welchBandPowers } from './variability-spectrum';

/** Least length that carries each band (Task Force 1996: about ten of the longest periods). */
export const LF_NEEDS_S = 120;
export const HF_NEEDS_S = 60;
export const VLF_NEEDS_S = 1200;
const VLF_FROM_HZ = 0.003;
/** A length that falls short by rounding alone is not short. */
const ROUNDING_S = 1e-6;

/** A segment with what the figures need of it beside what is shown. */
export interface SegmentResult {
  readonly shown: HeartSegment;
  /** Spans the full segment length, so that its SDNN may be averaged with others'. */
  readonly full: boolean;
  readonly first: number;
  readonly end: number;
  readonly vlfMs2: number | null;
  readonly lfWelchMs2: number | null;
  readonly hfWelchMs2: number | null;
}

export interface SegmentInput {
  readonly rr: RrSeries;
  readonly rhythm: RhythmFlags;
  readonly settings: Settings['variability'];
}

/** A segment's place; `full` where it has the whole length of one. */
export interface Laid {
  readonly fromS: Seconds;
  readonly toS: Seconds;
  readonly full: boolean;
}

/**
 * Segments of a part, laid from its start; what is left at the end is a short one. A part shorter than a segment is one
 * short segment by itself.
 */
export function layOut(
  { fromS, toS }: Pick<Phase, 'fromS' | 'toS'>,
  segmentS: Seconds,
): {
  readonly fromS: Seconds;
  readonly toS: Seconds;
  readonly full: boolean;
}[] {
  const count = Math.floor((toS - fromS + ROUNDING_S) / segmentS);
  const full = Array.from({ length: Math.max(0, count) }, (_, k) => ({
    fromS: fromS + k * segmentS,
    toS: fromS + (k + 1) * segmentS,
    full: true,
  }));
  const restFrom = fromS + Math.max(0, count) * segmentS;
  if (toS - restFrom > ROUNDING_S) full.push({ fromS: restFrom, toS, full: false });
  return full;
}

/** Values of x[first..end) whose mask is 1. */
function chosen(x: Float64Array, mask: Uint8Array, first: number, end: number): Float64Array {
  const out = new Float64Array(end - first);
  let count = 0;
  for (let i = first; i < end; i += 1) {
    if (mask[i] !== 1) continue;
    out[count] = x[i];
    count += 1;
  }
  return out.subarray(0, count);
}

function powersOf(
  input: SegmentInput,
  first: number,
  end: number,
  lengthS: Seconds,
): Pick<SegmentResult, 'vlfMs2' | 'lfWelchMs2' | 'hfWelchMs2'> & {
  readonly lfMs2: number | null;
  readonly hfMs2: number | null;
} {
  const { rr, settings } = input;
  const times = chosen(rr.timesS, rr.nn, first, end);
  const values = chosen(rr.rrMs, rr.nn, first, end);
  const vlf: Band = [VLF_FROM_HZ, settings.lfHz[0]];
  const withVlf = lengthS >= VLF_NEEDS_S - ROUNDING_S;
  const bands = withVlf ? [settings.lfHz, settings.hfHz, vlf] : [settings.lfHz, settings.hfHz];
  const lomb = lombBandPowers(times, values, bands);
  const welch = welchBandPowers(times, values, [settings.lfHz, settings.hfHz]);
  const given = (value: number, needsS: Seconds) =>
    lengthS >= needsS - ROUNDING_S && Number.isFinite(value) ? value : null;
  return {
    lfMs2: given(lomb[0], LF_NEEDS_S),
    hfMs2: given(lomb[1], HF_NEEDS_S),
    vlfMs2: withVlf ? given(lomb[2], VLF_NEEDS_S) : null,
    lfWelchMs2: given(welch[0], LF_NEEDS_S),
    hfWelchMs2: given(welch[1], HF_NEEDS_S),
  };
}

const NO_POWERS = {
  lfMs2: null,
  hfMs2: null,
  vlfMs2: null,
  lfWelchMs2: null,
  hfWelchMs2: null,
};

/**
 * Share of NN, 0 to 1: the smaller of their share among the intervals and of their share of the time, so that neither
 * beats without worth nor a stretch without beats goes unseen.
 */
function nnShareOf(nnCount: number, all: number, nnSeconds: number, lengthS: Seconds): number {
  if (nnCount === 0) return 0;
  const beatS = nnSeconds / nnCount;
  return Math.min(nnCount / all, nnSeconds / Math.max(beatS, lengthS - beatS), 1);
}

/** A rhythm with more early beats than this is not a normal one with a few (common practice, no source). */
const MOST_ECTOPIC = 0.1;

function isIrregular({ rr, rhythm }: SegmentInput, first: number, end: number): boolean {
  const ectopic = rhythm.ectopic.subarray(first, end).reduce((sum, one) => sum + one, 0);
  if (end - first >= FEWEST_FOR_RHYTHM && ectopic > MOST_ECTOPIC * (end - first)) return true;
  return isIrregularStretch(chosen(rr.rrMs, rhythm.tells, first, end));
}

function stateOf(
  input: SegmentInput,
  laid: Laid,
  alone: boolean,
  found: { first: number; end: number; nnShare: number },
): HeartSegment['state'] {
  if (isIrregular(input, found.first, found.end)) return 'irregular';
  if (!laid.full && !(alone && laid.toS - laid.fromS >= HF_NEEDS_S - ROUNDING_S))
    return 'too-short';
  return found.nnShare < input.settings.minNnShare - 1e-9 ? 'too-few-nn' : 'used';
}

/**
 * One segment: its intervals, its state, and the figures that its state lets it carry. `alone` says that the part has no
 * other. `irregular` comes before every other state, since it says something of the rhythm and not of the recording;
 * `too-short` is a rest beside full segments, or a part under 1 min.
 */
export function segmentOf(
  input: SegmentInput,
  phase: string,
  laid: Laid,
  alone: boolean,
): SegmentResult {
  const { fromS, toS, full } = laid;
  const { first, end } = intervalsWithin(input.rr, fromS, toS);
  const time = timeDomain(input.rr.rrMs, input.rr.nn, first, end);
  const nnShare = nnShareOf(time.nnCount, end - first, time.nnSeconds, toS - fromS);
  const state = stateOf(input, laid, alone, { first, end, nnShare });
  const { lfMs2, hfMs2, ...others } =
    state === 'used' ? powersOf(input, first, end, toS - fromS) : NO_POWERS;
  const sdnnMs = state === 'used' && Number.isFinite(time.sdnnMs) ? time.sdnnMs : null;
  return {
    shown: { phase, fromS, toS, nnShare, state, sdnnMs, lfMs2, hfMs2 },
    full,
    first,
    end,
    ...others,
  };
}

/** The NN mask with the intervals of irregular segments taken out: what variability figures stand on. */
export function regularNn(rr: RrSeries, segments: readonly SegmentResult[]): Uint8Array {
  if (!segments.some((segment) => segment.shown.state === 'irregular')) return rr.nn;
  const mask = Uint8Array.from(rr.nn);
  for (const { shown } of segments)
    if (shown.state === 'irregular')
      mask.fill(0, firstAtOrAfter(rr.timesS, shown.fromS), firstAtOrAfter(rr.timesS, shown.toS));
  return mask;
}
