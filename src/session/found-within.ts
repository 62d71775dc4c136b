import { median } from '../numeric/statistics';
import { type Beat, type BeatList, beatAt } from '../recording/beat';
import { matchBeats } from '../recording/match-beats';
import { type Interval, isWithin } from '../recording/span';
import type { Hertz } from '../units/rate';
import { ticksToSeconds } from '../units/ticks';
import { formatClock } from '../units/time';
import type { Edit } from './document';

/** What looking for beats again in a stretch would change. */
export interface FoundChange {
  readonly gained: readonly Beat[];
  readonly lost: readonly Beat[];
  /** Beats that stay at another time, as where the other extreme is taken. */
  readonly moved: readonly { readonly from: Beat; readonly to: Beat }[];
}

export interface FoundWithinInputs {
  readonly current: BeatList;
  readonly found: BeatList;
  /** Rate of the heart lead, the clock of both lists. */
  readonly rateHz: Hertz;
  readonly within: Interval;
  /** Parts in which no beat was looked for: beats in them stay. */
  readonly left: readonly Interval[];
  /** `stay`: a beat found again keeps its time; `shift`: so too, and what was found stands in another lead, whose R peaks
   * come a little earlier or later; `take`: it gets the time found. */
  readonly times: 'stay' | 'shift' | 'take';
}

/** Matched beats that tell how much earlier or later another lead's R peaks come. */
const LEAST_PAIRS = 5;
/** A beat moved by less is not said to be moved. */
const MOVED_S = 0.002;
/** Two beats cannot stand this close. */
const CROWDED_S = 0.1;

/**
 * Compares the beats of a stretch with those found there again: matched one to one within 150 ms, a beat in both stays as it
 * is, with the class it was given; one that is matched counts for the stretch by where it stands now.
 */
export function foundWithin(inputs: FoundWithinInputs): FoundChange {
  const { current, rateHz, times } = inputs;
  const found = times === 'shift' ? shifted(inputs) : inputs.found;
  const currentS = secondsOf(current, rateHz);
  const foundS = secondsOf(found, rateHz);
  const { pairs, onlyFirst, onlySecond } = matchBeats(currentS, foundS);
  const isOpen = (atS: number) =>
    atS >= inputs.within.fromS && atS <= inputs.within.toS && !isWithin(atS, inputs.left);
  const lost = onlyFirst.filter((i) => isOpen(currentS[i]));
  const moved =
    times === 'take'
      ? pairs.filter(([a, b]) => isOpen(currentS[a]) && Math.abs(foundS[b] - currentS[a]) > MOVED_S)
      : [];
  const to = new Map(moved.map(([a, b]) => [a, foundS[b]]));
  const gone = new Set(lost);
  const standing = Array.from(currentS, (atS, i) => to.get(i) ?? atS).filter(
    (_, i) => !gone.has(i),
  );
  const free = (atS: number) => standing.every((one) => Math.abs(one - atS) >= CROWDED_S);
  return {
    gained: onlySecond
      .filter((i) => isOpen(foundS[i]) && free(foundS[i]))
      .map((i) => beatAt(found, i)),
    lost: lost.map((i) => beatAt(current, i)),
    moved: moved.map(([a, b]) => {
      const from = beatAt(current, a);
      return { from, to: { ...from, tick: found.ticks[b], origin: 'detected' } };
    }),
  };
}

const secondsOf = ({ ticks }: BeatList, rateHz: Hertz): Float64Array =>
  ticks.map((tick) => ticksToSeconds(tick, rateHz));

/** What was found in another lead, by as much earlier or later as its R peaks come after those of the heart lead (median). */
function shifted({ current, found, rateHz }: FoundWithinInputs): BeatList {
  const { pairs } = matchBeats(secondsOf(current, rateHz), secondsOf(found, rateHz));
  if (pairs.length < LEAST_PAIRS) return found;
  const late = Float64Array.from(pairs, ([a, b]) => found.ticks[b] - current.ticks[a]);
  const by = Math.round(median(late));
  return { ...found, ticks: found.ticks.map((tick) => tick - by) };
}

/** The change as one step under a name. */
export function foundEdit({ gained, lost, moved }: FoundChange, name: string): Edit {
  const removed = [...lost, ...moved.map(({ from }) => from)];
  const added = [...gained, ...moved.map(({ to }) => to)];
  const changes = removed.length + added.length > 0;
  return { name, changes: changes ? [{ kind: 'beats', removed, added }] : [] };
}

/** A count of beats in words: "1 beat", "3 beats". */
const beatsPhrase = (count: number): string => `${count} ${count === 1 ? 'beat' : 'beats'}`;

/** The change in words: "3 beats gained, 1 beat lost". */
export function changePhrase({ gained, lost, moved }: FoundChange): string {
  const parts = [
    gained.length > 0 ? `${beatsPhrase(gained.length)} gained` : '',
    lost.length > 0 ? `${beatsPhrase(lost.length)} lost` : '',
    moved.length > 0 ? `${beatsPhrase(moved.length)} moved` : '',
  ].filter((part) => part !== '');
  return parts.length > 0 ? parts.join(', ') : 'the same beats as now';
}

/** Name of the step: what was looked for again, where, and what came of it. */
export function foundName(
  within: Interval,
  choices: readonly string[],
  change: FoundChange,
): string {
  const { gained, lost, moved } = change;
  const counts = [
    `+${gained.length}`,
    `-${lost.length}`,
    moved.length > 0 ? `~${moved.length}` : '',
  ]
    .filter((part) => part !== '')
    .join(' ');
  const place = `${formatClock(within.fromS, 1)}-${formatClock(within.toS, 1)}`;
  return ['find beats again', place, ...choices.map((one) => `${one},`), counts].join(' ');
}
