import type { BeatList } from '../src/recording/beat';
import type { Settings } from '../src/recording/settings';
import { heartPart } from '../src/separate/heart-part';
import type { Drawing, SeparatedSlow } from '../src/separate/route';
import { loadRoutes, type Routes } from '../src/separate/routes';
import { createSeparation, redrawInSteps } from '../src/separate/separation';
import type { WideLead } from '../src/separate/wide-lead';
import { type Job, withRests } from './job';

const PIECE_SAMPLES = 16_384;

/** A lead of the study, and how its own route takes it. */
export interface RoutedLead {
  readonly slow: SeparatedSlow;
  readonly settings: Settings;
  /** The lead's own rate and number of samples. */
  readonly rateHz: number;
  readonly sampleCount: number;
  readonly routes: Routes;
  /** The study's beats and the rate of their ticks, for routes that take heartbeats out; null without a heart lead. */
  readonly beats: { readonly list: BeatList; readonly rateHz: number } | null;
}

/** The route of a lead's drawn slow wave at hand. */
export async function routedLead(
  slow: SeparatedSlow,
  settings: Settings,
  channel: { readonly rateHz: number; readonly sampleCount: number },
  beats: RoutedLead['beats'],
): Promise<RoutedLead> {
  const { rateHz, sampleCount } = channel;
  const routes = await loadRoutes([settings.slowRoute]);
  return { slow, settings, rateHz, sampleCount, routes, beats };
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

/** A lead at a rate that shows its heartbeats, with a change at the slow rate added. */
function wideWith(wide: WideLead, change: Float64Array, slowRateHz: number): WideLead {
  const added = upsampled(change, wide.rateHz / slowRateHz, 0, wide.samples.length);
  return { ...wide, samples: wide.samples.map((value, i) => value + added[i]) };
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
  const wide = slow.wide && wideWith(slow.wide, change, slow.rateHz);
  if (slow.powerResponse === null) return { ...slow, recorded, forSpectra: recorded, wide };
  const filtered = await filteredChange(lead, change, job);
  if (!filtered) throw new Error('the route gives no slow wave');
  const forSpectra = slow.forSpectra.map((value, i) => value + filtered[i]);
  return { ...slow, recorded, forSpectra, wide };
}

/** What a wave is drawn with, beside what hangs on the lead itself. */
export type DrawnWith = Omit<Drawing, 'heartPart'>;

/** Such a lead drawn by its route; where that takes heartbeats out, they are averaged in this lead anew. */
export async function drawnAgain(
  { settings, routes, beats }: RoutedLead,
  changed: SeparatedSlow,
  drawing: DrawnWith,
  job: Job,
): Promise<SeparatedSlow> {
  const part =
    changed.wide && beats
      ? await withRests(
          heartPart({
            wide: changed.wide,
            beats: beats.list,
            beatRateHz: beats.rateHz,
            kept: drawing.kept,
            settings: settings.beatAverage,
          }),
          job,
        )
      : null;
  return withRests(redrawInSteps(changed, settings, { ...drawing, heartPart: part }, routes), job);
}
