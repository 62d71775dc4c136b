import type { PaneCommands } from '../review/pane-commands';
import type { AppParts } from './app-context';

/** Headings of the keys page, in its order. */
export const COMMAND_GROUPS = [
  'open',
  'study',
  'work',
  'look',
  'beats',
  'spans',
  'doubts',
  'notes',
  'room',
  'page',
] as const;
export type CommandGroup = (typeof COMMAND_GROUPS)[number];

export const GROUP_WORDS: Readonly<Record<CommandGroup, string>> = {
  open: 'Open and save',
  study: 'The study',
  work: 'Undo and stop',
  look: 'Move and zoom',
  beats: 'Beats',
  spans: 'Spoiled spans',
  doubts: 'Doubts',
  notes: 'Events and symptoms',
  room: 'Room view',
  page: 'The page',
};

/** Where a command acts: everywhere, only while a study is open, only while its panes are in sight, only in the room view. */
export type CommandContext = 'always' | 'study' | 'panes' | 'room';

/** What commands ask of the room view. */
export interface RoomActs {
  leave(): void;
  /** Brings the trace row below (1) or above (-1) forward. */
  stepRow(way: 1 | -1): void;
  penOn(): boolean;
  togglePen(): void;
  /** Moves the pen by CSS pixels; it draws while it is down. */
  movePen(byX: number, byY: number): void;
  pressPen(): void;
  toggleKeys(): void;
}

/** What commands ask of the page around the stores. */
export interface PageActs {
  chooseFile(): void;
  chooseSession(): void;
  toggleReport(): void;
  focusFindings(): void;
  reportOpen(): boolean;
  /** False while the report view is not part of the page. */
  readonly reportThere: boolean;
  enterRoom(): void;
  /** The room view while it is in sight, else null. */
  readonly room: RoomActs | null;
}

export interface CommandParts extends AppParts {
  readonly panes: PaneCommands;
  readonly page: PageActs;
}

/** One act of the page. The table below feeds keys, tooltips, menus and the keys page. */
export interface Command {
  readonly id: string;
  readonly words: string;
  /** Names of keys as keyName writes them; the first is shown in tooltips. */
  readonly keys: readonly string[];
  readonly group: CommandGroup;
  readonly when: CommandContext;
  /** A held key runs it once and not again. */
  readonly once?: true;
  /** Menu of the top bar it is listed in. */
  readonly menu?: 'open' | 'study' | 'help';
  /** Words with what it would act on now ("Undo move beat"). */
  readonly wordsNow?: (parts: CommandParts) => string;
  /** False while there is nothing for it to act on. */
  readonly ready?: (parts: CommandParts) => boolean;
  /** Why it cannot act now, for its tooltip; '' where that is plain. */
  readonly whyNot?: (parts: CommandParts) => string;
  readonly run: (parts: CommandParts) => void;
}
