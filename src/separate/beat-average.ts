import type { Settings } from '../recording/settings';
import { drawBand, drawnWhenAsked, present, undrawn } from './band';
import type { HeartPart, Route, SeparatedSlow } from './route';
import { slowRateHz } from './slow-rate';
import { carriesBeats, createWideSampler } from './wide-lead';

const NOTHING_OUT = {
  rate: 'No heartbeat is taken out: the lead has too few samples a second.',
  beats: 'No heartbeat is taken out: there are no beats.',
};

/** What is taken out before the band, in words. */
function takenOutWords(
  { wide }: SeparatedSlow,
  part: HeartPart | null,
  { beatAverage: { beforeMs, afterMs, beats } }: Settings,
): string {
  if (!wide) return NOTHING_OUT.rate;
  if (!part || part.beats === 0) return NOTHING_OUT.beats;
  return `The average heartbeat is taken out at ${part.beats} beats: from ${beforeMs} ms before to ${afterMs} ms after R at most, mean of ${beats} beats of the same class nearby, in each beat's own size.`;
}

/**
 * Route `beat-average`: the local average heartbeat is taken out of the lead, then route `band`; spectra are those of the lead
 * without it. It makes no heartbeat, since the beats have to be found in one first. Until they are, the wave is drawn with the
 * heartbeats in it. Throws where a heartbeat is asked of it.
 */
export const beatAverageRoute: Route = {
  start({ lead, rateHz, settings, heart }) {
    if (heart) throw new Error('route beat-average makes no heartbeat');
    const wide = carriesBeats(rateHz) ? createWideSampler(rateHz) : null;
    return {
      push(block) {
        wide?.push(block);
      },
      finish(recorded, facts) {
        const slowHz = slowRateHz(rateHz);
        const rest = undrawn(lead, recorded, slowHz, settings);
        const drawing = { kept: present(recorded), breathing: null };
        return {
          slow: drawnWhenAsked(
            { ...rest, route: 'beat-average', wide: wide?.finish(facts) ?? null },
            () => drawBand(recorded, slowHz, settings, drawing),
          ),
          heart: null,
        };
      },
    };
  },
  *redraw(slow, settings, drawing) {
    const { lead, recorded, rateHz, wide } = slow;
    const part = wide ? drawing.heartPart : null;
    const without = part ? recorded.map((value, i) => value - part.uv[i]) : recorded;
    const drawn = yield* drawBand(without, rateHz, settings, drawing);
    return {
      ...undrawn(lead, recorded, rateHz, settings),
      route: 'beat-average',
      forSpectra: without,
      wide,
      slowWave: drawn.slowWave,
      notes: [...drawn.notes, takenOutWords(slow, part, settings)],
    };
  },
};
