import type { Cpm } from '../units/rate';
import type { Seconds } from '../units/time';
import type { Microvolts } from '../units/voltage';
import type { RouteName } from './settings';

export type MapOrgan = 'slow' | 'heart';

/** Derivative orders of a map. */
export const MAP_ORDERS: readonly number[] = Array.from({ length: 21 }, (_, i) => i / 20);

/** Window lengths of a map in ms: 0.1 to 2 s for the slow wave, from no smoothing on for the heartbeat. */
export const MAP_WINDOWS_MS: Readonly<Record<MapOrgan, readonly number[]>> = {
  slow: [
    100, 120, 140, 160, 190, 220, 260, 300, 350, 400, 500, 600, 700, 800, 900, 1000, 1200, 1400,
    1700, 2000,
  ],
  heart: [
    10, 13, 17, 22, 30, 40, 50, 65, 85, 110, 150, 200, 250, 330, 430, 570, 750, 1000, 1400, 2000,
  ],
};

/** How well what a route draws matches what is known. */
export interface MapScore {
  /** Power of what follows the known signal over power of the rest, in the drawn signal, after the best delay, dB. */
  readonly snrDb: number;
  /** Seconds the drawn signal is ahead. */
  readonly aheadS: Seconds;
}

/** A route that has no map: one score. */
export interface MapBar extends MapScore {
  readonly route: Exclude<RouteName, 'fractional'>;
}

/** The scores of one organ on one stretch, as recorded or with noise added. */
export interface MapScores {
  /** By order, then by window. */
  readonly cells: readonly (readonly MapScore[])[];
  /** Route `fractional` with order and window as they are set, whether it is the route in use or not. */
  readonly asSet: MapScore;
  readonly bars: readonly MapBar[];
}

/** What is known of the stretch: a planted wave, or the beats' own average at their own times. */
export type MapTarget =
  | { readonly kind: 'wave'; readonly cpm: Cpm; readonly uv: Microvolts }
  | { readonly kind: 'beats'; readonly beats: number; readonly uv: Microvolts };

export interface OrganMap {
  readonly kind: 'map';
  readonly organ: MapOrgan;
  readonly lead: string;
  readonly fromS: Seconds;
  readonly toS: Seconds;
  readonly target: MapTarget;
  /** Root mean square of the white noise added, as large as the known signal's, and the frequency it reaches to. */
  readonly noiseUv: Microvolts;
  readonly noiseToHz: number;
  readonly orders: readonly number[];
  readonly windowsMs: readonly number[];
  readonly order: number;
  readonly windowMs: number;
  readonly memoryS: Seconds;
  readonly polynomialOrder: number;
  readonly recorded: MapScores;
  readonly noisy: MapScores;
}

/** A map that could not be made, and why. */
export interface NoMap {
  readonly kind: 'no-map';
  readonly reason: string;
}

/** How well route `fractional` would do with other orders and windows on one stretch of a study, beside the other routes. */
export interface SettingsMap {
  readonly edit: number;
  readonly slow: OrganMap | NoMap;
  readonly heart: OrganMap | NoMap;
}

/** The cell of a map with the highest score; the first of those that are alike to a hundredth of a dB. */
export function bestCell(scores: MapScores): { readonly order: number; readonly window: number } {
  let best = { order: 0, window: 0 };
  let most = Number.NEGATIVE_INFINITY;
  scores.cells.forEach((row, order) => {
    row.forEach(({ snrDb }, window) => {
      if (snrDb > most + 0.01) {
        most = snrDb;
        best = { order, window };
      }
    });
  });
  return best;
}
