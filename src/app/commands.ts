import { redoableEdit, undoableEdit } from '../session/log';
import type { AppParts } from './app-context';
import { isPlainKey } from './key-names';
import { PANE_COMMANDS } from './pane-bindings';
import { THEME_CHOICES } from './preferences';

/** Headings of the keys page, in its order. */
export const COMMAND_GROUPS = ['open', 'study', 'work', 'look', 'beats', 'spans', 'page'] as const;
export type CommandGroup = (typeof COMMAND_GROUPS)[number];

export const GROUP_WORDS: Readonly<Record<CommandGroup, string>> = {
  open: 'Open and save',
  study: 'The study',
  work: 'Undo and stop',
  look: 'Move and zoom',
  beats: 'Beats',
  spans: 'Spoiled spans',
  page: 'The page',
};

/** Where a command acts: everywhere, or only while a study is on the page. */
export type CommandContext = 'always' | 'study';

/** What commands ask of the page around the stores. */
export interface PageActs {
  chooseFile(): void;
  chooseSession(): void;
  toggleReport(): void;
  focusFindings(): void;
  /** False while the report view is not part of the page. */
  readonly reportThere: boolean;
}

export interface CommandParts extends AppParts {
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
  /** Menu of the top bar it is listed in. */
  readonly menu?: 'open' | 'study' | 'help';
  /** Words with what it would act on now ("Undo move beat"). */
  readonly wordsNow?: (parts: CommandParts) => string;
  /** False while there is nothing for it to act on. */
  readonly ready?: (parts: CommandParts) => boolean;
  readonly run: (parts: CommandParts) => void;
}

const dialog =
  (kind: 'roles' | 'phases' | 'protocol' | 'settings' | 'keys' | 'about' | 'sign') =>
  ({ shell }: CommandParts) =>
    shell.getState().openDialog({ kind });

const undoable = ({ session }: CommandParts) => {
  const open = session.getState().session;
  return open && undoableEdit(open);
};
const redoable = ({ session }: CommandParts) => {
  const open = session.getState().session;
  return open && redoableEdit(open);
};

const OPEN: readonly Command[] = [
  {
    id: 'open-file',
    words: 'Open a file…',
    keys: ['Ctrl+O'],
    group: 'open',
    when: 'always',
    menu: 'open',
    run: ({ page }) => page.chooseFile(),
  },
  {
    id: 'open-session',
    words: 'Open a session file…',
    keys: ['Ctrl+Shift+O'],
    group: 'open',
    when: 'always',
    menu: 'open',
    run: ({ page }) => page.chooseSession(),
  },
  {
    id: 'open-demo',
    words: 'Try the demo study',
    keys: ['Shift+M'],
    group: 'open',
    when: 'always',
    menu: 'open',
    run: ({ controller }) => void controller.openDemo(),
  },
  {
    id: 'close-study',
    words: 'Close the study',
    keys: ['Shift+Q'],
    group: 'open',
    when: 'study',
    menu: 'open',
    run: ({ controller }) => controller.closeStudy(),
  },
  {
    id: 'download-session',
    words: 'Download the session',
    keys: ['Ctrl+S'],
    group: 'open',
    when: 'study',
    menu: 'study',
    run: ({ controller }) => controller.downloadSession(),
  },
  {
    id: 'download-results',
    words: 'Download the results',
    keys: ['Ctrl+Shift+S'],
    group: 'open',
    when: 'study',
    menu: 'study',
    ready: ({ analysis }) => analysis.getState().findings !== null,
    run: ({ controller }) => controller.downloadExports(),
  },
];

const STUDY: readonly Command[] = [
  {
    id: 'roles',
    words: 'Leads and their roles…',
    keys: ['Shift+L'],
    group: 'study',
    when: 'study',
    menu: 'study',
    run: dialog('roles'),
  },
  {
    id: 'phases',
    words: 'Phases and events…',
    keys: ['Shift+P'],
    group: 'study',
    when: 'study',
    menu: 'study',
    run: dialog('phases'),
  },
  {
    id: 'protocol',
    words: 'Meal and protocol…',
    keys: ['Shift+K'],
    group: 'study',
    when: 'study',
    menu: 'study',
    run: dialog('protocol'),
  },
  {
    id: 'settings',
    words: 'Settings of the figures…',
    keys: ['Shift+S'],
    group: 'study',
    when: 'study',
    run: dialog('settings'),
  },
  {
    id: 'detect-again',
    words: 'Find all beats again',
    keys: ['Shift+D'],
    group: 'study',
    when: 'study',
    menu: 'study',
    ready: ({ session, analysis }) =>
      analysis.getState().fileAtHand && session.getState().session?.state.roles.heart != null,
    run: ({ controller }) => controller.detectAgain(),
  },
  {
    id: 'sign',
    words: 'Sign…',
    keys: ['Shift+F'],
    group: 'study',
    when: 'study',
    menu: 'study',
    ready: ({ analysis }) => analysis.getState().findings !== null,
    run: dialog('sign'),
  },
  {
    id: 'report',
    words: 'Report, or back to the review',
    keys: ['Shift+R'],
    group: 'study',
    when: 'study',
    ready: ({ page }) => page.reportThere,
    run: ({ page }) => page.toggleReport(),
  },
];

const WORK: readonly Command[] = [
  {
    id: 'undo',
    words: 'Undo',
    keys: ['Ctrl+Z'],
    group: 'work',
    when: 'study',
    wordsNow: (parts) => `Undo ${undoable(parts)?.name ?? ''}`.trim(),
    ready: (parts) => undoable(parts) !== null,
    run: ({ controller }) => controller.undo(),
  },
  {
    id: 'redo',
    words: 'Redo',
    keys: ['Ctrl+Shift+Z', 'Ctrl+Y'],
    group: 'work',
    when: 'study',
    wordsNow: (parts) => `Redo ${redoable(parts)?.name ?? ''}`.trim(),
    ready: (parts) => redoable(parts) !== null,
    run: ({ controller }) => controller.redo(),
  },
  {
    id: 'stop',
    words: 'Stop the work under way',
    keys: ['Shift+X'],
    group: 'work',
    when: 'always',
    ready: ({ analysis }) => analysis.getState().progress !== null,
    run: ({ controller }) => controller.stop(),
  },
  {
    id: 'reviewer',
    words: 'Say who reviews…',
    keys: ['Shift+N'],
    group: 'work',
    when: 'study',
    run: ({ shell }) => shell.getState().openDialog({ kind: 'reviewer', act: () => undefined }),
  },
];

const PAGE: readonly Command[] = [
  {
    id: 'hide-identity',
    words: 'Hide or show who it is',
    keys: ['Shift+I'],
    group: 'page',
    when: 'study',
    run: ({ view }) => view.setState((now) => ({ identityHidden: !now.identityHidden })),
  },
  {
    id: 'findings',
    words: 'Go to the findings',
    keys: ['F6'],
    group: 'page',
    when: 'study',
    run: ({ page }) => page.focusFindings(),
  },
  {
    id: 'theme',
    words: 'Change the theme: system, light, dark',
    keys: ['Shift+T'],
    group: 'page',
    when: 'always',
    menu: 'help',
    run: ({ shell }) => {
      const { theme, setTheme, say } = shell.getState();
      const next = THEME_CHOICES[(THEME_CHOICES.indexOf(theme) + 1) % THEME_CHOICES.length];
      setTheme(next);
      say(next === 'system' ? 'Theme as the system has it' : `Theme: ${next}`);
    },
  },
  {
    id: 'keys',
    words: 'Keys…',
    keys: ['?', 'F1'],
    group: 'page',
    when: 'always',
    menu: 'help',
    run: dialog('keys'),
  },
  {
    id: 'about',
    words: 'About Bicadence…',
    keys: ['Shift+A'],
    group: 'page',
    when: 'always',
    menu: 'help',
    run: dialog('about'),
  },
];

/** Every act of the page. */
export const COMMANDS: readonly Command[] = [...OPEN, ...STUDY, ...WORK, ...PANE_COMMANDS, ...PAGE];

/** The command of an id. Throws where there is none. */
export function commandOf(id: string): Command {
  const found = COMMANDS.find((one) => one.id === id);
  if (!found) throw new Error(`no command ${id}`);
  return found;
}

/** True where a command can act now. */
export function canRun(command: Command, parts: CommandParts): boolean {
  const studyThere = parts.session.getState().session !== null;
  return (command.when === 'always' || studyThere) && (command.ready?.(parts) ?? true);
}

/** The command a key stands for now; null where it stands for none, or is a plain key while those are off. */
export function commandForKey(name: string, parts: CommandParts): Command | null {
  if (isPlainKey(name) && !parts.shell.getState().plainKeys) return null;
  return COMMANDS.find((one) => one.keys.includes(name) && canRun(one, parts)) ?? null;
}
