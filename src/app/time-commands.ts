import type { NotedKind } from '../session/note-edits';
import type { Command, CommandParts } from './command';

/** Writes at the cursor, or at the middle of Seconds where the pointer is elsewhere. */
const writeHere =
  (kind: NotedKind) =>
  ({ shell, view }: CommandParts) => {
    const { cursorS, minutes, seconds } = view.getState();
    const near = cursorS !== null && cursorS >= minutes.fromS && cursorS <= minutes.toS;
    const atS = near ? cursorS : (seconds.fromS + seconds.toS) / 2;
    shell.getState().openDialog({ kind: 'notes', here: { kind, atS: Math.round(atS * 10) / 10 } });
  };

/** What is noted and excluded at typed times. */
export const TIME_COMMANDS: readonly Command[] = [
  {
    id: 'phase-borders',
    words: 'Move the borders of phases by keys',
    keys: ['Shift+G'],
    group: 'study',
    when: 'panes',
    menu: 'study',
    ready: ({ session }) => (session.getState().session?.state.phases.length ?? 0) > 0,
    whyNot: () => 'no phase is marked',
    run: ({ panes }) => panes.movePhaseBorders(),
  },
  {
    id: 'spans',
    words: 'Spoiled spans by number…',
    keys: ['Shift+Z'],
    group: 'spans',
    when: 'study',
    menu: 'study',
    run: ({ shell }) => shell.getState().openDialog({ kind: 'spans' }),
  },
  {
    id: 'notes',
    words: 'Events and symptoms…',
    keys: ['Shift+E'],
    group: 'notes',
    when: 'study',
    menu: 'study',
    run: ({ shell }) => shell.getState().openDialog({ kind: 'notes', here: null }),
  },
  {
    id: 'event-here',
    words: 'Write an event here…',
    keys: ['T'],
    group: 'notes',
    when: 'panes',
    run: writeHere('event'),
  },
  {
    id: 'symptom-here',
    words: 'Write a symptom here…',
    keys: ['Y'],
    group: 'notes',
    when: 'panes',
    run: writeHere('symptom'),
  },
];
