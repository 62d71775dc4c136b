import { median } from '../numeric/statistics';
import type { BeatList } from '../recording/beat';
import type { Doubt, Mend } from '../recording/doubt';
import type { Interval } from '../recording/span';
import type { Hertz } from '../units/rate';
import type { Detection } from './detect';
import { placeBeat } from './place-beat';
import { beatTimes, blockedIntervals } from './rr-series';
import type { Samples } from './usable-signal';

/** What the doubts of beats are read from. */
export interface BeatDoubtsInput {
  readonly beats: BeatList;
  /** Rate the beats' ticks count in. */
  readonly rateHz: Hertz;
  /** Heartbeat signal in uV at `heartbeatHz`, from the recording's first sample on; NaN in gaps. */
  readonly heartbeat: Samples;
  readonly heartbeatHz: Hertz;
  readonly ticksPerSample: number;
  /** Spoiled spans for the heart and gaps. */
  readonly blocked: readonly Interval[];
  readonly detection: Detection;
}

const NEIGHBOURS = 3;
const LONG = 1.6;

/** Open doubts of beats in ascending time, one a place, without their effects. */
export function beatDoubts(input: BeatDoubtsInput): readonly Doubt[] {
  const { beats, rateHz, blocked } = input;
  const timesS = beatTimes(beats, rateHz);
  const broken = blockedIntervals(timesS, blocked);
  const rrMs = Float64Array.from(broken, (_, i) => 1000 * (timesS[i + 1] - timesS[i]));
  const found: Doubt[] = [];
  rrMs.forEach((rr, i) => {
    if (broken[i] === 1) return;
    const about = [...rrMs.slice(Math.max(0, i - NEIGHBOURS), i + NEIGHBOURS + 1)];
    const usual = median(about);
    if (rr < LONG * usual) return;
    const tick = beats.ticks[i + 1];
    found.push({
      id: `missed-beat-${tick}`,
      kind: 'missed-beat',
      fromS: timesS[i],
      toS: timesS[i + 1],
      tick,
      lead: null,
      why: `The interval of ${Math.round(rr)} ms is about ${Math.round(rr / usual)} times its neighbours' ${Math.round(usual)} ms.`,
      mend: insertion(input, timesS[i], timesS[i + 1], Math.max(2, Math.round(rr / usual))),
      effect: null,
    });
  });
  return found;
}

/** Beats put at their best places where an interval is cut into so many parts; null where none can be seen there. */
function insertion(
  { beats, heartbeat, heartbeatHz, ticksPerSample, detection }: BeatDoubtsInput,
  fromS: number,
  toS: number,
  parts: number,
): Mend | null {
  const search = { ...detection, heartbeat, rateHz: heartbeatHz, ticksPerSample };
  const places = Array.from({ length: parts - 1 }, (_, k) =>
    placeBeat(search, fromS + ((toS - fromS) * (k + 1)) / parts),
  );
  const taken = new Set(beats.ticks);
  const added = places.flatMap(({ tick, visible }) => {
    if (!visible || taken.has(tick)) return [];
    taken.add(tick);
    return [{ tick, beatClass: 'N', origin: 'added' } as const];
  });
  if (added.length === 0) return null;
  const words = added.length === 1 ? 'insert beat' : `insert ${added.length} beats`;
  return { kind: 'beats', words, removed: [], added };
}
