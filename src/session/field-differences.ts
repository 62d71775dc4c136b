import { type Lead, leadName } from '../recording/lead';
import type { Phase } from '../recording/phase';
import type { Protocol } from '../recording/protocol';
import type { Roles } from '../recording/roles';
import type { Interval } from '../recording/span';
import { formatClock } from '../units/time';
import { type Difference, listDifferences, quoted, stretchOf } from './difference';
import type { Bookmark, Change, Symptom, TimedNote } from './document';
import { settingDifferences } from './setting-differences';

const PROTOCOL_WORDS: Readonly<Record<keyof Protocol, string>> = {
  meal: 'meal',
  kcal: 'kcal of the meal',
  ml: 'ml of the meal',
  minutes: 'minutes of eating',
  partEatenPercent: 'percent eaten',
  fastHours: 'hours of fasting',
  posture: 'posture',
  medicines: 'medicines',
  implants: 'implants',
};

const typedWords = (value: string | number | null): string =>
  typeof value === 'string' ? quoted(value) : value === null ? 'not stated' : String(value);

function protocolDifferences(before: Protocol, after: Protocol): readonly Difference[] {
  const keys = Object.keys(PROTOCOL_WORDS) as (keyof Protocol)[];
  return keys
    .filter((key) => before[key] !== after[key])
    .map((key) => ({
      what: PROTOCOL_WORDS[key],
      from: typedWords(before[key]),
      to: typedWords(after[key]),
      place: null,
    }));
}

function roleDifferences(
  before: Roles,
  after: Roles,
  labels: readonly string[],
): readonly Difference[] {
  const channels = labels.map((label) => ({ label }));
  const nameOf = (lead: Lead | null | undefined) => (lead ? leadName(lead, channels) : 'none');
  const rows: readonly (readonly [string, (roles: Roles) => string])[] = [
    ['slow-wave leads', ({ slow }) => slow.map(nameOf).join(', ')],
    ['reported lead', ({ slow, reported }) => nameOf(slow[reported])],
    ['heart lead', ({ heart }) => nameOf(heart)],
    ['breathing lead', ({ breath }) => nameOf(breath)],
  ];
  return rows.flatMap(([what, words]) => {
    const [from, to] = [words(before), words(after)];
    return from === to ? [] : [{ what, from, to, place: null }];
  });
}

const PHASE_ROWS = {
  key: ({ name }: Phase) => name,
  what: ({ name }: Phase) => `phase ${name}`,
  words: stretchOf,
  place: ({ fromS, toS }: Phase) => ({ fromS, toS }),
  moved: movedBorders,
};

/** From the first to the last time that a border of a phase was moved from or to. */
function movedBorders(was: Phase, now: Phase): Interval {
  const times = [
    ...(was.fromS === now.fromS ? [] : [was.fromS, now.fromS]),
    ...(was.toS === now.toS ? [] : [was.toS, now.toS]),
  ];
  return { fromS: Math.min(...times), toS: Math.max(...times) };
}

const idOf = ({ id }: { readonly id: number }) => id;
const momentOf = ({ atS }: TimedNote) => ({ fromS: atS, toS: atS });
const noted = ({ atS, text }: TimedNote) => `${formatClock(atS)} ${quoted(text)}`;

const EVENT_ROWS = { key: idOf, what: () => 'event', words: noted, place: momentOf };

const SYMPTOM_ROWS = {
  key: idOf,
  what: () => 'symptom',
  words: (row: Symptom) => `${noted(row)}, ${row.score} of 10`,
  place: momentOf,
};

const BOOKMARK_ROWS = {
  key: idOf,
  what: () => 'bookmark',
  words: ({ seconds, note }: Bookmark) => `${stretchOf(seconds)} ${quoted(note)}`,
  place: ({ seconds }: Bookmark) => seconds,
};

const textDifference = (what: string, before: string, after: string): readonly Difference[] =>
  before === after ? [] : [{ what, from: quoted(before), to: quoted(after), place: null }];

/** A field replaced as a whole. */
export type FieldChange = Extract<Change, { readonly kind: 'field' }>;

/** What a replaced field holds differently before and after, in words; `labels` are those of the study's channels. */
export function fieldDifferences(
  change: FieldChange,
  labels: readonly string[],
): readonly Difference[] {
  switch (change.field) {
    case 'protocol':
      return protocolDifferences(change.before, change.after);
    case 'roles':
      return roleDifferences(change.before, change.after, labels);
    case 'leadChoice':
      return textDifference('why that lead', change.before, change.after);
    case 'phases':
      return listDifferences(change.before, change.after, PHASE_ROWS);
    case 'settings':
      return settingDifferences(change.before, change.after);
    case 'events':
      return listDifferences(change.before, change.after, EVENT_ROWS);
    case 'symptoms':
      return listDifferences(change.before, change.after, SYMPTOM_ROWS);
    case 'bookmarks':
      return listDifferences(change.before, change.after, BOOKMARK_ROWS);
    case 'notes':
      return textDifference('remarks', change.before, change.after);
    case 'conclusion':
      return textDifference('conclusion', change.before, change.after);
  }
}
