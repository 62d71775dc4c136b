import { NO_BEATS } from '../src/recording/beat';
import { type Lead, leadKey } from '../src/recording/lead';
import { isFasting, phasesOrWhole } from '../src/recording/phase';
import type { Roles } from '../src/recording/roles';
import { type Span, spansOf } from '../src/recording/span';
import { leadQuality } from '../src/stomach/lead-quality';
import type { Given, Proposal } from './analysis-api';
import type { Job } from './job';
import { doubtedOf, judgedSpans } from './judged-spans';
import { blockedOf, detectionOf, proposedSpans, toJudge, withIds } from './pipeline-beats';
import { measureHeartbeats } from './pipeline-measures';
import type { WantedLead } from './pipeline-signals';
import type { Study } from './pipeline-study';
import { phasesFromAnnotations } from './propose-phases';
import { proposeRoles } from './propose-roles';

/** Roles from labels, rates and short stretches. */
export async function firstRoles(study: Study): Promise<Roles> {
  const { channels } = study.source.recording;
  study.qrs ??= await measureHeartbeats(study.source);
  return proposeRoles(channels, study.qrs, []).roles;
}

/** Reads the signals once and proposes what is not given. */
export async function propose(study: Study, given: Given, job: Job): Promise<Proposal> {
  const { recording } = study.source;
  const { settings } = given;
  const first = given.roles ?? (await firstRoles(study));
  const annotated = phasesFromAnnotations(recording.annotations, recording.durationS);
  const phases = given.phases ?? annotated;
  await study.signals.provide(wantedOf(first), settings, job);
  const spans = proposedSpans(study, first);
  const [before] = phasesOrWhole(phases.filter(isFasting), recording.durationS);
  const qualities = first.slow.map((lead) => {
    const { recorded, rateHz } = study.signals.recorded(lead);
    const spoiled = spansOf(withIds(spans), leadKey(lead), 'stomach');
    const { score, reason } = leadQuality(recorded, rateHz, spoiled, before);
    return { quality: score, reason };
  });
  study.qrs ??= await measureHeartbeats(study.source);
  const over = phases.some(isFasting) ? 'fasting' : 'whole';
  const proposal = proposeRoles(recording.channels, study.qrs, qualities, {
    leads: first.slow,
    over,
  });
  const roles = given.roles ?? proposal.roles;
  return {
    roles,
    reasons: proposal.reasons,
    phases,
    phasesFrom: annotated.length > 0 ? 'annotations' : 'none',
    ...(await heartOf(study, roles.heart, given, spans, job)),
  };
}

/** What each lead of the roles is read for. */
export function wantedOf(roles: Roles): readonly WantedLead[] {
  const wants = (lead: Lead, part: Partial<WantedLead>): WantedLead => ({
    slow: false,
    heart: false,
    breathing: false,
    ...part,
    lead,
  });
  return [
    ...roles.slow.map((lead) => wants(lead, { slow: true })),
    ...(roles.heart ? [wants(roles.heart, { heart: true })] : []),
    ...(roles.breath ? [wants(roles.breath, { breathing: true })] : []),
  ];
}

/** The spans to propose and the beats: none of the former where some are given, else those the beats can be read in fall away. */
async function heartOf(
  study: Study,
  lead: Lead | null,
  { spans: given, settings }: Given,
  proposed: readonly Omit<Span, 'id'>[],
  job: Job,
): Promise<Pick<Proposal, 'spans' | 'beats'>> {
  if (given) {
    const excluded = lead ? blockedOf(study, lead, given) : [];
    const found = lead ? await detectionOf(study, lead, { excluded }, settings, job) : null;
    return { spans: [], beats: found?.beats ?? NO_BEATS };
  }
  if (!lead) return { spans: proposed, beats: NO_BEATS };
  const found = await detectionOf(study, lead, toJudge(study, lead, proposed), settings, job);
  const spans = judgedSpans(proposed, doubtedOf(lead, proposed), found?.legible ?? []);
  return { spans, beats: found?.beats ?? NO_BEATS };
}
