import { type OwnKeys, readOwnKeys } from './own-keys';

export const THEME_CHOICES = ['system', 'light', 'dark'] as const;
export type ThemeChoice = (typeof THEME_CHOICES)[number];

/** What a person prefers on this computer; holds nothing of any study. */
export interface Preferences {
  readonly theme: ThemeChoice;
  readonly plainKeys: boolean;
  readonly ownKeys: OwnKeys;
}

const KEY = 'bicadence.preferences';
const DEFAULTS: Preferences = { theme: 'system', plainKeys: true, ownKeys: {} };

/** Preferences as kept; the defaults where nothing, or nothing sensible, is kept or storage is out of reach. */
export function readPreferences(storage: Storage | null): Preferences {
  try {
    const kept: unknown = JSON.parse(storage?.getItem(KEY) ?? 'null');
    if (typeof kept !== 'object' || kept === null) return DEFAULTS;
    const { theme, plainKeys, ownKeys } = kept as Record<string, unknown>;
    return {
      theme: THEME_CHOICES.find((one) => one === theme) ?? DEFAULTS.theme,
      plainKeys: typeof plainKeys === 'boolean' ? plainKeys : DEFAULTS.plainKeys,
      ownKeys: readOwnKeys(ownKeys),
    };
  } catch {
    return DEFAULTS;
  }
}

/** Keeps preferences; does nothing where storage is full or out of reach, since they only save a choice. */
export function writePreferences(storage: Storage | null, preferences: Preferences): void {
  try {
    storage?.setItem(KEY, JSON.stringify(preferences));
  } catch {
    return;
  }
}
