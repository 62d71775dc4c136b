import { openRecording } from '../src/decode/formats';
import { quickKey } from '../src/decode/quick-key';
import type { Doubt, SettledDoubt } from '../src/recording/doubt';
import type { Evidence, EvidencePart } from '../src/recording/evidence/evidence';
import type { Findings } from '../src/recording/findings';
import type { Lead } from '../src/recording/lead';
import type { Roles } from '../src/recording/roles';
import type { SelfCheck } from '../src/recording/self-check';
import type { HeartOutput } from '../src/recording/separated';
import type { SettingsMap } from '../src/recording/settings-map';
import type { SeparatedSlow } from '../src/separate/route';
import type {
  Analysis,
  Columns,
  ColumnsRequest,
  DoubtList,
  EvidenceReply,
  FoundWithin,
  Given,
  JobId,
  LookAlikes,
  Opened,
  PlacedBeat,
  Proposal,
  ReviewInputs,
  SeparatedSignals,
  TextReading,
  WithinRequest,
} from './analysis-api';
import type { Job } from './job';
import { analyse, doubtInputs, figuresOf, separatedSignals } from './pipeline-analyse';
import { placeNear } from './pipeline-beats';
import { columnsOf } from './pipeline-columns';
import type { EvidenceInputs } from './pipeline-evidence';
import { firstRoles, propose } from './pipeline-propose';
import { createStudy, inLine, type Study } from './pipeline-study';

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
  /** One part of the evidence beside the figures. */
  evidence(
    inputs: ReviewInputs,
    settled: readonly SettledDoubt[],
    part: EvidencePart,
    job: Job,
  ): Promise<EvidenceReply>;
  /** All parts of it, one after the other. */
  allEvidence(inputs: ReviewInputs, settled: readonly SettledDoubt[], job: Job): Promise<Evidence>;
  /** How well the routes would do on a stretch of the study with other settings. */
  settingsMap(inputs: ReviewInputs, job: Job): Promise<SettingsMap>;
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
  /** The separated signals of a review, as they are drawn. */
  separated(inputs: ReviewInputs, job: Job): Promise<SeparatedSignals>;
  /** The slow wave of a lead as it was drawn last; null before the first analysis. */
  slowWave(lead: Lead): SeparatedSlow | null;
  /** The heartbeat of a lead; null where it was not read for one. */
  heartbeat(lead: Lead): HeartOutput | null;
}

/** A pipeline with no study open. What few reviews ask for is fetched when it is. */
export function createPipeline(): Pipeline {
  let opened: { readonly ticket: JobId; readonly study: Study } | null = null;
  let current: Study | null = null;
  const study = (): Study => {
    if (!current) throw new Error('no study is open in the worker');
    return current;
  };
  /** What evidence stood on last: its parts are asked for one after the other, and the doubts are the same for all. */
  let stoodOn: {
    readonly computed: EvidenceInputs['computed'];
    readonly settledIds: string;
    readonly open: readonly Doubt[];
  } | null = null;
  /** The figures' inputs and the doubts that are open beside them. */
  async function evidenceInputs(
    inputs: ReviewInputs,
    settled: readonly SettledDoubt[],
    job: Job,
  ): Promise<EvidenceInputs> {
    const from = await inLine(study(), job, (one) => doubtInputs(one, inputs, job));
    const settledIds = settled.map(({ id }) => id).join(' ');
    if (stoodOn && stoodOn.computed === from.computed && stoodOn.settledIds === settledIds)
      return { ...from, study: study(), open: stoodOn.open };
    const { openDoubts } = await import('./pipeline-doubts');
    const open = await openDoubts(from, settled, job);
    stoodOn = { computed: from.computed, settledIds, open };
    return { ...from, study: study(), open };
  }
  return {
    async open(ticket, file, fileName, reading, job) {
      const source = await openRecording(file, fileName, reading);
      const key = await quickKey(file, fileName);
      await job.breathe();
      opened = { ticket, study: createStudy(source) };
      return { recording: source.recording, quickKey: key, ticket };
    },
    accept(ticket) {
      if (opened?.ticket !== ticket) return false;
      current = opened.study;
      stoodOn = null;
      opened = null;
      return true;
    },
    firstRoles: () => firstRoles(study()),
    propose: (given, job) => inLine(study(), job, (one) => propose(one, given, job)),
    analyse: (inputs, job) => inLine(study(), job, (one) => analyse(one, inputs, job)),
    async doubts(inputs, settled, job) {
      const from = await inLine(study(), job, (one) => doubtInputs(one, inputs, job));
      const { doubtList } = await import('./pipeline-doubts');
      return doubtList(from, settled, job);
    },
    openDoubts: async (inputs, settled, job) => (await evidenceInputs(inputs, settled, job)).open,
    async evidence(inputs, settled, part, job) {
      const from = await evidenceInputs(inputs, settled, job);
      const { evidenceReply } = await import('./pipeline-evidence');
      return evidenceReply(part, from, job);
    },
    async allEvidence(inputs, settled, job) {
      const from = await evidenceInputs(inputs, settled, job);
      const { allEvidence } = await import('./pipeline-evidence');
      return allEvidence(from, job);
    },
    async settingsMap(inputs, job) {
      const from = await inLine(study(), job, (one) => doubtInputs(one, inputs, job));
      const { settingsMap } = await import('./pipeline-settings-map');
      return settingsMap({ study: study(), from, job });
    },
    async lookAlikes(inputs, settled, doubtId, job) {
      const from = await inLine(study(), job, (one) => doubtInputs(one, inputs, job));
      const { lookAlikes } = await import('./pipeline-doubts');
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
    separated: (inputs, job) => inLine(study(), job, (one) => separatedSignals(one, inputs, job)),
  };
}

/** The check values through the code that makes the figures, on invented studies of their own; needs no study to be open. */
export async function selfCheck(job: Job): Promise<SelfCheck> {
  const { allChecks, runChecks } = await import('./pipeline-self-check');
  return runChecks(allChecks(createPipeline), job);
}
