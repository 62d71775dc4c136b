import { BEAT_CLASSES, BEAT_ORIGINS, type BeatList } from '../recording/beat';

/** A value and how many beats in a row have it. */
export type Run = readonly [value: string, count: number];

/** Beats as a session file holds them: the first tick and then differences of ticks, classes and origins by runs. */
export interface CompactBeats {
  readonly ticks: readonly number[];
  readonly classes: readonly Run[];
  readonly origins: readonly Run[];
}

/** Beats in the form of a session file; nothing is lost. */
export function compactBeats(beats: BeatList): CompactBeats {
  const { ticks, classes, origins } = beats;
  return {
    ticks: Array.from(ticks, (tick, i) => (i === 0 ? tick : tick - ticks[i - 1])),
    classes: runsOf(classes, BEAT_CLASSES),
    origins: runsOf(origins, BEAT_ORIGINS),
  };
}

/**
 * Beats from the form of a session file. Throws RangeError where ticks are not whole and ascending, a class or origin is
 * unknown, or the counts do not agree.
 */
export function expandBeats(compact: CompactBeats): BeatList {
  const ticks = new Float64Array(compact.ticks.length);
  compact.ticks.forEach((step, i) => {
    const tick = i === 0 ? step : ticks[i - 1] + step;
    if (!Number.isSafeInteger(tick) || (i > 0 && step <= 0))
      throw new RangeError(`beat ${i + 1} does not follow the one before it`);
    ticks[i] = tick;
  });
  return {
    ticks,
    classes: expandRuns(compact.classes, BEAT_CLASSES, ticks.length),
    origins: expandRuns(compact.origins, BEAT_ORIGINS, ticks.length),
  };
}

function runsOf(codes: Uint8Array, names: readonly string[]): readonly Run[] {
  const runs: [string, number][] = [];
  for (const code of codes) {
    const last = runs.at(-1);
    if (last && last[0] === names[code]) last[1] += 1;
    else runs.push([names[code], 1]);
  }
  return runs;
}

function expandRuns(runs: readonly Run[], names: readonly string[], length: number): Uint8Array {
  const codes = new Uint8Array(length);
  let to = 0;
  for (const [value, count] of runs) {
    const code = names.indexOf(value);
    if (code < 0) throw new RangeError(`"${value}" is none of ${names.join(', ')}`);
    if (!Number.isInteger(count) || count < 1 || to + count > length)
      throw new RangeError(`runs of ${names.join(', ')} do not add up to ${length} beats`);
    codes.fill(code, to, to + count);
    to += count;
  }
  if (to !== length)
    throw new RangeError(`runs of ${names.join(', ')} do not add up to ${length} beats`);
  return codes;
}
