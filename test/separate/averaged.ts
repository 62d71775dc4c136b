import { type Beat, beatsOf } from '../../src/recording/beat';
import {
  type BeatAverageSettings,
  DEFAULT_SETTINGS,
  type Settings,
} from '../../src/recording/settings';
import { heartPart } from '../../src/separate/heart-part';
import type { HeartPart, SeparatedSlow } from '../../src/separate/route';
import { createSeparation, redrawSlowWave } from '../../src/separate/separation';
import { ALL_ROUTES } from './all-routes';

export const RATE_HZ = 250;
export const SETTINGS: Settings = { ...DEFAULT_SETTINGS, slowRoute: 'beat-average' };

/** Runs a generator to its end. */
export function driven<T>(work: Generator<unknown, T>): T {
  for (;;) {
    const next = work.next();
    if (next.done) return next.value;
  }
}

/** A lead under route `beat-average`, before its beats are known. */
export function opened(lead: Float64Array, rateHz = RATE_HZ): SeparatedSlow {
  const separation = createSeparation({
    lead: '#1',
    rateHz,
    sampleCount: lead.length,
    settings: SETTINGS,
    routes: ALL_ROUTES,
    wants: { slow: true, heart: false },
  });
  for (let at = 0; at < lead.length; at += 65536) separation.push(lead.subarray(at, at + 65536));
  const { slow } = separation.finish();
  if (!slow) throw new Error('a slow wave was asked for');
  return slow;
}

export const beatsAt = (
  timesS: readonly number[],
  kindOf: (i: number) => Partial<Beat> = () => ({}),
) =>
  beatsOf(
    timesS.map((timeS, i) => ({
      tick: Math.round(timeS * RATE_HZ * 64),
      beatClass: 'N',
      origin: 'detected',
      ...kindOf(i),
    })),
  );

/** What the heartbeats leave in an opened lead, by the program; `kept` is all of it unless given. */
export function partOf(
  slow: SeparatedSlow,
  beats: ReturnType<typeof beatsAt>,
  settings: BeatAverageSettings = DEFAULT_SETTINGS.beatAverage,
  kept = new Uint8Array(slow.recorded.length).fill(1),
): HeartPart {
  if (!slow.wide) throw new Error('the lead shows no heartbeats');
  return driven(heartPart({ wide: slow.wide, beats, beatRateHz: RATE_HZ, kept, settings }));
}

/** The slow wave drawn with some of the heartbeats taken out. */
export function drawnWithout(slow: SeparatedSlow, part: HeartPart | null): SeparatedSlow {
  const kept = Uint8Array.from(slow.recorded, (value) => (Number.isNaN(value) ? 0 : 1));
  const drawing = { dfCpm: 3, kept, breathing: null, heartPart: part };
  return redrawSlowWave(slow, SETTINGS, drawing, ALL_ROUTES);
}
