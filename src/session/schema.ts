import * as v from 'valibot';
import { BEAT_CLASSES, BEAT_ORIGINS } from '../recording/beat';
import { SESSION_VERSION } from './document';
import {
  bookmarks,
  events,
  phases,
  protocol,
  roles,
  settings,
  settledDoubt,
  signature,
  span,
  study,
  symptoms,
  text,
  whole,
} from './schema-parts';

/** What a session file calls itself. */
export const SESSION_FORMAT = 'bicadence-session';

const list = <S extends v.GenericSchema>(item: S) => v.pipe(v.array(item), v.readonly());
const beat = v.pipe(
  v.strictTuple([whole, v.picklist(BEAT_CLASSES), v.picklist(BEAT_ORIGINS)]),
  v.readonly(),
);
const runs = list(v.pipe(v.strictTuple([text, whole]), v.readonly()));

const beats = v.strictObject({
  ticks: list(whole),
  classes: runs,
  origins: runs,
});

const replaced = <F extends string, S extends v.GenericSchema>(field: F, value: S) =>
  v.strictObject({
    kind: v.literal('field'),
    field: v.literal(field),
    before: value,
    after: value,
  });

const change = v.variant('kind', [
  v.strictObject({ kind: v.literal('beats'), removed: list(beat), added: list(beat) }),
  v.strictObject({ kind: v.literal('all-beats'), before: beats, after: beats }),
  v.strictObject({ kind: v.literal('spans'), removed: list(span), added: list(span) }),
  v.strictObject({
    kind: v.literal('doubts'),
    removed: list(settledDoubt),
    added: list(settledDoubt),
  }),
  v.variant('field', [
    replaced('protocol', protocol),
    replaced('roles', roles),
    replaced('leadChoice', text),
    replaced('phases', phases),
    replaced('settings', settings),
    replaced('events', events),
    replaced('symptoms', symptoms),
    replaced('bookmarks', bookmarks),
    replaced('notes', text),
    replaced('conclusion', text),
  ]),
  v.strictObject({ kind: v.literal('sign'), signature }),
  v.strictObject({ kind: v.literal('study'), before: study, after: study }),
]);

/** One line of the log as kept. */
export const keptLine = v.strictObject({
  n: whole,
  atUtc: text,
  reviewer: text,
  act: v.variant('kind', [
    v.strictObject({
      kind: v.literal('edit'),
      edit: v.strictObject({ name: text, changes: list(change) }),
    }),
    v.strictObject({ kind: v.literal('undo'), of: whole }),
    v.strictObject({ kind: v.literal('redo'), of: whole }),
  ]),
});

/** The parts of a state that undo and redo move between. */
const stateParts = {
  study,
  protocol,
  events,
  symptoms,
  doubts: list(settledDoubt),
  bookmarks,
  roles,
  leadChoice: text,
  phases,
  settings,
  beats,
  spans: list(span),
  notes: text,
  conclusion: text,
  signed: list(signature),
};

/**
 * The session document: the state as it is, the state it began with (`start`), and the log that leads from one to
 * the other. `preparedBy` and `readBy` repeat the last names signed, for who reads the file with other tools.
 */
export const sessionDocument = v.strictObject({
  format: v.literal(SESSION_FORMAT),
  version: v.literal(SESSION_VERSION),
  program: text,
  ...stateParts,
  preparedBy: text,
  readBy: text,
  start: v.strictObject(stateParts),
  log: list(keptLine),
});

export type SessionDocument = v.InferOutput<typeof sessionDocument>;
export type KeptState = SessionDocument['start'];
export type KeptLine = v.InferOutput<typeof keptLine>;
export type KeptChange = v.InferOutput<typeof change>;
export type KeptBeat = v.InferOutput<typeof beat>;
