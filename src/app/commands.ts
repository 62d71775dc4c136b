import { BOOKMARK_COMMANDS } from './bookmark-commands';
import type { Command, CommandParts } from './command';
import { DOUBT_COMMANDS } from './doubt-commands';
import { EVIDENCE_COMMANDS } from './evidence-commands';
import { HISTORY_COMMANDS } from './history-commands';
import { actingKeys } from './own-keys';
import { PANE_COMMANDS } from './pane-bindings';
import { ACTS_IN_ROOM, ROOM_COMMANDS, ROOM_DOOR } from './room-commands';
import { OPEN_COMMANDS, PAGE_COMMANDS, STUDY_COMMANDS, WORK_COMMANDS } from './shell-commands';
import { TIME_COMMANDS } from './time-commands';

/** Every act of the page. */
export const COMMANDS: readonly Command[] = [
  ...ROOM_COMMANDS,
  ...STUDY_COMMANDS,
  ...EVIDENCE_COMMANDS,
  ...HISTORY_COMMANDS,
  ...OPEN_COMMANDS,
  ...WORK_COMMANDS,
  ...PANE_COMMANDS,
  ...DOUBT_COMMANDS,
  ...TIME_COMMANDS,
  ...BOOKMARK_COMMANDS,
  ...ROOM_DOOR,
  ...PAGE_COMMANDS,
];

/** The command of an id. Throws where there is none. */
export function commandOf(id: string): Command {
  const found = COMMANDS.find((one) => one.id === id);
  if (!found) throw new Error(`no command ${id}`);
  return found;
}

/** True where a command can act now; what belongs to the panes cannot while they are not in sight. */
export function canRun(command: Command, parts: CommandParts): boolean {
  const inRoom = command.when === 'room';
  if (parts.page.room ? !inRoom && !ACTS_IN_ROOM.test(command.id) : inRoom) return false;
  const studyThere = parts.session.getState().session !== null;
  const inPlace =
    command.when === 'always' ||
    inRoom ||
    (studyThere && !(command.when === 'panes' && parts.page.reportOpen()));
  return inPlace && (command.ready?.(parts) ?? true);
}

/** The command a key stands for now; null where it stands for none, or is a plain key while those are off. */
export function commandForKey(name: string, parts: CommandParts): Command | null {
  const choices = parts.shell.getState();
  return (
    COMMANDS.find((one) => actingKeys(one, choices).includes(name) && canRun(one, parts)) ?? null
  );
}
