import { createRandom } from '../src/numeric/random';
import type { Epoch, SlowWaveRhythm } from '../src/recording/rhythm';
import type { Interval } from '../src/recording/span';
import { bridged } from '../src/separate/bridge';
import { leadSpectra } from '../src/separate/lead-spectra';
import { keptSamples } from '../src/stomach/kept-samples';
import { type Leftover, leftoverOf } from '../src/trust/leftover';
import { LINE_REACH_S } from '../src/trust/line-band';
import { inTurns, type Job, withRests } from './job';

/** The refill's own generator: the same noise for the same lead, settings and edits. */
const SEED = 20_260_501;

export interface LeftoverOf {
  /** The lead at the slow wave's rate, before any band. */
  readonly slow: { readonly recorded: Float64Array; readonly rateHz: number };
  /** Stretches that carry no slow wave: spoiled for the stomach, or missing. */
  readonly spoiled: readonly Interval[];
  readonly rhythm: Pick<SlowWaveRhythm, 'epochs'>;
}

/** The leftover made last of a lead's epochs: planted check and maps ask for the same one. */
const known = new WeakMap<
  readonly Epoch[],
  { readonly recorded: Float64Array; readonly spoiled: string; readonly leftover: Leftover }
>();

/**
 * The leftover of a lead: what the planted check plants in. What is spoiled or missing is bridged before the lines are read
 * off, and stays as it was recorded. Null where no four minutes of the lead are three quarters there.
 */
export async function leftoverOfLead(
  { slow, spoiled, rhythm }: LeftoverOf,
  job: Job,
): Promise<Leftover | null> {
  const { recorded, rateHz } = slow;
  const before = known.get(rhythm.epochs);
  const stretches = JSON.stringify(spoiled);
  if (before?.recorded === recorded && before.spoiled === stretches) return before.leftover;
  const kept = keptSamples(recorded, rateHz, spoiled);
  const spectra = await withRests(leadSpectra(recorded, kept, rateHz, 'zero'), job);
  if (!spectra) return null;
  await job.breathe();
  const margin = Math.ceil(LINE_REACH_S * rateHz);
  const whole = await withRests(bridged(recorded, kept, rateHz, spectra, margin), job);
  await job.breathe();
  const random = createRandom(SEED);
  const inputs = { recorded, whole, margin, kept, rateHz, epochs: rhythm.epochs, random };
  const leftover = await inTurns(leftoverOf(inputs), job, 'Taking the study’s own waves out');
  known.set(rhythm.epochs, { recorded, spoiled: stretches, leftover });
  return leftover;
}
