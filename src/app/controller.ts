import type {
  FoundWithin,
  ReviewInputs,
  TextReading,
  WithinRequest,
} from '../../workers/analysis-api';
import type { AnalysisClient, CallOptions } from '../../workers/analysis-client';
import type { Reply } from '../recording/failure';
import type { Findings } from '../recording/findings';
import type { Phase } from '../recording/phase';
import type { Protocol } from '../recording/protocol';
import type { Roles } from '../recording/roles';
import type { Settings } from '../recording/settings';
import type { ResultInput } from '../report/result-files';
import type { Edit, Signature } from '../session/document';

/** A session kept in this browser, as the start screen lists it: by code, never by name. */
export interface KeptRow {
  readonly quickKey: string;
  readonly code: string;
  /** Local start of the recording as its header had it ("2024-05-03T09:12:00"); null where not known. */
  readonly start: string | null;
  readonly edits: number;
  readonly invented: boolean;
  /** Time of the last edit in UTC, or null where there is none. */
  readonly lastUtc: string | null;
}

/** What a person signs with. */
export interface SignRequest {
  readonly meaning: Signature['meaning'];
  readonly name: string;
  /** Why it is amended; '' for the other meanings. */
  readonly reason: string;
  readonly notes: string;
  readonly conclusion: string;
}

/** The worker of the open study, lent: one borrower at a time, while the review itself rests. */
export interface LentWorker {
  readonly client: AnalysisClient;
  /** Has the figures of the review itself computed again, after the worker was asked for others. */
  giveBack(): void;
}

/**
 * What the shell asks of whoever leads a study through worker, session and stores. Failures are shown by the controller
 * through the shell's store (dialog `failure`, `text-reading` or a message); the promises settle when the act is over.
 */
export interface StudyController {
  /** Reads the header; a file that cannot be read leaves what was open as it was. Ends in the dialog `identity`. */
  openFile(file: File, reading: TextReading | null): Promise<void>;
  openDemo(): Promise<void>;
  openSessionFile(file: File): Promise<void>;
  /** Shows the figures of a kept session and asks for the same file. */
  continueKept(quickKey: string): Promise<void>;
  /** After a reload: asks for the file of the study that was open in this tab. */
  resume(): Promise<void>;
  /** The person agrees that this is the study, known by this code: only now is anything of it drawn. */
  confirmIdentity(code: string): Promise<void>;
  cancelOpening(): void;
  keptSessions(): Promise<readonly KeptRow[]>;
  /** Takes a kept session out of this browser for good. */
  forget(quickKey: string): Promise<void>;
  /** Applies one edit; asks for the reviewer first where none is set. */
  edit(edit: Edit): void;
  /** The worker, for a copy of the review that shows edits and keeps none. */
  lend(): LentWorker;
  undo(): void;
  redo(): void;
  /** `reason` says why the reported lead changed; '' where it did not. */
  changeRoles(roles: Roles, reason: string): void;
  changePhases(phases: readonly Phase[]): void;
  changeSettings(settings: Settings): void;
  changeProtocol(protocol: Protocol): void;
  detectAgain(): void;
  /** Looks for the beats of a stretch with other choices; nothing of the session changes. */
  findWithin(request: WithinRequest, options: CallOptions): Promise<Reply<FoundWithin>>;
  downloadSession(): void;
  /** All that the files of results are made of, once figures and file are certain; null after the person was told why not. */
  gatherResults(): Promise<ResultInput | null>;
  sign(request: SignRequest): void;
  closeStudy(): void;
  /** The figures of other states of the open study, in the order asked for; the review's own stay as they are. */
  figuresOf(
    states: readonly ReviewInputs[],
    options: CallOptions,
  ): Promise<Reply<readonly Findings[]>>;
  /** Stops the long work under way. */
  stop(): void;
}
