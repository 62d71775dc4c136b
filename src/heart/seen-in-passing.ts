import { BEAT_CLASSES, type BeatList } from '../recording/beat';
import type { SeenInPassing } from '../recording/figure';
import type { HeartSegment, RrSeries } from '../recording/heart-series';
import { type Interval, joinIntervals } from '../recording/span';
import type { Hertz } from '../units/rate';
import type { Seconds } from '../units/time';
import { beatTimes, blockedIntervals } from './rr-series';

const PAUSE_S = 3;
const SLOW_BPM = 40;
const FAST_BPM = 130;
const FOR_S = 60;
const RUN_OF_V = 3;
const ADVICE = 'seen in the recording; have it looked at under local protocol';

export interface SeenInput {
  readonly rr: RrSeries;
  readonly beats: BeatList;
  /** Rate that the beats' ticks count in. */
  readonly rateHz: Hertz;
  /** Spoiled spans for the heart and gaps: nothing is seen across them. */
  readonly blocked: readonly Interval[];
  /** Segments of all phases; the same stretch may come twice. */
  readonly segments: readonly HeartSegment[];
}

interface Beats {
  readonly timesS: Float64Array;
  /** Interval i runs from beat i to beat i + 1 with nothing blocked and no unusable beat at either end: 1. */
  readonly clear: Uint8Array;
  readonly isV: (beat: number) => boolean;
}

const seen = (fromS: Seconds, toS: Seconds, what: string): SeenInPassing => ({
  fromS,
  toS,
  text: `${what}: ${ADVICE}`,
});

function usable({ beats, rateHz, blocked }: SeenInput): Beats {
  const timesS = beatTimes(beats, rateHz);
  const unusable = BEAT_CLASSES.indexOf('Q');
  const ventricular = BEAT_CLASSES.indexOf('V');
  const clear = blockedIntervals(timesS, blocked).map((isBlocked, i) =>
    isBlocked === 0 && beats.classes[i] !== unusable && beats.classes[i + 1] !== unusable ? 1 : 0,
  );
  return { timesS, clear, isV: (beat) => beats.classes[beat] === ventricular };
}

function pauses({ timesS, clear }: Beats): SeenInPassing[] {
  const found: SeenInPassing[] = [];
  for (let i = 0; i < clear.length; i += 1) {
    const lengthS = timesS[i + 1] - timesS[i];
    if (clear[i] === 1 && lengthS > PAUSE_S)
      found.push(seen(timesS[i], timesS[i + 1], `no beat for ${lengthS.toFixed(1)} s`));
  }
  return found;
}

/** Stretches in which every minute of unbroken intervals has a mean rate beyond a limit, joined where they meet. */
function minutesWhere(
  { timesS, clear }: Beats,
  isBeyond: (bpm: number) => boolean,
): readonly Interval[] {
  const found: Interval[] = [];
  let from = 0;
  for (let i = 0; i < clear.length; i += 1) {
    if (clear[i] === 0) {
      from = i + 1;
      continue;
    }
    while (from < i && timesS[i + 1] - timesS[from + 1] >= FOR_S) from += 1;
    const lengthS = timesS[i + 1] - timesS[from];
    if (lengthS >= FOR_S && isBeyond((60 * (i + 1 - from)) / lengthS))
      found.push({ fromS: timesS[from], toS: timesS[i + 1] });
  }
  return joinIntervals(found);
}

function runsOfV({ timesS, clear, isV }: Beats): SeenInPassing[] {
  const found: SeenInPassing[] = [];
  let from = 0;
  for (let beat = 0; beat <= timesS.length; beat += 1) {
    const goesOn = beat > from && beat < timesS.length && isV(beat) && clear[beat - 1] === 1;
    if (goesOn && isV(from)) continue;
    const count = beat - from;
    if (beat > from && isV(from) && count >= RUN_OF_V)
      found.push(seen(timesS[from], timesS[beat - 1], `${count} beats of class V in a row`));
    from = beat;
  }
  return found;
}

function irregular(segments: readonly HeartSegment[]): SeenInPassing[] {
  return joinIntervals(segments.filter((segment) => segment.state === 'irregular')).map(
    ({ fromS, toS }) =>
      seen(fromS, toS, `irregular rhythm in ${Math.round((toS - fromS) / 60)} min`),
  );
}

/**
 * What a person should have looked at, in the order of time: no beat for over 3 s, a mean rate under 40 or over 130 for a
 * minute, three or more V beats in a row, irregular segments. Blocked stretches and unusable beats cause none. Never a
 * diagnosis, never a monitor.
 */
export function seenInPassing(input: SeenInput): readonly SeenInPassing[] {
  const beats = usable(input);
  const slow = minutesWhere(beats, (bpm) => bpm < SLOW_BPM).map(({ fromS, toS }) =>
    seen(fromS, toS, `heart rate under ${SLOW_BPM} a minute for a minute or longer`),
  );
  const fast = minutesWhere(beats, (bpm) => bpm > FAST_BPM).map(({ fromS, toS }) =>
    seen(fromS, toS, `heart rate over ${FAST_BPM} a minute for a minute or longer`),
  );
  return [...pauses(beats), ...slow, ...fast, ...runsOfV(beats), ...irregular(input.segments)].sort(
    (a, b) => a.fromS - b.fromS || a.toS - b.toS,
  );
}
