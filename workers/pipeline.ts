import { openRecording } from '../src/decode/formats';
import { quickKey } from '../src/decode/quick-key';
import { type Detection, type DetectionInput, detectInSteps } from '../src/heart/detect';
import { placeBeat } from '../src/heart/place-beat';
import { NO_BEATS } from '../src/recording/beat';
import type { Doubt, SettledDoubt } from '../src/recording/doubt';
import { Refusal } from '../src/recording/failure';
import type { Findings } from '../src/recording/findings';
import { type Lead, leadKey } from '../src/recording/lead';
import { lostOn } from '../src/recording/lost';
import { isFasting, phasesOrWhole } from '../src/recording/phase';
import type { SignalSource } from '../src/recording/recording';
import type { Roles } from '../src/recording/roles';
import type { HeartOutput } from '../src/recording/separated';
import type { Settings } from '../src/recording/settings';
import { type Interval, type Span, spansOf } from '../src/recording/span';
import type { SeparatedSlow } from '../src/separate/route';
import { leadQuality } from '../src/stomach/lead-quality';
import { TICKS_PER_SAMPLE } from '../src/units/ticks';
import type {
  Analysis,
  Columns,
  ColumnsRequest,
  DoubtList,
  FoundWithin,
  Given,
  JobId,
  LookAlikes,
  Opened,
  PlacedBeat,
  Proposal,
  ReviewInputs,
  TextReading,
  WithinRequest,
} from './analysis-api';
import {
  breathesWithin,
  breathingReference,
  type ReferenceInputs,
  referenceKey,
} from './breathing-reference';
import { inTurns, type Job } from './job';
import { doubtedOf, judgedSpans } from './judged-spans';
import { columnsOf } from './pipeline-columns';
import { type DoubtInputs, doubtList, lookAlikes, openDoubts } from './pipeline-doubts';
import { measureHeartbeats } from './pipeline-measures';
import { type Computed, createResults, type ResultInputs, type Results } from './pipeline-results';
import { leadChannel, SignalStore, type WantedLead } from './pipeline-signals';
import { phasesFromAnnotations } from './propose-phases';
import { proposeRoles, type QrsMeasure } from './propose-roles';
import { type Remembered, remember } from './remember';
import { sameReview } from './same-series';

/** Results with what they were computed from. */
interface Reckoned {
  readonly from: ResultInputs;
  readonly computed: Computed;
}

interface Study {
  readonly source: SignalSource;
  readonly signals: SignalStore;
  readonly results: Results;
  qrs: readonly QrsMeasure[] | null;
  detection: { readonly key: string; readonly found: Detection } | null;
  heartLead: Lead | null;
  readonly reference: Remembered<ReferenceInputs, Float64Array | null>;
  /** What the last analysis stood on and gave. */
  last: Reckoned | null;
  /** Ends when the long work under way does. */
  busy: Promise<void>;
}

/** The way of a recording through the steps, the same for page and command line. Methods throw Refusal. */
export interface Pipeline {
  open(
    ticket: JobId,
    file: Blob,
    fileName: string,
    reading: TextReading | null,
    job: Job,
  ): Promise<Opened>;
  accept(ticket: JobId): boolean;
  firstRoles(): Promise<Roles>;
  propose(given: Given, job: Job): Promise<Proposal>;
  analyse(inputs: ReviewInputs, job: Job): Promise<Analysis>;
  doubts(inputs: ReviewInputs, settled: readonly SettledDoubt[], job: Job): Promise<DoubtList>;
  /** The open doubts in the order of time without their effects, which takes far less. */
  openDoubts(
    inputs: ReviewInputs,
    settled: readonly SettledDoubt[],
    job: Job,
  ): Promise<readonly Doubt[]>;
  lookAlikes(
    inputs: ReviewInputs,
    settled: readonly SettledDoubt[],
    doubtId: string,
    job: Job,
  ): Promise<LookAlikes>;
  /** The figures of other states of the study, which leave what was found for the review as it is. */
  figuresOf(states: readonly ReviewInputs[], job: Job): Promise<readonly Findings[]>;
  /** Finds the beats of a stretch with other choices; what was found for the review stays as it is. */
  detectWithin(request: WithinRequest, job: Job): Promise<FoundWithin>;
  columns(request: ColumnsRequest): Promise<Columns>;
  placeBeat(nearS: number): PlacedBeat;
  /** The slow wave of a lead as it was drawn last; null before the first analysis. */
  slowWave(lead: Lead): SeparatedSlow | null;
  /** The heartbeat of a lead; null where it was not read for one. */
  heartbeat(lead: Lead): HeartOutput | null;
}

export function createPipeline(): Pipeline {
  let opened: { readonly ticket: JobId; readonly study: Study } | null = null;
  let current: Study | null = null;
  const study = (): Study => {
    if (!current) throw new Error('no study is open in the worker');
    return current;
  };
  return {
    async open(ticket, file, fileName, reading, job) {
      const source = await openRecording(file, fileName, reading);
      const key = await quickKey(file, fileName);
      await job.breathe();
      const study: Study = {
        source,
        signals: new SignalStore(source),
        results: createResults(source.recording),
        qrs: null,
        detection: null,
        heartLead: null,
        reference: remember(referenceKey, breathingReference),
        last: null,
        busy: Promise.resolve(),
      };
      opened = { ticket, study };
      return { recording: source.recording, quickKey: key, ticket };
    },
    accept(ticket) {
      if (opened?.ticket !== ticket) return false;
      current = opened.study;
      opened = null;
      return true;
    },
    firstRoles: () => firstRoles(study()),
    propose: (given, job) => inLine(study(), job, (one) => propose(one, given, job)),
    analyse: (inputs, job) => inLine(study(), job, (one) => analyse(one, inputs, job)),
    async doubts(inputs, settled, job) {
      const from = await inLine(study(), job, (one) => doubtInputs(one, inputs, job));
      return doubtList(from, settled, job);
    },
    async openDoubts(inputs, settled, job) {
      const from = await inLine(study(), job, (one) => doubtInputs(one, inputs, job));
      return openDoubts(from, settled, job);
    },
    async lookAlikes(inputs, settled, doubtId, job) {
      const from = await inLine(study(), job, (one) => doubtInputs(one, inputs, job));
      return lookAlikes(from, settled, doubtId, job);
    },
    figuresOf: (states, job) => figuresOf(study(), states, job),
    async detectWithin(request, job) {
      const { source, signals } = study();
      const { detectWithin } = await import('./pipeline-within');
      return detectWithin({ source, kept: signals.heart(request.heartLead), request }, job);
    },
    columns: (request) => columnsOf(study().source, study().signals, request),
    placeBeat: (nearS) => placeNear(study(), nearS),
    slowWave: (lead) => study().signals.drawn(lead),
    heartbeat: (lead) => study().signals.heart(lead),
  };
}

/** Long work on one study is done one piece after the other, since each piece changes what the next one finds. */
function inLine<T>(study: Study, job: Job, work: (study: Study) => Promise<T>): Promise<T> {
  const done = study.busy.then(async () => {
    await job.breathe();
    return work(study);
  });
  study.busy = done.then(
    () => undefined,
    () => undefined,
  );
  return done;
}

async function firstRoles(study: Study): Promise<Roles> {
  const { channels } = study.source.recording;
  study.qrs ??= await measureHeartbeats(study.source);
  return proposeRoles(channels, study.qrs, []).roles;
}

async function propose(study: Study, given: Given, job: Job): Promise<Proposal> {
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

function wantedOf(roles: Roles): readonly WantedLead[] {
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

function proposedSpans(study: Study, roles: Roles): readonly Omit<Span, 'id'>[] {
  const leads = new Map(
    [...roles.slow, ...(roles.heart ? [roles.heart] : [])].map((lead) => [leadKey(lead), lead]),
  );
  return [...leads.values()].flatMap((lead) => study.signals.get(lead)?.proposedSpans ?? []);
}

const withIds = (spans: readonly Omit<Span, 'id'>[]): readonly Span[] =>
  spans.map((span, i) => ({ ...span, id: i + 1 }));

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

type LookedIn = Pick<DetectionInput, 'excluded' | 'doubted'>;

function toJudge(study: Study, lead: Lead, proposed: readonly Omit<Span, 'id'>[]): LookedIn {
  const doubted = doubtedOf(lead, proposed);
  const others = proposed.filter((span) => !doubted.includes(span));
  return {
    excluded: blockedOf(study, lead, withIds(others)),
    doubted: doubted.map(({ fromS, toS }) => ({ fromS, toS })),
  };
}

/** Stretches of a lead that carry no heartbeat: spoiled for the heart, or missing. */
function blockedOf(study: Study, lead: Lead, spans: readonly Span[]): readonly Interval[] {
  return lostOn(lead, 'heart', spans, study.source.recording.gaps);
}

async function detectionOf(
  study: Study,
  lead: Lead,
  { excluded = [], doubted = [] }: LookedIn,
  { heartRoute, heartBandHz, fractional }: Settings,
  job: Job,
): Promise<Detection | null> {
  const heart = study.signals.heart(lead);
  if (!heart) return null;
  const key = JSON.stringify([
    leadKey(lead),
    excluded,
    doubted,
    heartRoute,
    heartBandHz,
    fractional,
  ]);
  if (study.detection?.key !== key) {
    const signal = {
      heartbeat: heart.heartbeat,
      rateHz: heart.rateHz,
      ticksPerSample: TICKS_PER_SAMPLE * heart.decimation,
      excluded,
      doubted,
    };
    study.detection = {
      key,
      found: await inTurns(detectInSteps(signal), job, 'Finding the heartbeats'),
    };
  }
  study.heartLead = lead;
  return study.detection.found;
}

async function analyse(study: Study, inputs: ReviewInputs, job: Job): Promise<Analysis> {
  const { computed } = await reckon(study, inputs, job);
  return study.results.deliver(computed);
}

/** What the doubts of a review stand on: the last analysis where it was of the same review. */
async function doubtInputs(study: Study, inputs: ReviewInputs, job: Job): Promise<DoubtInputs> {
  const known = study.last && sameReview(study.last.from.inputs, inputs) ? study.last : null;
  const { from, computed } = known ?? (await reckon(study, inputs, job));
  return { ...from, inputs, computed, recording: study.source.recording };
}

async function reckon(study: Study, inputs: ReviewInputs, job: Job): Promise<Reckoned> {
  const { roles, settings } = inputs;
  await study.signals.provide(wantedOf(roles), settings, job);
  const { heart } = roles;
  const spoiledOf = (lead: Lead) => spansOf(inputs.spans, leadKey(lead), 'stomach');
  const found = heart
    ? await detectionOf(
        study,
        heart,
        toJudge(study, heart, proposedSpans(study, roles)),
        settings,
        job,
      )
    : null;
  const from = {
    inputs,
    slow: roles.slow.map((lead) =>
      study.signals.slow(lead, settings, { spoiled: spoiledOf(lead) }),
    ),
    heart: heart ? study.signals.heart(heart) : null,
    heartRateHz: heart ? leadChannel(study.source.recording, heart).rateHz : 0,
    blocked: heart ? blockedOf(study, heart, inputs.spans) : [],
    detection: found,
    breathing: roles.breath ? (study.signals.get(roles.breath)?.breathing ?? null) : null,
  };
  const first = await study.results.of(from, job);
  const slow = redrawn(study, inputs, from.slow, { first, spoiledOf });
  const last = slow ? { ...from, slow } : from;
  study.last = { from: last, computed: slow ? await study.results.of(last, job) : first };
  return study.last;
}

/**
 * The same study with room of its own for what is found: it begins with the signals and beats that are there, and what it
 * adds is not seen by the other.
 */
const apartFrom = (study: Study): Study => ({
  ...study,
  signals: study.signals.apart(),
  results: createResults(study.source.recording),
  reference: remember(referenceKey, breathingReference),
});

async function figuresOf(
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
 * is undone, or without breathing, where it lies inside the band; null where the first drawing holds.
 */
function redrawn(
  study: Study,
  { roles, settings }: ReviewInputs,
  drawn: readonly SeparatedSlow[],
  known: { readonly first: Computed; readonly spoiledOf: (lead: Lead) => readonly Interval[] },
): readonly SeparatedSlow[] | null {
  const { first, spoiledOf } = known;
  const wish = (lead: Lead) => ({ spoiled: spoiledOf(lead) });
  if (settings.slowRoute === 'fractional')
    return settings.fractional.undoLead
      ? roles.slow.map((lead) =>
          study.signals.slow(lead, settings, {
            ...wish(lead),
            dfCpm: study.results.usualCpm(leadKey(lead)),
          }),
        )
      : null;
  if (
    settings.breathingOut === 'never' ||
    !breathesWithin(first.breathing, settings.slowBandCpm[1])
  )
    return null;
  return roles.slow.map((lead, i) => {
    const { rateHz, recorded } = drawn[i];
    const breathing = study.reference.of({
      breath: roles.breath ? (study.signals.get(roles.breath)?.breathing ?? null) : null,
      heights: first.heights,
      rateHz,
      length: recorded.length,
    });
    return study.signals.slow(lead, settings, { ...wish(lead), breathing });
  });
}

function placeNear(study: Study, nearS: number): PlacedBeat {
  const lead = study.heartLead;
  const heart = lead ? study.signals.heart(lead) : null;
  if (!lead || !heart || !study.detection)
    throw new Refusal({
      kind: 'wrong-input',
      message: 'There is no heart lead to put a beat on.',
      place: null,
      remedy: 'Choose a heart lead first.',
    });
  const { averages, sign } = study.detection.found;
  const ticksPerSample = TICKS_PER_SAMPLE * heart.decimation;
  return placeBeat(
    { heartbeat: heart.heartbeat, rateHz: heart.rateHz, ticksPerSample, averages, sign },
    nearS,
  );
}
