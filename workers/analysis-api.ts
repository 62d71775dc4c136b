import type { BeatList } from '../src/recording/beat';
import type { Doubt, SettledDoubt } from '../src/recording/doubt';
import type { Evidence, EvidencePart } from '../src/recording/evidence/evidence';
import type { Reply } from '../src/recording/failure';
import type { Findings } from '../src/recording/findings';
import type { BreathingSeries, HeartSegment, RrSeries } from '../src/recording/heart-series';
import type { Lead } from '../src/recording/lead';
import type { Phase } from '../src/recording/phase';
import type { Recording } from '../src/recording/recording';
import type { SlowWaveRhythm } from '../src/recording/rhythm';
import type { RoleReasons, Roles } from '../src/recording/roles';
import type { SelfCheck } from '../src/recording/self-check';
import type { Settings } from '../src/recording/settings';
import type { SettingsMap } from '../src/recording/settings-map';
import type { Interval, Span } from '../src/recording/span';

/** Number a call is cancelled by. */
export type JobId = number;

/** How a delimited text file is to be read, where the reader's own proposal is overruled. */
export interface TextReading {
  readonly rateHz: number | null;
  readonly unit: string | null;
}

/** A file opened and looked at: what the page needs before any figure. */
export interface Opened {
  readonly recording: Recording;
  /** Finds the session of this study at once. */
  readonly quickKey: string;
  /** Accepts this very opening. */
  readonly ticket: JobId;
}

/** What the program proposes for a study that nobody has reviewed yet. */
export interface Proposal {
  readonly roles: Roles;
  readonly reasons: RoleReasons;
  readonly phases: readonly Phase[];
  readonly phasesFrom: 'annotations' | 'none';
  /** Without ids: whoever takes them gives them. */
  readonly spans: readonly Omit<Span, 'id'>[];
  readonly beats: BeatList;
}

/** What is settled already when the program proposes the rest; null: to be proposed. */
export interface Given {
  readonly roles: Roles | null;
  readonly phases: readonly Phase[] | null;
  readonly spans: readonly Span[] | null;
  readonly settings: Settings;
}

/** What a person has decided; the worker computes from the first step that a difference reaches. */
export interface ReviewInputs {
  readonly edit: number;
  readonly roles: Roles;
  readonly phases: readonly Phase[];
  readonly settings: Settings;
  readonly spans: readonly Span[];
  readonly beats: BeatList;
}

/** The doubts of a review as it stood at an edit; those in its `settled` are left out. */
export interface DoubtList {
  readonly edit: number;
  /** The one that moves a figure most comes first. */
  readonly open: readonly Doubt[];
}

/** One part of the evidence of a review as it stood at an edit. */
export type EvidenceReply = {
  readonly [P in EvidencePart]: {
    readonly edit: number;
    readonly part: P;
    readonly value: Evidence[P];
  };
}[EvidencePart];

/** A doubted beat with its second of heartbeat; the doubt comes without its effect. */
export interface LookAlike {
  readonly doubt: Doubt;
  /** Correlation with the beat asked for at their best alignment, -1 to 1; 1 for that beat itself. */
  readonly likeness: number;
  /** uV at the heartbeat's rate, from LookAlikes.beforeS before the beat (of a missed one: of its proposed place) on; NaN where nothing is. */
  readonly heartbeatUv: Float32Array;
}

/** The open doubts whose beats are most like that of one of them. */
export interface LookAlikes {
  readonly edit: number;
  /** Samples a second of the rows. */
  readonly rateHz: number;
  readonly beforeS: number;
  readonly asked: LookAlike;
  /** The most like one first, 24 at most; without the one asked for. */
  readonly others: readonly LookAlike[];
  /** The average of the study's most frequent shape over the same second, NaN beyond its ends; null where there is none. */
  readonly averageUv: Float32Array | null;
}

/** Where and how beats are to be looked for once more. */
export interface WithinRequest extends Interval {
  /** The lead to look in, and the one whose clock the beats are told by. */
  readonly lead: Lead;
  readonly heartLead: Lead;
  /** Which extreme a beat's time is taken at. */
  readonly polarity: 'dominant' | 'upright' | 'inverted';
  readonly eager: 'less' | 'usual' | 'more';
  readonly spans: readonly Span[];
  readonly settings: Settings;
}

/** Beats found in a stretch and about it; nothing of the study's own has changed. */
export interface FoundWithin {
  /** Ticks of the heart lead's rate, also beyond the ends of the stretch, as far as was looked. */
  readonly beats: BeatList;
  readonly lookedIn: Interval;
  /** Parts of the stretch in which no beat was looked for. */
  readonly left: readonly Interval[];
}

/** Facts of the separation that the panes and dialogs show. */
export interface SeparationFacts {
  readonly lead: string;
  readonly unclean: readonly Interval[];
  readonly notes: readonly string[];
  /** Seconds the drawn slow wave leads the recorded one at the phase's DF; 0 under `band`. */
  readonly leadS: number;
}

/** The separated signals as they were drawn last, in uV; NaN where there is nothing. */
export interface SeparatedSignals {
  readonly slow: readonly {
    readonly lead: string;
    readonly rateHz: number;
    readonly samples: Float64Array;
  }[];
  readonly heart: { readonly rateHz: number; readonly samples: Float32Array } | null;
}

export interface HeartResults {
  readonly rr: RrSeries;
  readonly segments: readonly HeartSegment[];
  /** Median R height and local noise in uV, standard deviation of the R times in ms. */
  readonly heightUv: number;
  readonly noiseUv: number;
  readonly timingSdMs: number;
}

/** Results by part; a part is null where it has not changed since the last reply to this page. */
export interface Analysis {
  readonly edit: number;
  readonly separation: readonly SeparationFacts[] | null;
  readonly stomach: readonly SlowWaveRhythm[] | null;
  /** `value` is null where there is no heart lead. */
  readonly heart: { readonly value: HeartResults | null } | null;
  /** Of the breathing lead, else derived from the heartbeat; null where there is neither. */
  readonly breathing: BreathingSeries | null;
  readonly findings: Findings;
}

/** Columns for a pane: the least and the greatest value of each of `columns` equal parts of [fromS, toS). */
export interface ColumnsRequest {
  readonly lead: Lead;
  readonly signal: 'recorded' | 'slow-wave' | 'heartbeat';
  readonly fromS: number;
  readonly toS: number;
  readonly columns: number;
}

/** NaN where there is nothing. Where there are fewer samples than columns, `low` and `high` are equal and `timesS` are theirs. */
export interface Columns {
  readonly request: ColumnsRequest;
  readonly timesS: Float64Array;
  readonly low: Float32Array;
  readonly high: Float32Array;
}

/** Where a beat put by hand near a time should stand. */
export interface PlacedBeat {
  readonly tick: number;
  readonly visible: boolean;
}

export type WorkerNews =
  | { readonly kind: 'alive' }
  | {
      readonly kind: 'progress';
      readonly job: JobId;
      /** What is being done, in words for the person. */
      readonly step: string;
      /** 0 to 1. */
      readonly done: number;
    };

/** The one contract between page and worker. Replies are never thrown errors. */
export interface AnalysisApi {
  /** Hands over the page's ear; called once after the start. */
  listen(ear: (news: WorkerNews) => void): void;
  /** Makes the invented demo study as EDF+ bytes. */
  demo(job: JobId): Promise<Reply<Blob>>;
  /** Reads a file's header; the study open before stays in use until `accept`. */
  open(
    job: JobId,
    file: Blob,
    fileName: string,
    reading: TextReading | null,
  ): Promise<Reply<Opened>>;
  /** Takes the study that the call `ticket` opened into use and lets go of the one before; false where there is none. */
  accept(ticket: JobId): boolean;
  /** Roles from labels, rates and short stretches, for the first picture; the reported lead is not compared yet. */
  firstRoles(job: JobId): Promise<Reply<Roles>>;
  /** Reads the signals once and proposes roles, phases, spans and beats; the parts given are taken as they are. */
  propose(job: JobId, given: Given): Promise<Reply<Proposal>>;
  analyse(job: JobId, inputs: ReviewInputs): Promise<Reply<Analysis>>;
  /** The open doubts of a review, the one that moves a figure most first; `settled` are left out. */
  doubts(
    job: JobId,
    inputs: ReviewInputs,
    settled: readonly SettledDoubt[],
  ): Promise<Reply<DoubtList>>;
  /** The check values through the code that makes the figures; needs no study to be open. */
  selfCheck(job: JobId): Promise<Reply<SelfCheck>>;
  /** One part of the evidence beside the figures. The doubts that are not among `settled` are open. */
  evidence(
    job: JobId,
    inputs: ReviewInputs,
    settled: readonly SettledDoubt[],
    part: EvidencePart,
  ): Promise<Reply<EvidenceReply>>;
  /** How well the routes would do on a stretch of the study with other settings; no review changes. */
  settingsMap(job: JobId, inputs: ReviewInputs): Promise<Reply<SettingsMap>>;
  /** What looks like the beat of an open doubt; a failure of kind `wrong-input` where no such doubt stands at a beat. */
  lookAlikes(
    job: JobId,
    inputs: ReviewInputs,
    settled: readonly SettledDoubt[],
    doubtId: string,
  ): Promise<Reply<LookAlikes>>;
  /**
   * The figures that other states of the open study give, in the order asked for; results, signals and columns of the review
   * itself stay as they are.
   */
  figuresOf(job: JobId, states: readonly ReviewInputs[]): Promise<Reply<readonly Findings[]>>;
  /** Finds the beats of a stretch with other choices. */
  detectWithin(job: JobId, request: WithinRequest): Promise<Reply<FoundWithin>>;
  /** The separated signals of a review. */
  separated(job: JobId, inputs: ReviewInputs): Promise<Reply<SeparatedSignals>>;
  columns(request: ColumnsRequest): Promise<Reply<Columns>>;
  placeBeat(nearS: number): Promise<Reply<PlacedBeat>>;
  cancel(job: JobId): void;
}
