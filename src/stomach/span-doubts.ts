import { runningMedian } from '../numeric/running-quantile';
import type { Doubt } from '../recording/doubt';
import { coveredSeconds, type Interval, joinIntervals, type Span } from '../recording/span';
import type { Hertz } from '../units/rate';
import { formatClock } from '../units/time';

/** Swings are measured over this long: more than a slow wave's rise, less than its cycle. */
const SWING_S = 8;
/** What is usual is the middle of so many seconds about. */
const USUAL_S = 301;
/** Swings so many times the usual may be spoiled; the watch proposes a span from a few tenths more on. */
const MAY_BE_SPOILED = 2.2;
/** A proposed span that nowhere swings more than this looks clean. */
const LOOKS_CLEAN = 1.7;
/** Stretches nearer than this to one another, or to a span, are one. */
const NEAR_S = 8;

/** A slow-wave lead before any band, with what is excluded of it. */
export interface SlowLead {
  readonly lead: string;
  readonly recorded: Float64Array;
  readonly rateHz: Hertz;
  /** Spans that act on the stomach's figures of this lead. */
  readonly spans: readonly Span[];
  readonly gaps: readonly Interval[];
}

/** How much the lead swings within SWING_S about each second, beside what is usual about it; NaN where samples are missing. */
function swingsBesideUsual(recorded: Float64Array, rateHz: Hertz): Float64Array {
  const half = Math.round((SWING_S / 2) * rateHz);
  const swings = Float64Array.from({ length: Math.floor(recorded.length / rateHz) }, (_, s) => {
    const centre = Math.round((s + 0.5) * rateHz);
    let [low, high] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
    for (let i = Math.max(0, centre - half); i < Math.min(recorded.length, centre + half); i += 1) {
      if (Number.isNaN(recorded[i])) return Number.NaN;
      if (recorded[i] < low) low = recorded[i];
      if (recorded[i] > high) high = recorded[i];
    }
    return high - low;
  });
  const usual = runningMedian(swings, USUAL_S);
  return swings.map((swing, s) => swing / usual[s]);
}

/** Greatest of the values of the seconds of a stretch; NaN where there are none. */
function greatest(values: Float64Array, { fromS, toS }: Interval): number {
  let most = Number.NaN;
  for (let s = Math.max(0, Math.floor(fromS)); s < Math.min(values.length, toS); s += 1)
    if (!(values[s] <= most) && !Number.isNaN(values[s])) most = values[s];
  return most;
}

/**
 * Doubts of what is excluded for the stomach on one lead: stretches that swing far more than usual and are in no span, and
 * spans the program proposed in which nothing swings more than usual.
 */
export function slowSpanDoubts(from: SlowLead): readonly Doubt[] {
  const ratios = swingsBesideUsual(from.recorded, from.rateHz);
  return [...unexcluded(from, ratios), ...clean(from, ratios)];
}

function unexcluded({ lead, spans, gaps }: SlowLead, ratios: Float64Array): readonly Doubt[] {
  const seconds = Array.from(ratios.keys()).filter((s) => ratios[s] > MAY_BE_SPOILED);
  const wide = joinIntervals(
    seconds.map((s) => ({ fromS: s + 0.5 - SWING_S / 2, toS: s + 0.5 + SWING_S / 2 })),
  );
  const taken = [...spans, ...gaps].map(({ fromS, toS }) => ({
    fromS: fromS - NEAR_S,
    toS: toS + NEAR_S,
  }));
  return wide
    .filter(({ fromS, toS }) => coveredSeconds(taken, fromS, toS) === 0)
    .map(({ fromS, toS }): Doubt => {
      const times = greatest(ratios, { fromS, toS }).toFixed(1);
      const from = Math.max(0, fromS);
      return {
        id: `span-${lead}-${Math.round(from)}`,
        kind: 'span',
        fromS: from,
        toS,
        tick: null,
        lead,
        why: `From ${formatClock(from)} on the lead swings up to ${times} times as far as is usual about it, and no span excludes it.`,
        mend: {
          kind: 'exclude',
          words: 'exclude stretch',
          span: {
            fromS: from,
            toS,
            lead,
            target: 'stomach',
            cause: 'move',
            origin: 'drawn',
            note: '',
          },
        },
        effect: null,
      };
    });
}

/** Empty stretches are what they are: only movement may be taken for more than it is. */
const EMPTY: readonly Span['cause'][] = ['gap', 'rail', 'flat'];

function clean({ lead, spans }: SlowLead, ratios: Float64Array): readonly Doubt[] {
  return spans
    .filter(({ origin, cause }) => origin === 'proposed' && !EMPTY.includes(cause))
    .flatMap((span): readonly Doubt[] => {
      const most = greatest(ratios, span);
      if (!(most < LOOKS_CLEAN)) return [];
      return [
        {
          id: `span-${lead}-kept-${span.id}`,
          kind: 'span',
          fromS: span.fromS,
          toS: span.toS,
          tick: null,
          lead,
          why: `The program excluded this stretch, yet the lead swings at most ${most.toFixed(1)} times as far as is usual about it.`,
          mend: { kind: 'include', words: 'include stretch', spanId: span.id },
          effect: null,
        },
      ];
    });
}
