import type { PlacedBeats } from './beat-extents';

/** Longer without a beat, beats were not found rather than absent: what they would have left there goes on. */
const LONGEST_PAUSE_S = 4;
/** Beats whose mean tells what they leave. */
const BEATS_TOLD_BY = 8;

/** Mean of what beats leave over whole cycles, and how long one is. */
interface Usual {
  readonly uv: number;
  readonly cycle: number;
}

/** Cycles of beats from index `from` on in one direction, before the next long stretch without beats; null where there is none. */
function usualFrom(
  uv: Float64Array,
  { at, before, rateHz }: PlacedBeats,
  k: number,
  step: -1 | 1,
): Usual | null {
  let far = k;
  while (
    Math.abs(far - k) < BEATS_TOLD_BY &&
    Math.abs(at[far + step] - at[far]) <= LONGEST_PAUSE_S * rateHz
  )
    far += step;
  if (far === k) return null;
  const starts = [k, far].map((i) => Math.round(at[i] - before[i]));
  const [from, to] = [Math.min(...starts), Math.max(...starts)];
  let sum = 0;
  for (let i = Math.max(0, from); i < Math.min(uv.length, to); i += 1) sum += uv[i];
  return { uv: sum / (to - from), cycle: (to - from) / Math.abs(far - k) };
}

/** Fills samples [from, to) with the straight line from one level to another. */
function line(uv: Float64Array, [from, to]: readonly [number, number], a: number, b: number): void {
  for (let i = Math.max(0, from); i < Math.min(uv.length, to); i += 1)
    uv[i] = a + ((b - a) * (i - from)) / (to - from);
}

/**
 * Carries the mean of what beats leave in a lead on across stretches without beats, before the first and after the last: there
 * the sum of averages would fall to 0 in a step that the lead does not have. A pause up to 4 s is one of the heart and stays.
 */
export function carryLevel(uv: Float64Array, beats: PlacedBeats): void {
  const { at, before, rateHz } = beats;
  const n = at.length;
  if (n < 2) return;
  const startOf = (k: number) => Math.round(at[k] - before[k]);
  for (let k = 0; k <= n; k += 1) {
    const long = k === 0 || k === n || at[k] - at[k - 1] > LONGEST_PAUSE_S * rateHz;
    if (!long) continue;
    const left = k > 0 ? usualFrom(uv, beats, k - 1, -1) : null;
    const right = k < n ? usualFrom(uv, beats, k, 1) : null;
    const from = k > 0 ? Math.round(startOf(k - 1) + (left?.cycle ?? rateHz)) : 0;
    const to = k < n ? startOf(k) : uv.length;
    const levels = [left ?? right, right ?? left];
    line(uv, [from, to], levels[0]?.uv ?? 0, levels[1]?.uv ?? 0);
  }
}
