/** What is known of a kept session without reading it; no names of persons. */
export interface KeptHead {
  readonly quickKey: string;
  /** Version of the document. */
  readonly version: number;
  /** Which opening of the study writes: another tab that opens it takes over. */
  readonly writer: string;
  readonly code: string;
  readonly start: string | null;
  readonly durationS: number;
  readonly invented: boolean;
  /** Number of the last line of the log. */
  readonly edits: number;
  /** Text of that line; '' for an empty log. */
  readonly lastLine: string;
  readonly savedAtUtc: string;
}

export interface KeptLineRow {
  readonly n: number;
  readonly text: string;
}

/** A snapshot and the lines of the log that came after it. */
export interface KeptRows {
  readonly head: KeptHead;
  readonly snapshot: { readonly n: number; readonly text: string };
  /** In the order of their numbers. */
  readonly lines: readonly KeptLineRow[];
}

/** One writing, done as a whole or not at all. */
export interface KeptWrite {
  readonly head: KeptHead;
  /** The session's document through `head.edits`; the lines that it holds leave the journal. Null: journal only. */
  readonly snapshot: string | null;
  readonly lines: readonly KeptLineRow[];
  /** Whether this may be written over what is there. */
  readonly allowed: (there: KeptHead | null) => boolean;
}

/** A durable store of snapshots and journals. Calls reject with what the store throws. */
export interface KeptStore {
  heads(): Promise<readonly KeptHead[]>;
  read(quickKey: string): Promise<KeptRows | null>;
  /** True once it is on disk; false where it was not allowed, and nothing was changed. */
  write(what: KeptWrite): Promise<boolean>;
  forget(quickKey: string): Promise<void>;
}
