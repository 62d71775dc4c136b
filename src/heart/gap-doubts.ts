import { exp, log } from '../numeric/elementary';
import type { Beat, BeatClass } from '../recording/beat';
import { align, TIMING_HALF_S, timerOf } from './align';
import { type DoubtView, insertion, percent, type Reason } from './doubt-view';
import { placeBeat } from './place-beat';

/** Longer than foretold by so many spreads an interval is long; as a multiple it is off by less than the second. */
const LONG_SPREADS = 3.5;
const MULTIPLE_SPREADS = 3;
const MULTIPLE_LOG = 0.25;
const MOST_PARTS = 5;
/** A shorter interval than this part of the usual one hides no beat. */
const LEAST_LONG = 1.25;
/** No beat is looked for nearer to its neighbours than this. */
const APART_S = 0.25;
/** From this likeness and size on a complex is taken for a beat that was missed; of a multiple less will do. */
const LIKE_A_BEAT = 0.9;
const LEAST_SIZE = 0.5;
const LIKE_IN_MULTIPLE = 0.75;
const LEAST_SIZE_IN_MULTIPLE = 0.35;
/** The pause after an early beat makes up for it: the two together are at most so many usual intervals. */
const MADE_UP = 2.25;
const ECTOPIC: readonly BeatClass[] = ['S', 'V', 'F'];

/** How long an interval is beside what is foretold. */
interface LongInterval {
  readonly usualMs: number;
  /** How many usual intervals it makes, where the rhythm's own spread lets it be told; null else. */
  readonly parts: number | null;
}

/** Whether the interval that ends at a beat is long enough to hide one. */
function longInterval({ logRr, ways }: DoubtView, beat: number): LongInterval | null {
  const i = beat - 1;
  let parts: number | null = null;
  let usual = Number.NaN;
  let isOut = true;
  for (const { expected, spread } of ways) {
    const foretold = expected(i, i);
    const off = logRr[i] - foretold;
    if (Number.isNaN(off)) continue;
    if (!(exp(off) > LEAST_LONG)) return null;
    usual = Number.isNaN(usual) ? foretold : usual;
    isOut &&= off > LONG_SPREADS * spread[i];
    for (let n = 2; n <= MOST_PARTS && parts === null; n += 1)
      if (Math.abs(off - log(n)) < Math.min(MULTIPLE_LOG, MULTIPLE_SPREADS * spread[i])) parts = n;
  }
  return Number.isNaN(usual) ? null : { usualMs: 1000 * exp(usual), parts: isOut ? parts : null };
}

interface Seen {
  readonly tick: number;
  readonly likeness: number;
  readonly size: number;
  readonly average: number;
}

/** The place between two times that is most like a beat; null where there is no room. */
function bestBetween(view: DoubtView, fromS: number, toS: number): Seen | null {
  const { heartbeat, heartbeatHz, ticksPerSample, detection } = view;
  const half = Math.round(TIMING_HALF_S * heartbeatHz);
  const search = Math.floor(((toS - fromS) / 2 - APART_S) * heartbeatHz);
  if (search < 2) return null;
  const centre = Math.round(((fromS + toS) / 2) * heartbeatHz);
  const reach = half + search + 8;
  const row = Float64Array.from(
    { length: 2 * reach + 1 },
    (_, i) => heartbeat[centre - reach + i] ?? 0,
  );
  let best: Seen | null = null;
  detection.averages.forEach(({ samples, centre: point }, average) => {
    const middle = Math.round(point);
    const timer = timerOf(Float64Array.from(samples.subarray(middle - half, middle + half + 1)));
    const { place, likeness, size } = align(row, timer, reach, search);
    if (size < LEAST_SIZE_IN_MULTIPLE || !(likeness > (best?.likeness ?? -1))) return;
    const tick = Math.round((centre + place - reach + point - middle) * ticksPerSample);
    best = { tick, likeness, size, average };
  });
  return best;
}

/** Why beats may be missing in the interval that ends at a beat; null where none seem to. */
export function gapReason(view: DoubtView, beat: number): Reason | null {
  const long = beat > 0 ? longInterval(view, beat) : null;
  return long && reasonOf(view, beat, long);
}

function reasonOf(view: DoubtView, beat: number, { usualMs, parts }: LongInterval): Reason | null {
  const { timesS, rrMs } = view;
  const [fromS, toS] = [timesS[beat - 1], timesS[beat]];
  const rr = Math.round(rrMs[beat]);
  const usual = Math.round(usualMs);
  const seen = bestBetween(view, fromS, toS);
  const isMultiple = parts !== null && !isMadeUp(view, beat, usualMs);
  const [leastLike, leastSize] = isMultiple
    ? [LIKE_IN_MULTIPLE, LEAST_SIZE_IN_MULTIPLE]
    : [LIKE_A_BEAT, LEAST_SIZE];
  const isSeen = seen !== null && seen.likeness >= leastLike && seen.size >= leastSize;
  if (isMultiple) {
    return {
      beat,
      kind: 'missed-beat',
      strength: isSeen ? 0.95 : 0.5,
      why: `The interval of ${rr} ms is ${timesWords(rr / usual)} its neighbours' ${usual} ms.`,
      mend: insertion(view, beatsAt(view, fromS, toS, parts, isSeen ? seen : null)),
    };
  }
  if (!isSeen) return null;
  return {
    beat,
    kind: 'missed-beat',
    strength: 0.6 + 0.3 * (seen.likeness - LIKE_A_BEAT),
    why: `The interval of ${rr} ms is long beside its neighbours' ${usual} ms, and something in it is like a beat (${percent(seen.likeness)}).`,
    mend: insertion(view, [seenBeat(view, seen, fromS, usualMs)]),
  };
}

const timesWords = (ratio: number): string =>
  Math.abs(ratio - 2) < 0.2 ? 'about twice' : `about ${ratio.toFixed(1)} times`;

/** Whether the interval is the pause after an early ectopic beat. */
const isMadeUp = ({ classOf, rrMs }: DoubtView, beat: number, usualMs: number) =>
  ECTOPIC.includes(classOf(beat - 1)) && !(rrMs[beat - 1] + rrMs[beat] > MADE_UP * usualMs);

/** A beat that was seen, of its average's class; early ones of the normal shape are supraventricular. */
function seenBeat(
  { detection, rateHz }: DoubtView,
  seen: Seen,
  fromS: number,
  usualMs: number,
): Beat {
  const shape = detection.averages[seen.average].beatClass;
  const early = seen.tick / 64 / rateHz - fromS < (0.87 * usualMs) / 1000;
  const beatClass = shape === 'N' && early ? 'S' : shape;
  return { tick: seen.tick, beatClass, origin: 'added' };
}

/** Beats that cut an interval into parts: each at its best place near its share, placed where nothing is seen there. */
function beatsAt(
  view: DoubtView,
  fromS: number,
  toS: number,
  parts: number,
  seen: Seen | null,
): readonly Beat[] {
  const { heartbeat, heartbeatHz, ticksPerSample, detection } = view;
  if (parts === 2 && seen) return [seenBeat(view, seen, fromS, (1000 * (toS - fromS)) / 2)];
  const { averages, sign } = detection;
  const search = { heartbeat, rateHz: heartbeatHz, ticksPerSample, averages, sign };
  const stepS = (toS - fromS) / parts;
  return Array.from({ length: parts - 1 }, (_, k): Beat => {
    const { tick, visible } = placeBeat(search, fromS + (k + 1) * stepS, 0.3 * stepS);
    return { tick, beatClass: 'N', origin: visible ? 'added' : 'placed' };
  });
}
