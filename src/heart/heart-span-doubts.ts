import { firstAtOrAfter } from '../numeric/first-at-or-after';
import { median } from '../numeric/statistics';
import type { Doubt } from '../recording/doubt';
import type { Span } from '../recording/span';
import { formatClock } from '../units/time';
import type { BeatLook } from './beat-looks';
import { type BeatDoubtsInput, bestLikeness } from './doubt-view';
import { placeBeat } from './place-beat';
import { beatTimes } from './rr-series';

/** So many doubted beats, each no farther from the one before, are one stretch that may be spoiled. */
const MANY = 5;
const APART_S = 2.5;
const MARGIN_S = 0.3;
/** Beats in a span are like the average to so much, each of them, where it looks clean. */
const LIKE_A_BEAT = 0.9;
/** Beats to each side that tell the usual interval. */
const NEIGHBOURS = 5;
/** In a span longer than this the rhythm cannot be carried on from its ends. */
const LONGEST_S = 15;

/** Stretches in which so many beats are doubted that the signal itself may be spoiled; to be excluded for the heart. */
export function doubtedStretches(doubts: readonly Doubt[], lead: string): readonly Doubt[] {
  const found: Doubt[] = [];
  let first = 0;
  while (first < doubts.length) {
    let end = first + 1;
    while (end < doubts.length && doubts[end].toS - doubts[end - 1].toS < APART_S) end += 1;
    if (end - first >= MANY) found.push(stretchOf(doubts.slice(first, end), lead));
    first = end;
  }
  return found;
}

function stretchOf(doubts: readonly Doubt[], lead: string): Doubt {
  const fromS = Math.max(0, doubts[0].fromS - MARGIN_S);
  const toS = doubts[doubts.length - 1].toS + MARGIN_S;
  return {
    id: `span-${lead}-beats-${Math.round(fromS)}`,
    kind: 'span',
    fromS,
    toS,
    tick: null,
    lead,
    why: `${doubts.length} beats are doubted in the ${Math.round(toS - fromS)} s from ${formatClock(fromS)} on: the heartbeat may be spoiled there, and no span excludes it.`,
    mend: {
      kind: 'exclude',
      words: 'exclude stretch',
      span: { fromS, toS, lead, target: 'heart', cause: 'burst', origin: 'drawn', note: '' },
    },
    effect: null,
  };
}

/** Spans the program proposed for the heart in which each beat that the rhythm lets expect is plain to see. */
export function cleanSpans(
  input: BeatDoubtsInput,
  lookAt: (tick: number) => BeatLook,
  spans: readonly Span[],
): readonly Doubt[] {
  const timesS = beatTimes(input.beats, input.rateHz);
  return spans
    .filter(({ origin, fromS, toS }) => origin === 'proposed' && toS - fromS <= LONGEST_S)
    .flatMap((span): readonly Doubt[] => {
      const count = plainBeats(input, lookAt, timesS, span);
      if (count === null) return [];
      return [
        {
          id: `span-heart-kept-${span.id}`,
          kind: 'span',
          fromS: span.fromS,
          toS: span.toS,
          tick: null,
          lead: span.lead,
          why: `The program excluded this stretch, yet ${count === 1 ? 'the beat' : `each of the ${count} beats`} expected in it can be read.`,
          mend: { kind: 'include', words: 'include stretch', spanId: span.id },
          effect: null,
        },
      ];
    });
}

/** How many beats are expected in a span where all of them are plain; null where one is not, or none is expected. */
function plainBeats(
  { heartbeat, heartbeatHz, ticksPerSample, detection }: BeatDoubtsInput,
  lookAt: (tick: number) => BeatLook,
  timesS: Float64Array,
  { fromS, toS }: Span,
): number | null {
  const next = firstAtOrAfter(timesS, toS);
  const last = firstAtOrAfter(timesS, fromS) - 1;
  if (last < NEIGHBOURS || next > timesS.length - NEIGHBOURS) return null;
  const about = Array.from({ length: NEIGHBOURS }, (_, k) => [
    timesS[last - k] - timesS[last - k - 1],
    timesS[next + k] - timesS[next + k - 1],
  ]).map(([before, after], k) => (k === 0 ? before : (before + after) / 2));
  const parts = Math.round((timesS[next] - timesS[last]) / median(about));
  if (parts < 2) return null;
  const stepS = (timesS[next] - timesS[last]) / parts;
  const search = { ...detection, heartbeat, rateHz: heartbeatHz, ticksPerSample };
  for (let k = 1; k < parts; k += 1) {
    const { tick, visible } = placeBeat(search, timesS[last] + k * stepS, 0.25 * stepS);
    if (!visible || !(bestLikeness(lookAt(tick)) >= LIKE_A_BEAT)) return null;
  }
  return parts - 1;
}
