import type { Findings } from '../src/recording/findings';
import { type Lead, leadKey } from '../src/recording/lead';
import { spansOf } from '../src/recording/span';
import type { SeparatedSlow } from '../src/separate/route';
import type { Analysis, ReviewInputs, SeparatedSignals } from './analysis-api';
import { breathesWithin } from './breathing-reference';
import { type Job, withRests } from './job';
import { blockedOf, detectionOf, proposedSpans, toJudge } from './pipeline-beats';
import type { DoubtInputs } from './pipeline-doubts';
import { wantedOf } from './pipeline-propose';
import type { Computed } from './pipeline-results';
import { leadChannel, type SlowWish } from './pipeline-signals';
import { apartFrom, inLine, type Reckoned, type Study } from './pipeline-study';
import { sameReview } from './same-series';

/** All results of a review, the parts that have not changed left out. */
export async function analyse(study: Study, inputs: ReviewInputs, job: Job): Promise<Analysis> {
  const { computed } = await reckon(study, inputs, job);
  return study.results.deliver(computed);
}

/** What the doubts of a review stand on: the last analysis where it was of the same review. */
export async function doubtInputs(
  study: Study,
  inputs: ReviewInputs,
  job: Job,
): Promise<DoubtInputs> {
  const known = study.last && sameReview(study.last.from.inputs, inputs) ? study.last : null;
  const { from, computed } = known ?? (await reckon(study, inputs, job));
  return { ...from, inputs, computed, recording: study.source.recording };
}

/** The separated signals of a review, as they are drawn for it. */
export async function separatedSignals(
  study: Study,
  inputs: ReviewInputs,
  job: Job,
): Promise<SeparatedSignals> {
  const { slow, heart } = await doubtInputs(study, inputs, job);
  return {
    slow: slow.map(({ lead, rateHz, slowWave }) => ({ lead, rateHz, samples: slowWave })),
    heart: heart && { rateHz: heart.rateHz, samples: heart.heartbeat },
  };
}

async function reckon(study: Study, inputs: ReviewInputs, job: Job): Promise<Reckoned> {
  const { roles, settings } = inputs;
  await study.signals.provide(wantedOf(roles), settings, job);
  const { heart } = roles;
  const found = heart
    ? await detectionOf(
        study,
        heart,
        toJudge(study, heart, proposedSpans(study, roles)),
        settings,
        job,
      )
    : null;
  const parts =
    settings.slowRoute === 'beat-average'
      ? await (await import('./pipeline-average')).heartPartsOf(study, inputs, job)
      : null;
  const wishOf = (lead: Lead): SlowWish => ({
    spoiled: spansOf(inputs.spans, leadKey(lead), 'stomach'),
    heartPart: parts?.get(leadKey(lead)) ?? null,
  });
  const slow: SeparatedSlow[] = [];
  for (const lead of roles.slow) {
    const drawing = study.signals.slow(lead, settings, wishOf(lead));
    slow.push(await withRests(drawing, job));
    await job.breathe();
  }
  const from = {
    inputs,
    slow,
    heart: heart ? study.signals.heart(heart) : null,
    heartRateHz: heart ? leadChannel(study.source.recording, heart).rateHz : 0,
    blocked: heart ? blockedOf(study, heart, inputs.spans) : [],
    detection: found,
    breathing: roles.breath ? (study.signals.get(roles.breath)?.breathing ?? null) : null,
  };
  const first = await study.results.of(from, job);
  const again = await withRests(redrawn(study, inputs, slow, { first, wishOf }), job);
  const last = again ? { ...from, slow: again } : from;
  study.last = { from: last, computed: again ? await study.results.of(last, job) : first };
  return study.last;
}

/** The figures of other states of a study, computed apart from the review. */
export async function figuresOf(
  study: Study,
  states: readonly ReviewInputs[],
  job: Job,
): Promise<readonly Findings[]> {
  let apart: Study | null = null;
  const found: Findings[] = [];
  for (const inputs of states) {
    job.progress('Computing the figures of other states', found.length / states.length);
    const quiet: Job = { breathe: () => job.breathe(), progress: () => undefined };
    const { computed } = await inLine(study, job, () => {
      apart ??= apartFrom(study);
      return reckon(apart, inputs, quiet);
    });
    found.push(computed.findings);
  }
  return found;
}

/**
 * The slow waves drawn once more where the first results ask for it: at each lead's own rhythm, where the derivative's lead
 * is undone, or without breathing, where it lies inside the band; null where the first drawing holds. Takes a rest now and then.
 */
function* redrawn(
  study: Study,
  { roles, settings }: ReviewInputs,
  drawn: readonly SeparatedSlow[],
  known: { readonly first: Computed; readonly wishOf: (lead: Lead) => SlowWish },
): Generator<void, readonly SeparatedSlow[] | null> {
  const { first, wishOf } = known;
  const again: SeparatedSlow[] = [];
  if (settings.slowRoute === 'fractional') {
    if (!settings.fractional.undoLead) return null;
    for (const lead of roles.slow) {
      const dfCpm = study.results.usualCpm(leadKey(lead));
      again.push(yield* study.signals.slow(lead, settings, { ...wishOf(lead), dfCpm }));
    }
    return again;
  }
  if (
    settings.breathingOut === 'never' ||
    !breathesWithin(first.breathing, settings.slowBandCpm[1])
  )
    return null;
  for (const lead of roles.slow) {
    const { rateHz, recorded } = drawn[again.length];
    const breathing = study.reference.of({
      breath: roles.breath ? (study.signals.get(roles.breath)?.breathing ?? null) : null,
      heights: first.heights,
      rateHz,
      length: recorded.length,
    });
    again.push(yield* study.signals.slow(lead, settings, { ...wishOf(lead), breathing }));
  }
  return again;
}
