import { formatClock } from '../units/time';
import type { TimeWindow } from './view-store';

/** One mark of a time axis. */
export interface TimeTick {
  readonly atS: number;
  readonly text: string;
}

const STEPS_S: readonly number[] = [
  0.01, 0.02, 0.05, 0.1, 0.2, 0.5, 1, 2, 5, 10, 15, 30, 60, 120, 300, 600, 900, 1800, 3600, 7200,
  10800, 21600, 43200, 86400,
];

/** The finest step in seconds (1-2-5 and clock steps) that leaves `leastPx` pixels between marks. */
export function tickStepS(windowS: number, widthPx: number, leastPx: number): number {
  const wanted = (windowS / Math.max(1, widthPx)) * leastPx;
  return STEPS_S.find((step) => step >= wanted) ?? STEPS_S[STEPS_S.length - 1];
}

/** A time on the clock of the recording, written as finely as the step asks: h:mm, h:mm:ss, or with decimals. */
export function clockText(atS: number, stepS: number, coarsest: 'h:mm' | 'h:mm:ss'): string {
  if (stepS < 0.1) return formatClock(atS, 2);
  if (stepS < 1) return formatClock(atS, 1);
  const text = formatClock(atS);
  return coarsest === 'h:mm' && stepS % 60 === 0 ? text.slice(0, -3) : text;
}

/** Marks of a time axis over a window drawn `widthPx` wide, in ascending order, each a whole multiple of one step. */
export function timeTicks(
  window: TimeWindow,
  widthPx: number,
  leastPx: number,
  coarsest: 'h:mm' | 'h:mm:ss',
): readonly TimeTick[] {
  const windowS = window.toS - window.fromS;
  if (!(windowS > 0) || !(widthPx > 0)) return [];
  const step = tickStepS(windowS, widthPx, leastPx);
  const ticks: TimeTick[] = [];
  const slack = step * 1e-6;
  const last = Math.floor((window.toS + slack) / step);
  for (let n = Math.ceil((window.fromS - slack) / step); n <= last; n += 1) {
    const atS = n * step;
    ticks.push({ atS, text: clockText(atS, step, coarsest) });
  }
  return ticks;
}

/** A width of time in words: "20 min", "10 s", "1.5 h". */
export function widthText(seconds: number): string {
  const round = (value: number) => String(Math.round(value * 10) / 10);
  if (seconds < 120) return `${round(seconds)} s`;
  if (seconds < 2 * 3600) return `${round(seconds / 60)} min`;
  return `${round(seconds / 3600)} h`;
}
