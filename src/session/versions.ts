import { SESSION_VERSION } from './document';

/** One step from a version of the session document to the next; `up` gets a document that its version's schema allowed. */
export interface Migration {
  readonly from: number;
  readonly name: string;
  readonly up: (document: Readonly<Record<string, unknown>>) => Readonly<Record<string, unknown>>;
}

/** A value with every settings object in it, wherever it stands, given settings it did without saying so. */
function withSettings(value: unknown, said: Readonly<Record<string, unknown>>): unknown {
  if (Array.isArray(value)) return value.map((one) => withSettings(one, said));
  if (typeof value !== 'object' || value === null) return value;
  const entries = Object.entries(value).map(([key, one]) => [key, withSettings(one, said)]);
  return { ...('slowRoute' in value ? said : {}), ...Object.fromEntries(entries) };
}

const inEveryPart = (
  document: Readonly<Record<string, unknown>>,
  said: Readonly<Record<string, unknown>>,
) =>
  Object.fromEntries(Object.entries(document).map(([key, one]) => [key, withSettings(one, said)]));

/** Version 1 drew the band as it is. */
const DRAWING_OF_1 = { slowGain: 'even', breathingOut: 'never' };
/** What no session before version 4 used. */
const BEAT_AVERAGE_OF_3 = { beatAverage: { beforeMs: 300, afterMs: 500, beats: 60 } };

/** What version 2 kept room for beside the state. */
const NO_LISTS = { symptoms: [], doubts: [], bookmarks: [] };

/** The steps from version 1 on, one a version, without gaps. */
export const MIGRATIONS: readonly Migration[] = [
  {
    from: 1,
    name: 'settings say how the slow wave is drawn',
    up: (document) => inEveryPart(document, DRAWING_OF_1),
  },
  {
    from: 2,
    name: 'symptoms, settled doubts and bookmarks are part of the state',
    up: (document) => ({ ...document, start: { ...NO_LISTS, ...Object(document.start) } }),
  },
  {
    from: 3,
    name: 'settings say how average heartbeats are made',
    up: (document) => inEveryPart(document, BEAT_AVERAGE_OF_3),
  },
];

/**
 * A document brought from `version` to the one this program writes, through every step between. Throws Error where a step is
 * missing.
 */
export function migrate(
  document: Readonly<Record<string, unknown>>,
  version: number,
  migrations: readonly Migration[] = MIGRATIONS,
  target: number = SESSION_VERSION,
): Readonly<Record<string, unknown>> {
  let current = document;
  for (let from = version; from < target; from += 1) {
    const step = migrations.find((one) => one.from === from);
    if (!step) throw new Error(`no step leads on from version ${from}`);
    current = { ...step.up(current), version: from + 1 };
  }
  return current;
}
