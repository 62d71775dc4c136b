import { type Beat, type BeatList, beatAt } from '../recording/beat';
import type { Interval } from '../recording/span';
import type { Hertz } from '../units/rate';
import { ticksToSeconds } from '../units/ticks';
import { formatClock } from '../units/time';
import type { Difference } from './difference';

/** More beats than these are told together. */
const MOST_BY_NAME = 3;

/** A tick in words: a time of the recording, or its bare number where the heart lead's rate is not known. */
export const tickWords = (tick: number, rateHz: Hertz | null): string =>
  rateHz === null ? `tick ${tick}` : formatClock(ticksToSeconds(tick, rateHz), 3);

/** The first and the last of some ticks, of which there is at least one. */
const endsOf = (ticks: readonly number[]): readonly [first: number, last: number] => [
  ticks.reduce((least, tick) => Math.min(least, tick)),
  ticks.reduce((most, tick) => Math.max(most, tick)),
];

function placeOf(ticks: readonly number[], rateHz: Hertz | null): Interval | null {
  if (rateHz === null) return null;
  const [first, last] = endsOf(ticks);
  return { fromS: ticksToSeconds(first, rateHz), toS: ticksToSeconds(last, rateHz) };
}

/** Beats before and after one act, paired where one took the place of the other. */
interface Pairs {
  readonly removed: readonly Beat[];
  readonly added: readonly Beat[];
  readonly changed: readonly (readonly [before: Beat, after: Beat])[];
}

/** Beats at the same tick belong together; so do the only one taken out and the only one put in: it was moved. */
function pairsOf(removed: readonly Beat[], added: readonly Beat[]): Pairs {
  const [gone, put] = [removed[0], added[0]];
  if (removed.length === 1 && added.length === 1)
    return { removed: [], added: [], changed: [[gone, put]] };
  const byTick = new Map(added.map((beat) => [beat.tick, beat]));
  const changed = removed.flatMap((before) => {
    const after = byTick.get(before.tick);
    return after ? [[before, after] as const] : [];
  });
  const kept = new Set(changed.map(([{ tick }]) => tick));
  return {
    removed: removed.filter(({ tick }) => !kept.has(tick)),
    added: added.filter(({ tick }) => !kept.has(tick)),
    changed,
  };
}

/** What became of single beats, a line each where they are few. */
export function beatDifferences(
  removed: readonly Beat[],
  added: readonly Beat[],
  rateHz: Hertz | null,
): readonly Difference[] {
  const pairs = pairsOf(removed, added);
  return [
    ...together(pairs.removed, rateHz, (beat) => ({ from: originOf(beat), to: null })),
    ...together(pairs.added, rateHz, (beat) => ({ from: null, to: originOf(beat) })),
    ...changedBeats(pairs.changed, rateHz),
  ];
}

/** Where a beat comes from, where that says more than that it is there. */
const originOf = ({ origin }: Beat): string =>
  origin === 'added' || origin === 'detected' ? '' : origin;

type Sides = Pick<Difference, 'from' | 'to'>;

function together(
  beats: readonly Beat[],
  rateHz: Hertz | null,
  sides: (beat: Beat) => Sides,
): readonly Difference[] {
  if (beats.length > MOST_BY_NAME)
    return [{ ...manyOf(beats, rateHz), ...noWords(sides(beats[0])) }];
  return beats.map((beat) => ({
    what: `beat ${beat.beatClass} at ${tickWords(beat.tick, rateHz)}`,
    ...sides(beat),
    place: placeOf([beat.tick], rateHz),
  }));
}

const noWords = ({ from, to }: Sides): Sides => ({
  from: from === null ? null : '',
  to: to === null ? null : '',
});

function manyOf(beats: readonly Beat[], rateHz: Hertz | null): Pick<Difference, 'what' | 'place'> {
  const ticks = beats.map(({ tick }) => tick);
  const ends = endsOf(ticks).map((tick) => tickWords(tick, rateHz));
  return { what: `${beats.length} beats ${ends.join('–')}`, place: placeOf(ticks, rateHz) };
}

function changedBeats(pairs: Pairs['changed'], rateHz: Hertz | null): readonly Difference[] {
  if (pairs.length <= MOST_BY_NAME) return pairs.map((pair) => changedBeat(pair, rateHz));
  const names = (side: 0 | 1) => [...new Set(pairs.map((pair) => stateOf(pair[side])))].sort();
  return [
    {
      ...manyOf(
        pairs.map(([, after]) => after),
        rateHz,
      ),
      from: names(0).join(', '),
      to: names(1).join(', '),
    },
  ];
}

const stateOf = ({ beatClass, origin }: Beat): string =>
  origin === 'placed' ? `class ${beatClass}, placed` : `class ${beatClass}`;

/** A beat of another class, at another place, or both. */
function changedBeat([before, after]: Pairs['changed'][number], rateHz: Hertz | null): Difference {
  const place = placeOf([before.tick, after.tick], rateHz);
  const at = (beat: Beat) => tickWords(beat.tick, rateHz);
  if (before.tick === after.tick) {
    const same = before.beatClass === after.beatClass;
    const words = same ? ({ origin }: Beat) => origin : stateOf;
    return { what: `beat at ${at(before)}`, from: words(before), to: words(after), place };
  }
  const [from, to] =
    stateOf(before) === stateOf(after)
      ? [at(before), at(after)]
      : [before, after].map((beat) => `${at(beat)}, ${stateOf(beat)}`);
  return { what: `beat ${before.beatClass}`, from, to, place };
}

/** All beats replaced at once: how many there were and are, and how many of them differ. */
export function allBeatsDifference(before: BeatList, after: BeatList): Difference {
  let [gone, fresh, other] = [0, 0, 0];
  let [a, b] = [0, 0];
  while (a < before.ticks.length || b < after.ticks.length) {
    const [from, to] = [before.ticks[a] ?? Infinity, after.ticks[b] ?? Infinity];
    if (from === to && beatAt(before, a).beatClass !== beatAt(after, b).beatClass) other += 1;
    if (from < to) gone += 1;
    if (to < from) fresh += 1;
    if (from <= to) a += 1;
    if (to <= from) b += 1;
  }
  const parts = [
    gone > 0 ? `${gone} gone` : '',
    fresh > 0 ? `${fresh} new` : '',
    other > 0 ? `${other} of another class` : '',
  ].filter(Boolean);
  return {
    what: 'all beats',
    from: String(before.ticks.length),
    to: [String(after.ticks.length), ...parts].join(', '),
    place: null,
  };
}
