import type { Command } from './command';

/** How far the figures can be believed, what the site compares them with, and whether this machine makes them rightly. */
export const EVIDENCE_COMMANDS: readonly Command[] = [
  {
    id: 'evidence',
    words: 'Evidence: how far to believe it…',
    keys: ['Shift+O'],
    group: 'study',
    when: 'study',
    menu: 'study',
    run: ({ shell }) => shell.getState().openDialog({ kind: 'evidence', page: 'planted' }),
  },
  {
    id: 'site-reference',
    words: 'Reference values of the site…',
    keys: ['F8'],
    group: 'study',
    when: 'study',
    menu: 'study',
    run: ({ shell }) => shell.getState().openDialog({ kind: 'site-reference' }),
  },
  {
    id: 'self-check',
    words: 'Self-check of the program on this machine…',
    keys: ['Shift+Y'],
    group: 'page',
    when: 'always',
    menu: 'help',
    run: ({ shell }) => shell.getState().openDialog({ kind: 'evidence', page: 'self-check' }),
  },
];
