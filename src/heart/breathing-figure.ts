import { median } from '../numeric/statistics';
import { type FigureValue, numberFigure, withheld } from '../recording/figure';
import type { BreathingSeries } from '../recording/heart-series';
import type { Phase } from '../recording/phase';

/** Breathing in a part: its windows are those centred in it. */
export interface BreathsInPart {
  /** NaN where no window tells. */
  readonly median: number;
  readonly told: number;
  readonly windows: number;
}

export function breathsIn(breathing: BreathingSeries, part: Phase): BreathsInPart {
  const told: number[] = [];
  let windows = 0;
  breathing.centresS.forEach((centreS, i) => {
    if (centreS < part.fromS || centreS >= part.toS) return;
    windows += 1;
    if (!Number.isNaN(breathing.perMinute[i])) told.push(breathing.perMinute[i]);
  });
  return { median: median(told), told: told.length, windows };
}

/** Median breathing rate of a part, marked where it is derived from the heartbeat or stands on under half of the windows. */
export function breathingFigure(breathing: BreathingSeries, part: Phase): FigureValue {
  if (breathing.from === 'none')
    return withheld('no breathing lead, and no beats to derive it from');
  const { median: rate, told, windows } = breathsIn(breathing, part);
  if (windows === 0) return withheld('the part is too short for a breathing rate');
  if (told === 0) return withheld('no clear breathing rhythm in this part');
  const derived = breathing.from === 'derived' ? ['derived from the heartbeat'] : [];
  const thin = 2 * told < windows ? ['told in under half of the windows'] : [];
  return numberFigure(rate, `${told} of ${windows} windows`, [...derived, ...thin]);
}
