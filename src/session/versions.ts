import { SESSION_VERSION } from './document';

/** One step from a version of the session document to the next; `up` gets a document that its version's schema allowed. */
export interface Migration {
  readonly from: number;
  readonly name: string;
  readonly up: (document: Readonly<Record<string, unknown>>) => Readonly<Record<string, unknown>>;
}

/** A value with every settings object in it, wherever it stands, given what version 1 did without saying so. */
function withDrawing(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(withDrawing);
  if (typeof value !== 'object' || value === null) return value;
  const entries = Object.entries(value).map(([key, one]) => [key, withDrawing(one)] as const);
  const said = 'slowRoute' in value ? { slowGain: 'even', breathingOut: 'never' } : {};
  return { ...said, ...Object.fromEntries(entries) };
}

/** What version 2 kept room for beside the state. */
const NO_LISTS = { symptoms: [], doubts: [], bookmarks: [] };

/** The steps from version 1 on, one a version, without gaps. */
export const MIGRATIONS: readonly Migration[] = [
  {
    from: 1,
    name: 'settings say how the slow wave is drawn',
    up: (document) =>
      Object.fromEntries(Object.entries(document).map(([key, one]) => [key, withDrawing(one)])),
  },
  {
    from: 2,
    name: 'symptoms, settled doubts and bookmarks are part of the state',
    up: (document) => ({ ...document, start: { ...NO_LISTS, ...Object(document.start) } }),
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
