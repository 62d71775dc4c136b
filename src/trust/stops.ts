import type { Run } from './runs';

/** A run with the value at which it stops dead. */
export interface Stop extends Run {
  readonly valueUv: number;
}

/** A run in the making that may be a stop; `from` is -1 where there is none. */
export interface Stopping {
  readonly withinUv: number;
  readonly least: number;
  readonly kept: Stop[];
  from: number;
  valueUv: number;
}

/** Follows stops at sample `at`; called for each sample that comes with a jump, and for each while one is open. */
export function followStop(stopping: Stopping, at: number, value: number, jumped: boolean): void {
  const { withinUv, least, kept, from, valueUv } = stopping;
  if (from >= 0 && Math.abs(value - valueUv) <= withinUv) return;
  if (from >= 0 && at - from >= least) kept.push({ from, to: at, valueUv });
  stopping.from = jumped ? at : -1;
  stopping.valueUv = value;
}
