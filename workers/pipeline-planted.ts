import type { NotPlanted, PlantedEvidence, PlantedSlow } from '../src/recording/evidence/planted';
import { leadKey } from '../src/recording/lead';
import { lostOn } from '../src/recording/lost';
import { phasesOrWhole } from '../src/recording/phase';
import { keptSamples } from '../src/stomach/kept-samples';
import { checkPlan } from '../src/trust/stretches';
import { breathesWithin } from './breathing-reference';
import type { Job } from './job';
import type { EvidenceInputs } from './pipeline-evidence';
import { leftoverOfLead } from './pipeline-leftover';
import { plantedHeart } from './pipeline-planted-heart';
import type { SlowCheck } from './pipeline-planted-judge';
import { routedLead } from './pipeline-planted-route';
import { plantedSlow } from './pipeline-planted-slow';
import { leadChannel } from './pipeline-signals';
import type { Study } from './pipeline-study';
import { identity } from './remember';

/** The breathing that is taken out of the drawn wave of the study, where it is. */
function breathingOf(from: EvidenceInputs, length: number, rateHz: number): Float64Array | null {
  const { settings } = from.inputs;
  const { breathing, heights } = from.computed;
  if (settings.breathingOut === 'never' || !breathesWithin(breathing, settings.slowBandCpm[1]))
    return null;
  return from.study.reference.of({ breath: from.breathing, heights, rateHz, length });
}

/** The reported lead made ready for the check; null where too little of it is there. */
export async function slowCheckOf(from: EvidenceInputs, job: Job): Promise<SlowCheck | null> {
  const { inputs, recording, computed } = from;
  const { roles, settings } = inputs;
  const lead = roles.slow[roles.reported];
  const slow = from.slow[roles.reported];
  const { rhythm } = computed.stomach[roles.reported];
  const spoiled = lostOn(lead, 'stomach', inputs.spans, recording.gaps);
  const leftover = await leftoverOfLead({ slow, spoiled, rhythm }, job);
  if (!leftover) return null;
  const { recorded, rateHz } = slow;
  const beats = roles.heart ? { list: inputs.beats, rateHz: from.heartRateHz } : null;
  return {
    lead: await routedLead(slow, settings, leadChannel(recording, lead), beats),
    leftover,
    spoiled,
    breathing: computed.breathing,
    epochs: rhythm.epochs,
    plan: checkPlan(phasesOrWhole(inputs.phases, recording.durationS), recording.durationS),
    drawing: {
      kept: keptSamples(recorded, rateHz, spoiled),
      breathing: breathingOf(from, recorded.length, rateHz),
    },
  };
}

async function slowPart(from: EvidenceInputs, job: Job): Promise<PlantedSlow | NotPlanted> {
  const check = await slowCheckOf(from, job);
  if (check) return plantedSlow(check, job);
  return { kind: 'not-planted', reason: 'No four minutes of the lead are three quarters kept.' };
}

/** What the check of one organ was made of, by study, and what it gave. */
interface Kept<T> {
  readonly key: string;
  readonly value: T;
}
const keptSlow = new WeakMap<Study, Kept<PlantedEvidence['slow']>>();
const keptHeart = new WeakMap<Study, Kept<PlantedEvidence['heart']>>();

/** A check, made again only where what it hangs on is another. */
async function once<T>(
  kept: WeakMap<Study, Kept<T>>,
  study: Study,
  key: string,
  make: () => Promise<T>,
): Promise<T> {
  const known = kept.get(study);
  if (known?.key === key) return known.value;
  const value = await make();
  kept.set(study, { key, value });
  return value;
}

/**
 * The planted check of a review: of its slow wave in the reported lead, of its heartbeats in the heart lead. An edit of beats
 * leaves the former as it is where it reaches no rhythm, an edit of what is spoiled for the stomach alone the latter.
 */
export async function plantedOf(from: EvidenceInputs, job: Job): Promise<PlantedEvidence> {
  const { inputs, study, slow, heart, computed, blocked } = from;
  const { roles, settings, phases, beats } = inputs;
  const slowKey = JSON.stringify([
    leadKey(roles.slow[roles.reported]),
    identity(slow[roles.reported]),
    identity(computed.stomach[roles.reported]),
    phases,
    settings,
  ]);
  const heartKey = JSON.stringify([
    roles.heart && leadKey(roles.heart),
    identity(heart),
    identity(beats),
    blocked,
    phases,
    settings,
  ]);
  return {
    slow: await once(keptSlow, study, slowKey, () => slowPart(from, job)),
    heart: await once(keptHeart, study, heartKey, () => plantedHeart(from, job)),
  };
}
