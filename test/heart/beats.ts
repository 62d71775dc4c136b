import { BEAT_CLASSES, type Beat, type BeatList, beatsOf } from '../../src/recording/beat';
import type { BreathingSeries } from '../../src/recording/heart-series';

export const RATE_HZ = 250;

/** Beats at the ends of intervals that follow one another from startS on; classes by letter, N where none is given. */
export function beatsAfter(rrMs: ArrayLike<number>, startS = 0, letters = ''): BeatList {
  const rows: Beat[] = [];
  let timeS = startS;
  for (let i = 0; i <= rrMs.length; i += 1) {
    const letter = BEAT_CLASSES.find((one) => one === letters[i]) ?? 'N';
    rows.push({
      tick: Math.round(timeS * 64 * RATE_HZ),
      beatClass: letter,
      origin: 'detected',
    });
    timeS += rrMs[i] / 1000;
  }
  return beatsOf(rows);
}

/** A breathing series that says one rate throughout. */
export function steadyBreathing(perMinute: number, lengthS: number): BreathingSeries {
  const count = Math.max(0, Math.floor(lengthS / 30) - 1);
  return {
    centresS: Float64Array.from({ length: count }, (_, k) => 30 + 30 * k),
    perMinute: new Float64Array(count).fill(perMinute),
    from: 'lead',
  };
}
