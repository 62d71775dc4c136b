import { median, wilson } from '../src/numeric/statistics';
import { electrodesOfPair } from '../src/recording/electrodes';
import type {
  LagFound,
  LagInEpoch,
  LeadPair,
  LeadsEvidence,
  PairInPhase,
} from '../src/recording/evidence/leads';
import { numberFigure, withheld } from '../src/recording/figure';
import { type Lead, leadChannels, leadKey, leadName } from '../src/recording/lead';
import { lostOn } from '../src/recording/lost';
import { type Phase, phasesOrWhole } from '../src/recording/phase';
import { type Interval, joinIntervals } from '../src/recording/span';
import { stomachCoverage } from '../src/stomach/coverage';
import { keptSamples } from '../src/stomach/kept-samples';
import { lagAtDf } from '../src/stomach/lead-lag';
import {
  COUPLED_WITHIN_CPM,
  type EpochOfPair,
  epochsOfPair,
} from '../src/stomach/slow-wave-coupling';
import type { StomachAnalysis } from '../src/stomach/slow-wave-rhythm';
import { cpmToHz } from '../src/units/rate';
import type { Job } from './job';
import type { EvidenceInputs } from './pipeline-evidence';
import type { Study } from './pipeline-study';
import { identity } from './remember';

/** Segments of a phase's cross-spectrum, and of one epoch's. */
const IN_PHASE = { segmentS: 120, stepS: 30 };
const IN_EPOCH = { segmentS: 60, stepS: 15 };
/** Minutes that stand for one independent look at the rhythm. */
const LOOK_S = 240;

/** One slow-wave lead as a pair takes it. */
interface OneLead {
  readonly lead: Lead;
  readonly analysis: StomachAnalysis;
  readonly rateHz: number;
  readonly lost: readonly Interval[];
  /** The lead at the slow rate, NaN where it is spoiled or missing. */
  readonly clean: Float64Array;
}

interface Both {
  readonly first: OneLead;
  readonly second: OneLead;
  readonly epochs: readonly EpochOfPair[];
}

const kept = new WeakMap<Study, { readonly key: string; readonly value: LeadsEvidence }>();

/** What the pairs hang on: the leads and their rhythm, phases and spans, but no beat. */
function keyOf({ inputs, computed, slow, recording }: EvidenceInputs): string {
  return JSON.stringify([
    slow.map(({ recorded }) => identity(recorded)),
    computed.stomach.map(({ rhythm }) =>
      rhythm.epochs.map(({ kept, dfCpm, rhythm: one }) => [kept, dfCpm, one]),
    ),
    phasesOrWhole(inputs.phases, recording.durationS),
    inputs.spans,
    inputs.roles.slow,
  ]);
}

/** What several slow-wave leads say of each other; an edit of beats alone gives what is there already. */
export async function leadsOf(from: EvidenceInputs, job: Job): Promise<LeadsEvidence> {
  const key = keyOf(from);
  const before = kept.get(from.study);
  if (before?.key === key) return before.value;
  const leads = from.slow.map((_, i) => oneLead(from, i));
  const pairs: LeadPair[] = [];
  for (let i = 0; i < leads.length; i += 1)
    for (let j = i + 1; j < leads.length; j += 1) {
      job.progress('Comparing the leads', pairs.length / ((leads.length * (leads.length - 1)) / 2));
      pairs.push(await pairOf(from, leads[i], leads[j], job));
    }
  const value = { withinCpm: COUPLED_WITHIN_CPM, leadCount: leads.length, pairs };
  kept.set(from.study, { key, value });
  return value;
}

function oneLead({ inputs, recording, slow, computed }: EvidenceInputs, index: number): OneLead {
  const lead = inputs.roles.slow[index];
  const { recorded, rateHz } = slow[index];
  const lost = lostOn(lead, 'stomach', inputs.spans, recording.gaps);
  const there = keptSamples(recorded, rateHz, lost);
  const clean = recorded.map((value, i) => (there[i] === 1 ? value : Number.NaN));
  return { lead, analysis: computed.stomach[index], rateHz, lost, clean };
}

async function pairOf(
  { inputs, recording }: EvidenceInputs,
  first: OneLead,
  second: OneLead,
  job: Job,
): Promise<LeadPair> {
  const { channels } = recording;
  const electrodes = electrodesOfPair(first.lead, second.lead, channels);
  const named = {
    first: leadKey(first.lead),
    second: leadKey(second.lead),
    firstName: leadName(first.lead, channels),
    secondName: leadName(second.lead, channels),
    electrodes,
  };
  if (electrodes.kind === 'shared')
    return { ...named, kind: 'left-out', why: `${electrodes.why}: what it records is in both` };
  if (first.rateHz !== second.rateHz)
    return { ...named, kind: 'left-out', why: 'they are recorded at different low rates' };
  const epochs = epochsOfPair(first.analysis.rhythm.epochs, second.analysis.rhythm.epochs);
  const both = { first, second, epochs };
  const phases: PairInPhase[] = [];
  for (const phase of phasesOrWhole(inputs.phases, recording.durationS)) {
    phases.push(pairInPhase(both, phase));
    await job.breathe();
  }
  return {
    ...named,
    kind: 'compared',
    mark: markOf(first.lead, second.lead, recording.channels, electrodes.kind === 'not-known'),
    phases,
    strip: await stripOf(both, job),
  };
}

function markOf(
  first: Lead,
  second: Lead,
  channels: EvidenceInputs['recording']['channels'],
  referenceOpen: boolean,
): string | null {
  const filters = [first, second].map((lead) =>
    JSON.stringify(
      leadChannels(lead).map((index) => {
        const { prefilter } = channels[index];
        return prefilter.kind === 'stated' ? [prefilter.highPassHz, prefilter.lowPassHz] : null;
      })[0],
    ),
  );
  const marks = [
    ...(referenceOpen
      ? ['a common reference cannot be excluded: it would look like coupling without lag']
      : []),
    ...(filters[0] === filters[1]
      ? []
      : ['the file states different filters: part of the lag may be theirs']),
  ];
  return marks.length > 0 ? marks.join('; ') : null;
}

/** A stretch of both leads, from the same sample to the same sample. */
function stretchOf({ first, second }: Both, { fromS, toS }: Interval) {
  const [from, to] = [fromS, toS].map((timeS) => Math.round(timeS * first.rateHz));
  const end = Math.min(to, first.clean.length, second.clean.length);
  return [first.clean.subarray(from, end), second.clean.subarray(from, end)] as const;
}

function pairInPhase(both: Both, phase: Phase): PairInPhase {
  const { first, second } = both;
  const epochs = both.epochs.filter((epoch) => epoch.phase === phase.name);
  const inPhase = { name: phase.name, fromS: phase.fromS, toS: phase.toS };
  const coverage = stomachCoverage(phase, joinIntervals([...first.lost, ...second.lost]));
  const coupled = epochs.filter((epoch) => epoch.coupled).length;
  const lag = lagInPhase(both, phase, epochs);
  if (epochs.length === 0 || coverage.percentages === 'withheld') {
    const why = coverage.reason === '' ? 'no epoch is kept on both leads' : coverage.reason;
    return { ...inPhase, coupling: withheld(why), couplingRange: null, lag };
  }
  const { marks } = coverage;
  if (coverage.percentages === 'count') {
    const what = 'epochs';
    const coupling = { kind: 'count' as const, count: coupled, of: epochs.length, what, marks };
    return { ...inPhase, coupling, couplingRange: null, lag };
  }
  const share = coupled / epochs.length;
  const looks = coverage.keptS / LOOK_S;
  const { low, high } = wilson(share * looks, looks);
  return {
    ...inPhase,
    coupling: numberFigure(100 * share, `${epochs.length} epochs`, marks),
    couplingRange: [100 * low, 100 * high],
    lag,
  };
}

function lagInPhase(both: Both, phase: Phase, epochs: readonly EpochOfPair[]): LagFound {
  const shared = epochs.flatMap(({ sharedCpm }) => (sharedCpm === null ? [] : [sharedCpm]));
  const not = (reason: string, coherence: number | null, level: number | null): LagFound => ({
    kind: 'withheld',
    reason,
    coherence,
    level,
  });
  if (shared.length === 0) return not('in no epoch do both leads share a DF', null, null);
  const dfCpm = median(shared);
  const found = lagAtDf(...stretchOf(both, phase), {
    rateHz: both.first.rateHz,
    dfCpm,
    ...IN_PHASE,
  });
  if (found.coherence === null)
    return not('fewer than two clean stretches of 2 min in both leads', null, null);
  if (found.lag === null)
    return not('coherence is not above that of unrelated noise', found.coherence, found.level);
  return {
    kind: 'lag',
    dfCpm,
    ...found.lag,
    halfCycleS: 0.5 / cpmToHz(dfCpm),
    coherence: found.coherence,
    level: found.level,
    segments: found.segments,
  };
}

async function stripOf(both: Both, job: Job): Promise<readonly LagInEpoch[]> {
  const strip: LagInEpoch[] = [];
  for (const epoch of both.epochs) {
    strip.push(lagInEpoch(both, epoch));
    await job.breathe();
  }
  return strip.sort((a, b) => a.fromS - b.fromS);
}

function lagInEpoch(both: Both, { fromS, toS, coupled, sharedCpm }: EpochOfPair): LagInEpoch {
  const none = { fromS, toS, coupled, dfCpm: sharedCpm, lagS: null, lowS: null, highS: null };
  if (sharedCpm === null) return none;
  const { lag } = lagAtDf(...stretchOf(both, { fromS, toS }), {
    rateHz: both.first.rateHz,
    dfCpm: sharedCpm,
    ...IN_EPOCH,
  });
  return { ...none, ...lag };
}
