import { asWork } from '../review/idle';
import type { Command, CommandParts } from './command';

/** True while another session of the open study has been chosen to compare with. */
const comparing = ({ shell, session }: CommandParts) => {
  const compared = shell.getState().compared?.session.state.study.quickKey;
  return compared !== undefined && compared === session.getState().session?.state.study.quickKey;
};

const step = (by: 1 | -1) => (parts: CommandParts) =>
  void asWork(import('./comparing').then(({ stepDifference }) => stepDifference(parts, by)));

const stepCommand = (id: string, words: string, key: string, by: 1 | -1): Command => ({
  id,
  words,
  keys: [key],
  group: 'study',
  when: 'panes',
  ready: comparing,
  whyNot: () => 'no other session is being compared',
  run: step(by),
});

/** What was done to the study, and by whom. */
export const HISTORY_COMMANDS: readonly Command[] = [
  {
    id: 'log',
    words: 'Log: who changed what…',
    keys: ['Shift+H'],
    group: 'study',
    when: 'study',
    menu: 'study',
    run: ({ shell }) => shell.getState().openDialog({ kind: 'log' }),
  },
  {
    id: 'compare',
    words: 'Compare with another session…',
    keys: ['Shift+C'],
    group: 'study',
    when: 'study',
    menu: 'study',
    run: ({ shell }) => shell.getState().openDialog({ kind: 'compare' }),
  },
  stepCommand('next-difference', 'Next difference of the compared sessions', 'Shift+J', 1),
  stepCommand('previous-difference', 'Difference before, of the compared sessions', 'Shift+U', -1),
];
