import type { Command } from './command';
import { isPlainKey, keyWords } from './key-names';

/** Keys a person has given to commands on this computer: a command's id and the one key it has instead of its own. */
export type OwnKeys = Readonly<Record<string, string>>;

/** What decides which keys act: the person's own ones, and whether keys of a single character act at all. */
export interface KeyChoices {
  readonly ownKeys: OwnKeys;
  readonly plainKeys: boolean;
}

/** The keys of a command: the person's own one, else those of the table that no other command was given. */
export function keysOf({ id, keys }: Command, ownKeys: OwnKeys): readonly string[] {
  if (Object.hasOwn(ownKeys, id)) return [ownKeys[id]];
  const taken = Object.values(ownKeys);
  return taken.length === 0 ? keys : keys.filter((key) => !taken.includes(key));
}

/** Those of a command's keys that act now. */
export function actingKeys(command: Command, { ownKeys, plainKeys }: KeyChoices) {
  return keysOf(command, ownKeys).filter((key) => plainKeys || !isPlainKey(key));
}

/** The key that is shown beside a command, in words; '' where none acts. */
export function shownKey(command: Command, choices: KeyChoices): string {
  const [first] = actingKeys(command, choices);
  return first === undefined ? '' : keyWords(first);
}

/** Kept by browsers for tabs, windows, print, search, copies, or by the page for moving about in it. */
const KEPT_KEYS = new Set(
  [
    'Tab Shift+Tab Enter Space Escape F5 F11 F12 Alt+ArrowLeft Alt+ArrowRight Alt+F4 Ctrl+Tab',
    'Ctrl+T Ctrl+N Ctrl+W Ctrl+R Ctrl+L Ctrl+F Ctrl+P Ctrl+D Ctrl+H Ctrl+J Ctrl+C Ctrl+V Ctrl+X',
    'Ctrl+Shift+T Ctrl+Shift+N Ctrl+Shift+W Ctrl+Shift+R Ctrl+Shift+Tab Ctrl+Shift+I',
  ].flatMap((row) => row.split(' ')),
);

/**
 * Why a key cannot be given to a command: what has it, and what to do; null where it can. What the table lets share a key never
 * acts in one place.
 */
export function keyFault(
  command: Command,
  key: string,
  { commands, ownKeys }: { readonly commands: readonly Command[]; readonly ownKeys: OwnKeys },
): string | null {
  const words = keyWords(key);
  if (KEPT_KEYS.has(key) && !command.keys.includes(key))
    return `${words} is kept by the browser or for moving about the page. Choose another key.`;
  const shared = (one: Command) => command.keys.includes(key) && one.keys.includes(key);
  const holder = commands.find(
    (one) => one !== command && !shared(one) && keysOf(one, ownKeys).includes(key),
  );
  return holder
    ? `${words} is the key of “${holder.words}”. Choose another key, or give that one another first.`
    : null;
}

/** Own keys as kept, without what makes no sense. */
export function readOwnKeys(kept: unknown): OwnKeys {
  if (typeof kept !== 'object' || kept === null) return {};
  return Object.fromEntries(
    Object.entries(kept).filter(([, key]) => typeof key === 'string' && key !== ''),
  );
}
