import { stepBookmark } from '../review/bookmarks';
import type { Command, CommandParts } from './command';

const bookmarks = ({ session }: CommandParts) => session.getState().session?.state.bookmarks ?? [];
const some = (parts: CommandParts) => bookmarks(parts).length > 0;
const whyNone = (parts: CommandParts) => (some(parts) ? '' : 'no place is bookmarked yet');

const step = (way: 1 | -1) => (parts: CommandParts) => {
  const words = stepBookmark(parts, way);
  if (words !== null) parts.shell.getState().tell(words);
};

/** Places to return to. */
export const BOOKMARK_COMMANDS: readonly Command[] = [
  {
    id: 'next-bookmark',
    words: 'Next bookmark',
    keys: ['B'],
    group: 'look',
    when: 'panes',
    ready: some,
    whyNot: whyNone,
    run: step(1),
  },
  {
    id: 'previous-bookmark',
    words: 'Bookmark before',
    keys: ['Shift+B'],
    group: 'look',
    when: 'panes',
    ready: some,
    whyNot: whyNone,
    run: step(-1),
  },
  {
    id: 'add-bookmark',
    words: 'Bookmark this place…',
    keys: ['Ctrl+B'],
    group: 'look',
    when: 'panes',
    menu: 'study',
    run: ({ shell }) => shell.getState().openDialog({ kind: 'add-bookmark' }),
  },
  {
    id: 'bookmarks',
    words: 'Bookmarks…',
    keys: ['Alt+B'],
    group: 'look',
    when: 'panes',
    menu: 'study',
    run: ({ shell }) => shell.getState().openDialog({ kind: 'bookmarks' }),
  },
];
