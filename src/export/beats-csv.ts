import { type BeatList, beatAt } from '../recording/beat';
import type { Doubt, SettledDoubt } from '../recording/doubt';
import type { RrSeries } from '../recording/heart-series';
import type { Hertz } from '../units/rate';
import { TICKS_PER_SAMPLE, ticksToSeconds } from '../units/ticks';
import type { Seconds } from '../units/time';
import { type Cell, csvText, flagCell, numberCell, timeCell } from './csv';

/** Doubts by the tick of the beat they stand at. */
export interface DoubtsAtBeats {
  readonly open: readonly Pick<Doubt, 'tick'>[];
  readonly settled: readonly SettledDoubt[];
}

const HEADER = ['time_s', 'sample', 'class', 'origin', 'rr_ms', 'nn', 'doubt'];

export interface BeatsCsvInput {
  readonly beats: BeatList;
  /** The heart lead's own rate. */
  readonly rateHz: Hertz;
  /** The intervals, each at the time of the beat that ends it; null: no intervals are known. */
  readonly rr: RrSeries | null;
  readonly doubts: DoubtsAtBeats;
  /** True where samples are missing between two times. */
  readonly gapBetween: (fromS: Seconds, toS: Seconds) => boolean;
}

/**
 * beats.csv: one row a beat; no interval is given across a gap. The doubt column holds what stands at the beat: `open`, or how it was settled
 * where none is open.
 */
export function beatsCsv(input: BeatsCsvInput): string {
  return csvText(HEADER, beatRows(input, doubtWords(input.doubts)));
}

function doubtWords({ open, settled }: DoubtsAtBeats): ReadonlyMap<number | null, string> {
  const words = new Map<number | null, string>();
  for (const { tick, ending } of settled) words.set(tick, ending);
  for (const { tick } of open) words.set(tick, 'open');
  return words;
}

function* beatRows(
  { beats, rateHz, rr, gapBetween }: BeatsCsvInput,
  doubts: ReadonlyMap<number | null, string>,
): Generator<Cell[]> {
  const halfTickS = 0.5 / (TICKS_PER_SAMPLE * rateHz);
  let next = 0;
  for (let i = 0; i < beats.ticks.length; i += 1) {
    const { tick, beatClass, origin } = beatAt(beats, i);
    const timeS = ticksToSeconds(tick, rateHz);
    while (rr && next < rr.timesS.length && rr.timesS[next] < timeS - halfTickS) next += 1;
    const ends =
      rr !== null &&
      rr.timesS[next] < timeS + halfTickS &&
      !gapBetween(timeS - rr.rrMs[next] / 1000, timeS);
    yield [
      timeCell(timeS),
      numberCell(Math.round(tick / TICKS_PER_SAMPLE), 0),
      beatClass,
      origin,
      ends ? numberCell(rr.rrMs[next], 1) : null,
      ends ? flagCell(rr.nn[next] === 1) : null,
      doubts.get(tick) ?? null,
    ];
  }
}
