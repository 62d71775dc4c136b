import { DOUBT_KINDS, type SettledDoubt } from '../recording/doubt';
import type { Roles } from '../recording/roles';
import type { Interval } from '../recording/span';
import type { Hertz } from '../units/rate';
import { ticksToSeconds } from '../units/ticks';
import { invert } from './apply-change';
import { allBeatsDifference, beatDifferences, tickWords } from './beat-differences';
import { type Difference, differenceWords, placeOfAll, quoted } from './difference';
import type { Change, Edit, LogLine, ReplacedField, Session } from './document';
import { fieldDifferences } from './field-differences';
import { spanDifferences } from './span-differences';

/** What a line of the log is about; the kinds a person may choose between. */
export const LOG_KINDS = [
  'beats',
  'doubts',
  'spans',
  'phases',
  'leads',
  'words',
  'signatures',
] as const;
export type LogKind = (typeof LOG_KINDS)[number];

export const LOG_KIND_WORDS: Readonly<Record<LogKind, string>> = {
  beats: 'beats',
  doubts: 'doubts',
  spans: 'spoiled spans',
  phases: 'phases, events, symptoms',
  leads: 'leads and settings',
  words: 'protocol, remarks, bookmarks',
  signatures: 'signatures',
};

const FIELD_KINDS: Readonly<Record<ReplacedField, LogKind>> = {
  protocol: 'words',
  roles: 'leads',
  leadChoice: 'leads',
  phases: 'phases',
  settings: 'leads',
  events: 'phases',
  symptoms: 'phases',
  bookmarks: 'words',
  notes: 'words',
  conclusion: 'words',
};

/** One line of the log, ready to be put in words. */
export interface LogEntry {
  readonly line: LogLine;
  /** The edit the line made, took back or made again, with the number of the line that made it first. */
  readonly edit: Edit;
  readonly of: number;
  /** What the line did to the state. */
  readonly changes: readonly Change[];
  readonly kinds: readonly LogKind[];
  /** Rate of the ticks in it, that of the heart lead before the line; null where it is not known. */
  readonly rateHz: Hertz | null;
}

/** What lines are put in words with. */
interface WordsOf {
  /** Rate of the heart lead of some roles; null where there is none or no recording is at hand. */
  readonly rateHzOf: (roles: Roles) => Hertz | null;
}

/** The lines of a log, oldest first, each with the edit it is about; O(lines) and no words yet. */
export function logEntries({ start, log }: Session, { rateHzOf }: WordsOf): readonly LogEntry[] {
  let rateHz = rateHzOf(start.roles);
  return log.map((line): LogEntry => {
    const of = line.act.kind === 'edit' ? line.n : line.act.of;
    const made = log[of - 1]?.act;
    if (made?.kind !== 'edit') throw new Error(`line ${line.n} is about no edit`);
    const { edit } = made;
    const back = line.act.kind === 'undo';
    const changes = back ? edit.changes.map(invert).reverse() : edit.changes;
    const entry = { line, edit, of, changes, kinds: kindsOf(changes), rateHz };
    for (const change of changes)
      if (change.kind === 'field' && change.field === 'roles') rateHz = rateHzOf(change.after);
    return entry;
  });
}

function kindsOf(changes: readonly Change[]): readonly LogKind[] {
  return [...new Set(changes.map(kindOf))];
}

function kindOf(change: Change): LogKind {
  switch (change.kind) {
    case 'beats':
    case 'all-beats':
      return 'beats';
    case 'spans':
    case 'doubts':
      return change.kind;
    case 'field':
      return FIELD_KINDS[change.field];
    case 'sign':
      return 'signatures';
    case 'study':
      return 'words';
  }
}

/** What a line did, in words, and where. */
export interface LogWords {
  readonly act: string;
  /** From what to what, a sentence each. */
  readonly changes: readonly string[];
  /** Where the panes show it; null where it has no place. */
  readonly place: Interval | null;
}

/** The act of a line in words: "move beat at 0:00:12.0", "undo of edit 4: move beat at 0:00:12.0". */
export const actWords = ({ line, edit, of }: LogEntry): string =>
  line.act.kind === 'edit' ? edit.name : `${line.act.kind} of edit ${of}: ${edit.name}`;

/** One line of the log in words; `labels` are those of the study's channels. */
export function logWords(entry: LogEntry, labels: readonly string[]): LogWords {
  const differences = entry.changes.flatMap((change) =>
    changeDifferences(change, entry.rateHz, labels),
  );
  return {
    act: actWords(entry),
    changes: differences.map(differenceWords),
    place: placeOfAll(differences),
  };
}

function changeDifferences(
  change: Change,
  rateHz: Hertz | null,
  labels: readonly string[],
): readonly Difference[] {
  switch (change.kind) {
    case 'beats':
      return beatDifferences(change.removed, change.added, rateHz);
    case 'all-beats':
      return [allBeatsDifference(change.before, change.after)];
    case 'spans':
      return spanDifferences(change.removed, change.added, labels);
    case 'doubts':
      return doubtDifferences(change.removed, change.added, rateHz);
    case 'field':
      return fieldDifferences(change, labels);
    case 'sign':
      return [signatureDifference(change.signature)];
    case 'study':
      return [
        {
          what: 'code of the study',
          from: quoted(change.before.code),
          to: quoted(change.after.code),
          place: null,
        },
      ];
  }
}

/** More doubts than these are told together. */
const MOST_DOUBTS = 3;

function doubtDifferences(
  removed: readonly SettledDoubt[],
  added: readonly SettledDoubt[],
  rateHz: Hertz | null,
): readonly Difference[] {
  const sides = (doubt: SettledDoubt, opened: boolean) =>
    opened ? { from: doubt.ending, to: 'open' } : { from: 'open', to: doubt.ending };
  return [
    ...settledWords(removed, rateHz, (one) => sides(one, true)),
    ...settledWords(added, rateHz, (one) => sides(one, false)),
  ];
}

/** " (early beat)": a doubt's id begins with its kind; '' where it does not. */
function kindWords({ id }: SettledDoubt): string {
  const kind = DOUBT_KINDS.find((one) => id.startsWith(one));
  return kind ? ` (${kind.replaceAll('-', ' ')})` : '';
}

function settledWords(
  doubts: readonly SettledDoubt[],
  rateHz: Hertz | null,
  sides: (doubt: SettledDoubt) => Pick<Difference, 'from' | 'to'>,
): readonly Difference[] {
  if (doubts.length > MOST_DOUBTS)
    return [{ what: `${doubts.length} doubts`, ...sides(doubts[0]), place: null }];
  return doubts.map((doubt) => {
    const atS = doubt.tick === null || rateHz === null ? null : ticksToSeconds(doubt.tick, rateHz);
    return {
      what: `doubt${kindWords(doubt)}${doubt.tick === null ? '' : ` at beat ${tickWords(doubt.tick, rateHz)}`}`,
      ...sides(doubt),
      place: atS === null ? null : { fromS: atS, toS: atS },
    };
  });
}

function signatureDifference(
  signature: Extract<Change, { readonly kind: 'sign' }>['signature'],
): Difference {
  const { meaning, name, edit, reason } = signature;
  const why = reason === '' ? '' : `, because ${quoted(reason)}`;
  const to = `${meaning} by ${name}, figures of edit ${edit}${why}`;
  return { what: 'signature', from: null, to, place: null };
}
