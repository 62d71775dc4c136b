import { redoableEdit, undoableEdit } from '../session/log';
import type { Command, CommandParts } from './command';
import { editNameShown } from './edit-name';
import { THEME_CHOICES } from './preferences';

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

const named = ({ view }: CommandParts, edit: { readonly name: string } | null): string =>
  edit ? editNameShown(edit.name, view.getState().identityHidden) : '';

const figuresThere = ({ analysis }: CommandParts) => analysis.getState().findings !== null;
const figuresWhyNot = (parts: CommandParts) =>
  figuresThere(parts) ? '' : 'the figures are not there yet';

/** Ways in and out. */
export const OPEN_COMMANDS: readonly Command[] = [
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
    words: 'Download the results…',
    keys: ['Ctrl+Shift+S'],
    group: 'open',
    when: 'study',
    menu: 'study',
    ready: figuresThere,
    whyNot: figuresWhyNot,
    run: ({ shell }) => shell.getState().openDialog({ kind: 'results' }),
  },
];

/** What belongs to the study as a whole. */
export const STUDY_COMMANDS: readonly Command[] = [
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
    words: 'Phases…',
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
    ready: figuresThere,
    whyNot: figuresWhyNot,
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

/** Undo, redo, stop, reviewer. */
export const WORK_COMMANDS: readonly Command[] = [
  {
    id: 'undo',
    words: 'Undo',
    keys: ['Ctrl+Z'],
    group: 'work',
    when: 'study',
    wordsNow: (parts) => `Undo ${named(parts, undoable(parts))}`.trim(),
    ready: (parts) => undoable(parts) !== null,
    run: ({ controller }) => controller.undo(),
  },
  {
    id: 'redo',
    words: 'Redo',
    keys: ['Ctrl+Shift+Z', 'Ctrl+Y'],
    group: 'work',
    when: 'study',
    wordsNow: (parts) => `Redo ${named(parts, redoable(parts))}`.trim(),
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

/** The page itself. */
export const PAGE_COMMANDS: readonly Command[] = [
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
    when: 'panes',
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
      const { theme, setTheme, tell } = shell.getState();
      const next = THEME_CHOICES[(THEME_CHOICES.indexOf(theme) + 1) % THEME_CHOICES.length];
      setTheme(next);
      tell(next === 'system' ? 'Theme as the system has it' : `Theme: ${next}`);
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
