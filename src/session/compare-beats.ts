import { type BeatList, beatAt } from '../recording/beat';
import { matchBeats } from '../recording/match-beats';
import type { Hertz } from '../units/rate';
import { ticksToSeconds } from '../units/ticks';
import { formatClock, type Seconds } from '../units/time';
import type { PlacedDifference } from './placed-difference';

/** The same beat counts as moved where its times lie at least so far apart. */
const MOVED_S = 0.001;

/** Beats and the rate of their ticks. */
export interface TimedBeats {
  readonly beats: BeatList;
  readonly rateHz: Hertz;
}

/** How far two reviews agree on the beats. */
export interface BeatAgreement {
  readonly here: number;
  readonly there: number;
  /** Within 150 ms of each other, one to one. */
  readonly both: number;
  /** Of these, in the same class. */
  readonly sameClass: number;
  /** In both over all there are, and in both and in one class over all there are; null without beats. */
  readonly placePct: number | null;
  readonly classPct: number | null;
}

const timesOf = ({ beats, rateHz }: TimedBeats): Float64Array =>
  beats.ticks.map((tick) => ticksToSeconds(tick, rateHz));

/** What two reviews say of the beats: how far they agree, and every beat they do not agree on, by time. */
export function compareBeats(
  here: TimedBeats,
  there: TimedBeats,
): { readonly agreement: BeatAgreement; readonly differences: readonly PlacedDifference[] } {
  const [hereS, thereS] = [timesOf(here), timesOf(there)];
  const { pairs, onlyFirst, onlySecond } = matchBeats(hereS, thereS);
  const sameClass = pairs.filter(([a, b]) => here.beats.classes[a] === there.beats.classes[b]);
  const all = pairs.length + onlyFirst.length + onlySecond.length;
  const percent = (count: number) => (all === 0 ? null : (100 * count) / all);
  const alone = (side: TimedBeats, atS: Seconds, i: number): string =>
    `${classWords(side, i)} at ${formatClock(atS, 3)}`;
  return {
    agreement: {
      here: hereS.length,
      there: thereS.length,
      both: pairs.length,
      sameClass: sameClass.length,
      placePct: percent(pairs.length),
      classPct: percent(sameClass.length),
    },
    differences: [
      ...onlyFirst.map(
        (i): PlacedDifference => ({
          kind: 'only-here',
          what: 'beat',
          here: alone(here, hereS[i], i),
          there: 'none',
          place: { fromS: hereS[i], toS: hereS[i] },
          tick: here.beats.ticks[i],
        }),
      ),
      ...onlySecond.map(
        (i): PlacedDifference => ({
          kind: 'only-there',
          what: 'beat',
          here: 'none',
          there: alone(there, thereS[i], i),
          place: { fromS: thereS[i], toS: thereS[i] },
          tick: null,
        }),
      ),
      ...pairs.flatMap(([a, b]) => pairDifference([here, hereS[a], a], [there, thereS[b], b])),
    ],
  };
}

const classWords = ({ beats }: TimedBeats, i: number): string =>
  `class ${beatAt(beats, i).beatClass}`;

type Side = readonly [side: TimedBeats, atS: Seconds, index: number];

/** One beat that both have, where its class or its time is another. */
function pairDifference(
  [here, hereS, a]: Side,
  [there, thereS, b]: Side,
): readonly PlacedDifference[] {
  const moved = Math.abs(thereS - hereS) >= MOVED_S;
  const classed = here.beats.classes[a] !== there.beats.classes[b];
  if (!moved && !classed) return [];
  const words = (side: TimedBeats, atS: Seconds, i: number) =>
    [classed ? classWords(side, i) : '', moved ? `at ${formatClock(atS, 3)}` : '']
      .filter(Boolean)
      .join(' ');
  return [
    {
      kind: classed ? 'class' : 'moved',
      what: `beat at ${formatClock(hereS, 3)}`,
      here: words(here, hereS, a),
      there: words(there, thereS, b),
      place: { fromS: Math.min(hereS, thereS), toS: Math.max(hereS, thereS) },
      tick: here.beats.ticks[a],
    },
  ];
}
