import { BEAT_CLASSES, type BeatClass } from '../recording/beat';
import type { PaneCommands } from '../review/pane-commands';
import type { Command, CommandGroup, CommandParts } from './command';

const paneCommand = (
  id: string,
  words: string,
  keys: readonly string[],
  group: CommandGroup,
  act: (panes: PaneCommands, parts: CommandParts) => void,
  ready?: Command['ready'],
): Command => ({
  id,
  words,
  keys,
  group,
  when: 'panes',
  run: (parts) => act(parts.panes, parts),
  ...(ready ? { ready } : {}),
});

const selected =
  (...kinds: readonly string[]) =>
  ({ view }: CommandParts) =>
    kinds.includes(view.getState().selection.kind);
const beatsSelected = selected('beats');
const spanSelected = selected('span');

const LOOK: readonly Command[] = [
  paneCommand('seconds-left', 'Seconds: earlier', ['ArrowLeft'], 'look', (p) => p.secondsLeft()),
  paneCommand('seconds-right', 'Seconds: later', ['ArrowRight'], 'look', (p) => p.secondsRight()),
  paneCommand('seconds-page-left', 'Seconds: a page earlier', ['PageUp'], 'look', (p) =>
    p.secondsPageLeft(),
  ),
  paneCommand('seconds-page-right', 'Seconds: a page later', ['PageDown'], 'look', (p) =>
    p.secondsPageRight(),
  ),
  paneCommand('seconds-in', 'Seconds: closer', ['+'], 'look', (p) => p.secondsIn()),
  paneCommand('seconds-out', 'Seconds: wider', ['-'], 'look', (p) => p.secondsOut()),
  paneCommand('minutes-left', 'Minutes: earlier', ['Shift+ArrowLeft'], 'look', (p) =>
    p.minutesLeft(),
  ),
  paneCommand('minutes-right', 'Minutes: later', ['Shift+ArrowRight'], 'look', (p) =>
    p.minutesRight(),
  ),
  paneCommand('minutes-in', 'Minutes: closer', ['I'], 'look', (p) => p.minutesIn()),
  paneCommand('minutes-out', 'Minutes: wider', ['O'], 'look', (p) => p.minutesOut()),
  paneCommand('usual-widths', 'Usual widths of both panes', ['W'], 'look', (p) => p.usualWidths()),
  paneCommand('go-to', 'Go to a time…', ['Ctrl+G'], 'look', (_, { shell }) =>
    shell.getState().openDialog({ kind: 'go-to' }),
  ),
  paneCommand('go-start', 'Go to the start', ['Home'], 'look', (p) => p.home()),
  paneCommand('go-end', 'Go to the end', ['End'], 'look', (p) => p.end()),
  paneCommand('toggle-leads', 'Minutes: all leads, or the reported one', ['L'], 'look', (p) =>
    p.toggleLeads(),
  ),
  paneCommand('next-row', 'Next trace row', ['R'], 'look', (p) => p.cycleRow()),
  paneCommand('gain-up', 'Trace row: larger', ['Shift+ArrowUp'], 'look', (p) => p.gainUp()),
  paneCommand('gain-down', 'Trace row: smaller', ['Shift+ArrowDown'], 'look', (p) => p.gainDown()),
  paneCommand('gain-fit', 'Trace row: fit', ['0'], 'look', (p) => p.gainFit()),
  paneCommand('gain-same', 'Same gain for all rows of the pane', ['='], 'look', (p) =>
    p.gainSame(),
  ),
];

const CLASS_WORDS: Readonly<Record<BeatClass, string>> = {
  N: 'normal',
  S: 'supraventricular',
  V: 'ventricular',
  F: 'fusion',
  Q: 'unknown or not usable',
};

const BEATS: readonly Command[] = [
  paneCommand('next-beat', 'Next beat', ['.'], 'beats', (p) => p.selectNextBeat()),
  paneCommand('previous-beat', 'Beat before', [','], 'beats', (p) => p.selectPreviousBeat()),
  paneCommand('extend-later', 'Select the next beat too', ['>'], 'beats', (p) =>
    p.extendToNextBeat(),
  ),
  paneCommand('extend-earlier', 'Select the beat before too', ['<'], 'beats', (p) =>
    p.extendToPreviousBeat(),
  ),
  paneCommand(
    'beats-between',
    'Select beats from one time to another…',
    ['Shift+V'],
    'beats',
    (_, { shell }) => shell.getState().openDialog({ kind: 'beats-between' }),
  ),
  paneCommand(
    'find-within',
    'Find the beats of a stretch again…',
    ['Shift+W'],
    'beats',
    (_, { shell }) => shell.getState().openDialog({ kind: 'find-within' }),
    ({ session, analysis }) =>
      analysis.getState().fileAtHand && session.getState().session?.state.roles.heart != null,
  ),
  paneCommand('beats-in-view', 'Select the beats in Seconds', ['Ctrl+A'], 'beats', (p) =>
    p.selectBeatsInView(),
  ),
  paneCommand(
    'clear-selection',
    'Select nothing',
    ['Escape'],
    'beats',
    (p) => p.clearSelection(),
    selected('beats', 'span'),
  ),
  paneCommand('add-beat', 'Add a beat at the cursor', ['A'], 'beats', (p) => p.addBeatAtCursor()),
  paneCommand(
    'delete-selected',
    'Delete the selected beats, or take away the selected span',
    ['Delete', 'Backspace'],
    'beats',
    (p) => p.deleteSelected(),
    selected('beats', 'span'),
  ),
  ...BEAT_CLASSES.map((beatClass) =>
    paneCommand(
      `class-${beatClass}`,
      `Class the selected beats ${beatClass}, ${CLASS_WORDS[beatClass]}`,
      [beatClass],
      'beats',
      (p) => p.classSelected(beatClass),
      beatsSelected,
    ),
  ),
  paneCommand(
    'beat-sample-left',
    'Move the beat a sample earlier',
    ['Ctrl+ArrowLeft'],
    'beats',
    (p) => p.moveSelectedBySamples(-1),
    beatsSelected,
  ),
  paneCommand(
    'beat-sample-right',
    'Move the beat a sample later',
    ['Ctrl+ArrowRight'],
    'beats',
    (p) => p.moveSelectedBySamples(1),
    beatsSelected,
  ),
  paneCommand(
    'beat-10-left',
    'Move the beat 10 ms earlier',
    ['Ctrl+Shift+ArrowLeft'],
    'beats',
    (p) => p.moveSelected(-10),
    beatsSelected,
  ),
  paneCommand(
    'beat-10-right',
    'Move the beat 10 ms later',
    ['Ctrl+Shift+ArrowRight'],
    'beats',
    (p) => p.moveSelected(10),
    beatsSelected,
  ),
];

const SPANS: readonly Command[] = [
  paneCommand('toggle-tool', 'Drag to exclude, or to look', ['E'], 'spans', (p) => p.toggleTool()),
  paneCommand(
    'exclude-seconds',
    'Exclude what Seconds shows',
    ['Ctrl+E'],
    'spans',
    (p, { view }) => {
      const { fromS, toS } = view.getState().seconds;
      p.excludeRange(fromS, toS);
    },
  ),
  paneCommand('next-span', 'Next spoiled span', ['H'], 'spans', (p) => p.selectNextSpan()),
  paneCommand('previous-span', 'Spoiled span before', ['G'], 'spans', (p) =>
    p.selectPreviousSpan(),
  ),
  ...(['stomach', 'heart', 'both'] as const).map((target, i) =>
    paneCommand(
      `span-for-${target}`,
      `Selected span: for ${target === 'both' ? 'both' : `the ${target}`}`,
      [String(i + 1)],
      'spans',
      (p) => p.changeSelectedSpan({ target }),
      spanSelected,
    ),
  ),
];

/** Acts of the panes, with their words and keys. */
export const PANE_COMMANDS: readonly Command[] = [...LOOK, ...BEATS, ...SPANS];
