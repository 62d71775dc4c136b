import type { Settings } from '../src/recording/settings';
import type { Drawing, SeparatedSlow } from '../src/separate/route';
import { loadRoutes, type Routes } from '../src/separate/routes';
import { createSeparation, redrawSlowWave } from '../src/separate/separation';
import type { Job } from './job';

const PIECE_SAMPLES = 16_384;

/** A lead of the study, and how its own route takes it. */
export interface RoutedLead {
  readonly slow: SeparatedSlow;
  readonly settings: Settings;
  /** The lead's own rate and number of samples. */
  readonly rateHz: number;
  readonly sampleCount: number;
  readonly routes: Routes;
}

/** The route of a lead's drawn slow wave at hand. */
export async function routedLead(
  slow: SeparatedSlow,
  settings: Settings,
  channel: { readonly rateHz: number; readonly sampleCount: number },
): Promise<RoutedLead> {
  const { rateHz, sampleCount } = channel;
  return { slow, settings, rateHz, sampleCount, routes: await loadRoutes([settings.slowRoute]) };
}

/** Samples [from, to) at a lead's own rate of what is given at the slow one, by cubics through four (Catmull & Rom 1974). */
function upsampled(x: Float64Array, ratio: number, from: number, to: number): Float64Array {
  const last = x.length - 1;
  const at = (i: number) => x[Math.max(0, Math.min(last, i))];
  return Float64Array.from({ length: to - from }, (_, n) => {
    const place = (from + n) / ratio;
    const i = Math.floor(place);
    const part = place - i;
    const [a, b, c, d] = [at(i - 1), at(i), at(i + 1), at(i + 2)];
    return (
      b + 0.5 * part * (c - a + part * (2 * a - 5 * b + 4 * c - d + part * (3 * (b - c) + d - a)))
    );
  });
}

/** What the study's route makes of something added to the recording: it runs at the recording's rate, as the lead did. */
async function filteredChange(lead: RoutedLead, change: Float64Array, job: Job) {
  const { slow, settings, rateHz, sampleCount, routes } = lead;
  const separation = createSeparation({
    lead: slow.lead,
    rateHz,
    sampleCount,
    settings,
    routes,
    wants: { slow: true, heart: false },
  });
  const masked = change.map((value, i) => (Number.isNaN(slow.recorded[i]) ? Number.NaN : value));
  const ratio = rateHz / slow.rateHz;
  for (let from = 0; from < sampleCount; from += PIECE_SAMPLES) {
    separation.push(upsampled(masked, ratio, from, Math.min(sampleCount, from + PIECE_SAMPLES)));
    await job.breathe();
  }
  return separation.finish().slow?.forSpectra ?? null;
}

/**
 * The lead as it would have come out of its route, had `change` (at the slow rate, uV) been in the recording. Where spectra are
 * those of the recorded lead, the change is added to that, and the wave is drawn from it; where the route filtered the samples
 * while they were read, the change goes through the same filter at the recording's rate, which is linear, and is added behind it.
 */
export async function withChange(
  lead: RoutedLead,
  change: Float64Array,
  job: Job,
): Promise<SeparatedSlow> {
  const { slow } = lead;
  const recorded = slow.recorded.map((value, i) => value + change[i]);
  if (slow.powerResponse === null) return { ...slow, recorded, forSpectra: recorded };
  const filtered = await filteredChange(lead, change, job);
  if (!filtered) throw new Error('the route gives no slow wave');
  const forSpectra = slow.forSpectra.map((value, i) => value + filtered[i]);
  return { ...slow, recorded, forSpectra };
}

/** Such a lead drawn by its route. */
export const drawnAgain = (
  { settings, routes }: RoutedLead,
  changed: SeparatedSlow,
  drawing: Drawing,
): SeparatedSlow => redrawSlowWave(changed, settings, drawing, routes);
