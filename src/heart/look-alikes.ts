import type { Doubt } from '../recording/doubt';
import type { Hertz } from '../units/rate';
import { align, timerOf } from './align';
import type { AverageBeat } from './detect';
import { readFilled, type Samples, usableRanges } from './usable-signal';

/** What a row shows before and after its beat. */
export const LOOK_BEFORE_S = 0.4;
const LOOK_AFTER_S = 0.6;
/** Beats less like one another than this (normalised correlation) do not look alike. */
const LEAST_ALIKE = 0.85;
/** Compared over the QRS complex, its run-in and the beginning of ST: over less, any steep noise is like a beat. */
const COMPARED_HALF_S = 0.2;
/** Nor do beats of other size, as a share of the one asked for. */
const SIZES = [0.5, 2] as const;
const MOST_ALIKE = 24;
/** How far two beats are shifted against each other to lie best. */
const SHIFT_S = 0.06;
const MARGIN = 8;

/** A doubted beat with its row of heartbeat. */
export interface Alike {
  readonly doubt: Doubt;
  readonly likeness: number;
  readonly heartbeatUv: Float32Array;
}

export interface LooksInput {
  readonly heartbeat: Samples;
  readonly rateHz: Hertz;
  readonly ticksPerSample: number;
}

/** Where the beat of a doubt lies: of a missing beat where it would be put; null where none stands or would stand. */
function beatOfDoubt({ kind, tick, mend }: Doubt): number | null {
  if (kind !== 'missed-beat') return tick;
  return mend?.kind === 'beats' ? (mend.added[0]?.tick ?? null) : null;
}

/** The row about a tick: uV, from LOOK_BEFORE_S before it on; NaN where nothing is. */
export function rowOf(
  { heartbeat, rateHz, ticksPerSample }: LooksInput,
  tick: number,
): Float32Array {
  const from = Math.round(tick / ticksPerSample) - Math.round(LOOK_BEFORE_S * rateHz);
  const length = Math.round((LOOK_BEFORE_S + LOOK_AFTER_S) * rateHz);
  return Float32Array.from({ length }, (_, i) => heartbeat[from + i] ?? Number.NaN);
}

/** An average over the same second as the rows, its time where their beat is; NaN beyond its ends. */
export function averageRow({ samples, centre }: AverageBeat, rateHz: Hertz): Float32Array {
  const from = Math.round(centre) - Math.round(LOOK_BEFORE_S * rateHz);
  const length = Math.round((LOOK_BEFORE_S + LOOK_AFTER_S) * rateHz);
  return Float32Array.from({ length }, (_, i) => samples[from + i] ?? Number.NaN);
}

/**
 * The doubts whose beats are most like that of one of them: normalised correlation about the QRS complexes at their best
 * alignment of at least LEAST_ALIKE, of like size, the most like one first, MOST_ALIKE at most, without the one asked for. Null where no beat
 * belongs to it.
 */
export function alikeTo(
  input: LooksInput,
  asked: Doubt,
  doubts: readonly Doubt[],
): { readonly asked: Alike; readonly others: readonly Alike[] } | null {
  const { rateHz, ticksPerSample } = input;
  const tick = beatOfDoubt(asked);
  if (tick === null) return null;
  const half = Math.round(COMPARED_HALF_S * rateHz);
  const search = Math.round(SHIFT_S * rateHz);
  const reach = half + search + MARGIN;
  const timer = timerOf(filledAbout(input, tick, half));
  const others = doubts.flatMap((doubt): Alike[] => {
    const place = doubt.id === asked.id ? null : beatOfDoubt(doubt);
    if (place === null) return [];
    const { likeness, size } = align(filledAbout(input, place, reach), timer, reach, search);
    if (!(likeness >= LEAST_ALIKE && size >= SIZES[0] && size <= SIZES[1])) return [];
    return [{ doubt, likeness, heartbeatUv: rowOf(input, place) }];
  });
  others.sort((a, b) => b.likeness - a.likeness || a.doubt.fromS - b.doubt.fromS);
  return {
    asked: { doubt: asked, likeness: 1, heartbeatUv: rowOf(input, tick) },
    others: others.slice(0, MOST_ALIKE),
  };

  function filledAbout(from: LooksInput, at: number, width: number): Float64Array {
    const centre = Math.round(at / ticksPerSample);
    const part = from.heartbeat.subarray(Math.max(0, centre - width), centre + width + 1);
    const shift = Math.min(0, centre - width);
    return readFilled(part, usableRanges(part, rateHz, []), shift, shift + 2 * width + 1);
  }
}
