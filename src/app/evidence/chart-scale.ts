import { formatClock, type Seconds } from '../../units/time';

/** Drawing units of the charts; the charts are never drawn smaller than these. */
export const CHART_WIDTH = 900;
export const CHART_LEFT = 116;
const CHART_RIGHT = 22;

/** A stretch of the study as a chart's width shows it. */
export interface TimeScale {
  readonly fromS: Seconds;
  readonly toS: Seconds;
  readonly endX: number;
  x(timeS: Seconds): number;
}

export function timeScale(fromS: Seconds, toS: Seconds): TimeScale {
  const endX = CHART_WIDTH - CHART_RIGHT;
  const perSecond = (endX - CHART_LEFT) / Math.max(1, toS - fromS);
  return { fromS, toS, endX, x: (timeS) => CHART_LEFT + (timeS - fromS) * perSecond };
}

const STEPS_S = [60, 300, 600, 900, 1800, 3600, 7200, 14_400];
const MOST_LABELS = 12;

/** Times to write under a chart, on whole steps, with their words. */
export function timeTicks({
  fromS,
  toS,
}: TimeScale): readonly { readonly atS: Seconds; readonly words: string }[] {
  const step = STEPS_S.find((one) => (toS - fromS) / one <= MOST_LABELS) ?? 21_600;
  const first = Math.ceil(fromS / step);
  const count = Math.floor(toS / step) - first + 1;
  return Array.from({ length: Math.max(0, count) }, (_, k) => {
    const atS = (first + k) * step;
    return { atS, words: formatClock(atS).replace(/:00$/, '') };
  });
}

/** The ends of a scale of values and the few round values on it. */
export interface ValueScale {
  readonly low: number;
  readonly high: number;
  readonly ticks: readonly number[];
  readonly decimals: number;
}

const ROUND = [1, 2, 5];

/** The least round step of 1, 2 or 5 that takes at most so many steps. */
function roundStep(
  span: number,
  most: number,
): { readonly step: number; readonly decimals: number } {
  let unit = 1;
  let decimals = 0;
  while (unit > span / most && decimals < 6) {
    unit /= 10;
    decimals += 1;
  }
  for (;;) {
    const found = ROUND.find((one) => (one * unit * most) / span >= 1);
    if (found !== undefined) return { step: found * unit, decimals };
    unit *= 10;
    decimals = Math.max(0, decimals - 1);
  }
}

/** A scale whose ends are round and that holds all values; 0 to 1 where there is none. */
export function valueScale(values: readonly number[], most = 3): ValueScale {
  const known = values.filter(Number.isFinite);
  if (known.length === 0) return { low: 0, high: 1, ticks: [0, 1], decimals: 0 };
  const [least, largest] = [Math.min(...known), Math.max(...known)];
  const span = largest > least ? largest - least : Math.max(1e-3, Math.abs(least) / 10);
  const { step, decimals } = roundStep(span, most);
  const first = Math.floor(least / step + 1e-9);
  const last = Math.max(first + 1, Math.ceil(largest / step - 1e-9));
  const ticks = Array.from({ length: last - first + 1 }, (_, k) => (first + k) * step);
  return { low: first * step, high: last * step, ticks, decimals };
}

export const written = (value: number, decimals: number): string =>
  value
    .toFixed(decimals)
    .replace(/^-(?=0(\.0*)?$)/, '')
    .replace('-', '−');
