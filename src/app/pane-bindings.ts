import type { Command } from './commands';

/** Commands of the panes, bound to keys. */
export const PANE_COMMANDS: readonly Command[] = [];
