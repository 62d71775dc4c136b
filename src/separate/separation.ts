import { atOnce } from '../numeric/in-steps';
import type { HeartOutput } from '../recording/separated';
import type { Settings } from '../recording/settings';
import type { Hertz } from '../units/rate';
import { createGapFiller, maskGaps } from './gaps';
import type { Drawing, RouteRun, SeparatedSlow } from './route';
import { type Routes, routeOf } from './routes';
import { createSlowSampler, slowRateHz } from './slow-rate';

export interface SeparationOptions {
  /** Key of the lead. */
  readonly lead: string;
  readonly rateHz: Hertz;
  readonly sampleCount: number;
  readonly settings: Settings;
  /** Those that the settings name. */
  readonly routes: Routes;
  readonly wants: { readonly slow: boolean; readonly heart: boolean };
}

export interface Separated {
  readonly slow: SeparatedSlow | null;
  readonly heart: HeartOutput | null;
}

/** A lead being parted while it is read. */
export interface Separation {
  /** Takes the next samples of the lead in uV, NaN inside gaps; the block is not kept. */
  push(block: Float64Array): void;
  finish(): Separated;
}

/** The runs that make what is wanted: one for both outputs where they take the same route. */
function startRuns(options: SeparationOptions): RouteRun[] {
  const { settings, wants, routes } = options;
  const { slowRoute, heartRoute } = settings;
  if (wants.slow && wants.heart && slowRoute === heartRoute)
    return [routeOf(routes, slowRoute).start({ ...options, slow: true, heart: true })];
  const runs: RouteRun[] = [];
  if (wants.slow)
    runs.push(routeOf(routes, slowRoute).start({ ...options, slow: true, heart: false }));
  if (wants.heart)
    runs.push(routeOf(routes, heartRoute).start({ ...options, slow: false, heart: true }));
  return runs;
}

/**
 * Parts one lead into slow wave and heartbeat while its samples run by, each by the route the
 * settings name. Rates from above 0 to several kHz; below 4 Hz the slow wave keeps the lead's rate,
 * and where the rate leaves no band for beats the heartbeat is null. Nothing is read beyond the
 * ends: the signal counts as turned about its end values, and the stretches this touches, with
 * those beside gaps, are given as unclean. Throws where the rate is not above 0 or a route was not
 * loaded.
 */
export function createSeparation(options: SeparationOptions): Separation {
  const { rateHz, wants } = options;
  if (!(rateHz > 0)) throw new Error(`a lead's rate must be above 0 Hz, not ${rateHz}`);
  const sampler = wants.slow ? createSlowSampler(rateHz) : null;
  const runs = startRuns(options);
  const filler = createGapFiller((block) => {
    sampler?.push(block);
    for (const run of runs) run.push(block);
  });
  return {
    push: (block) => filler.push(block),
    finish() {
      const facts = filler.finish();
      const recorded = sampler ? sampler.finish() : new Float64Array(0);
      maskGaps(recorded, facts.gaps, rateHz / slowRateHz(rateHz));
      const outputs = runs.map((run) => run.finish(recorded, facts));
      return {
        slow: outputs.find((one) => one.slow)?.slow ?? null,
        heart: outputs.find((one) => one.heart)?.heart ?? null,
      };
    },
  };
}

/**
 * The slow wave drawn again for other settings of the same route, other spoiled stretches or another reference for
 * breathing, from what is in memory. Throws where the route is another: then the lead has to be read again.
 */
export const redrawSlowWave = (
  slow: SeparatedSlow,
  settings: Settings,
  drawing: Drawing,
  routes: Routes,
): SeparatedSlow => atOnce(redrawInSteps(slow, settings, drawing, routes));

/** redrawSlowWave with a rest now and then. */
export function* redrawInSteps(
  slow: SeparatedSlow,
  settings: Settings,
  drawing: Drawing,
  routes: Routes,
): Generator<void, SeparatedSlow> {
  if (slow.route !== settings.slowRoute)
    throw new Error(`a slow wave of route ${slow.route} cannot be drawn by ${settings.slowRoute}`);
  return yield* routeOf(routes, slow.route).redraw(slow, settings, drawing);
}
