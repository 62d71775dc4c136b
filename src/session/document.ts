import type { Beat, BeatList } from '../recording/beat';
import type { SettledDoubt } from '../recording/doubt';
import type { Findings } from '../recording/findings';
import type { Phase } from '../recording/phase';
import type { Protocol } from '../recording/protocol';
import type { Roles } from '../recording/roles';
import type { Settings } from '../recording/settings';
import type { Interval, Span } from '../recording/span';

/** Version of the session document this program writes; older ones are migrated by named steps. */
export const SESSION_VERSION = 4;

/** The study a session belongs to; names are not kept. */
export interface StudyIdentity {
  /** Code the study is known by: from the header, or asked for. */
  readonly code: string;
  /** SHA-256 of the file in hex; null until it is known. */
  readonly sha256: string | null;
  /** Size and SHA-256 of header, first and last MB: finds the study again at once. */
  readonly quickKey: string;
  readonly sizeBytes: number;
  /** Local date and time as the header has it, or null. */
  readonly start: string | null;
  readonly durationS: number;
  readonly channelLabels: readonly string[];
  readonly invented: boolean;
}

export interface TimedNote {
  readonly id: number;
  readonly atS: number;
  readonly text: string;
}

/** A complaint at a time, from 0 (none) to 10 (the worst there can be) as the person said it. */
export interface Symptom {
  readonly id: number;
  readonly atS: number;
  readonly text: string;
  readonly score: number;
}

/** A place to return to: where both panes looked, which rows were shown, and why. */
export interface Bookmark {
  readonly id: number;
  readonly minutes: Interval;
  readonly seconds: Interval;
  /** Which rows were shown: `reported` for those of the reported lead alone; empty where all were. */
  readonly rows: readonly string[];
  readonly note: string;
}

/** One finished signing: the figures as they were. */
export interface Signature {
  readonly meaning: 'prepared' | 'read' | 'amended';
  readonly name: string;
  readonly atUtc: string;
  readonly edit: number;
  readonly program: string;
  readonly sha256: string | null;
  readonly reason: string;
  readonly settings: Settings;
  readonly findings: Findings;
  readonly notes: string;
  readonly conclusion: string;
}

/** What reviewers made of a study. Never changed in place: each edit makes a new one. */
export interface SessionState {
  readonly study: StudyIdentity;
  readonly protocol: Protocol;
  readonly roles: Roles;
  /** Why the reported lead is the reported one; a change is logged with a reason. */
  readonly leadChoice: string;
  readonly phases: readonly Phase[];
  readonly settings: Settings;
  readonly beats: BeatList;
  readonly spans: readonly Span[];
  readonly events: readonly TimedNote[];
  readonly symptoms: readonly Symptom[];
  /** Doubts that are open no more, in the order of their ids. */
  readonly doubts: readonly SettledDoubt[];
  readonly bookmarks: readonly Bookmark[];
  /** Reviewer's own words: remarks and conclusion of the report. */
  readonly notes: string;
  readonly conclusion: string;
  readonly signed: readonly Signature[];
}

/** Fields that an edit replaces as a whole. */
export type ReplacedField =
  | 'protocol'
  | 'roles'
  | 'leadChoice'
  | 'phases'
  | 'settings'
  | 'events'
  | 'symptoms'
  | 'bookmarks'
  | 'notes'
  | 'conclusion';

/** A change with what was there before, so that it can be taken back and replayed. */
export type Change =
  | { readonly kind: 'beats'; readonly removed: readonly Beat[]; readonly added: readonly Beat[] }
  /** All beats replaced at once: first detection, detection again after the heart lead or its route changed. */
  | { readonly kind: 'all-beats'; readonly before: BeatList; readonly after: BeatList }
  | { readonly kind: 'spans'; readonly removed: readonly Span[]; readonly added: readonly Span[] }
  | {
      readonly kind: 'doubts';
      readonly removed: readonly SettledDoubt[];
      readonly added: readonly SettledDoubt[];
    }
  | {
      readonly [F in ReplacedField]: {
        readonly kind: 'field';
        readonly field: F;
        readonly before: SessionState[F];
        readonly after: SessionState[F];
      };
    }[ReplacedField]
  | { readonly kind: 'sign'; readonly signature: Signature }
  | { readonly kind: 'study'; readonly before: StudyIdentity; readonly after: StudyIdentity };

/** One gesture: one undo step with a name, made of one or more changes applied in order. */
export interface Edit {
  /** What the person did, as undo shows it: "move beat", "exclude 0:18:00-0:18:40". */
  readonly name: string;
  readonly changes: readonly Change[];
}

/** One line of the append-only log; `n` counts from 1 without gaps and is the edit number figures carry. */
export interface LogLine {
  readonly n: number;
  readonly atUtc: string;
  readonly reviewer: string;
  readonly act:
    | { readonly kind: 'edit'; readonly edit: Edit }
    | { readonly kind: 'undo'; readonly of: number }
    | { readonly kind: 'redo'; readonly of: number };
}

/** A session as kept: the state it began with and everything done since. */
export interface Session {
  readonly start: SessionState;
  readonly log: readonly LogLine[];
  readonly state: SessionState;
}
