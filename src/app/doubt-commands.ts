import type { DoubtActs } from '../review/doubt-store';
import type { Command, CommandParts } from './command';

const doubtCommand = (
  id: string,
  words: string,
  key: string,
  act: (acts: DoubtActs, parts: CommandParts) => void,
): Command => ({
  id,
  words,
  keys: [key],
  group: 'doubts',
  when: 'panes',
  once: true,
  ready: ({ doubts }) => doubts.getState().acts !== null && doubts.getState().listed !== null,
  run: (parts) => {
    const { acts } = parts.doubts.getState();
    if (acts) act(acts, parts);
  },
});

/** What settles doubts, one key each. */
export const DOUBT_COMMANDS: readonly Command[] = [
  doubtCommand('next-doubt', 'Next doubt', 'D', (acts) => acts.next()),
  doubtCommand('previous-doubt', 'Doubt before', 'P', (acts) => acts.previous()),
  doubtCommand('mend-doubt', 'Doubt: take the proposed mend', 'M', (acts) => acts.mend()),
  doubtCommand('keep-doubt', 'Doubt: keep as it is', 'K', (acts) => acts.keep()),
  doubtCommand('look-alikes', 'Doubt: settle look-alikes together…', 'U', (acts) =>
    acts.lookAlikes(),
  ),
];
