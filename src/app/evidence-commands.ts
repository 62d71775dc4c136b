import type { Command } from './command';

/** How far the figures can be believed. */
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
];
