import type { Settings } from '../recording/settings';
import { bandRoute, drawBand } from './band';
import type { Drawing, HeartPart, Route, SeparatedSlow } from './route';
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

function redraw(slow: SeparatedSlow, settings: Settings, drawing: Drawing): SeparatedSlow {
  const part = slow.wide ? drawing.heartPart : null;
  const lead = part ? slow.recorded.map((value, i) => value - part.uv[i]) : slow.recorded;
  const drawn = drawBand(slow.lead, lead, slow.rateHz, settings, drawing);
  return {
    ...drawn,
    route: 'beat-average',
    recorded: slow.recorded,
    wide: slow.wide,
    notes: [...drawn.notes, takenOutWords(slow, part, settings)],
  };
}

/**
 * Route `beat-average`: the local average heartbeat is taken out of the lead, then route `band`; spectra are those of the lead
 * without it. The heartbeat itself is that of `band`, since the beats have to be found first. Until they are, the
 * wave is drawn with the heartbeats in it.
 */
export const beatAverageRoute: Route = {
  start(job) {
    const band = bandRoute.start(job);
    const wide = job.slow && carriesBeats(job.rateHz) ? createWideSampler(job.rateHz) : null;
    return {
      push(block) {
        band.push(block);
        wide?.push(block);
      },
      finish(recorded, facts) {
        const { slow, heart } = band.finish(recorded, facts);
        if (!slow) return { slow, heart };
        const unmade = { ...slow, wide: wide?.finish(facts) ?? null };
        return { slow: { ...unmade, route: 'beat-average' }, heart };
      },
    };
  },
  redraw,
};
