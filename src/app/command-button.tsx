import type { KeyboardEvent } from 'react';
import { useStore } from 'zustand';
import type { Command, CommandParts } from './command';
import { canRun } from './commands';
import { shownKey } from './own-keys';

interface CommandButtonProps {
  readonly command: Command;
  readonly parts: CommandParts;
  /** Shorter words for the button; the tooltip has the command's own. */
  readonly words?: string;
  /** True where the shorter words leave out what the command would act on: it is read out all the same. */
  readonly readWhole?: boolean;
  readonly className?: string;
  readonly showKey?: boolean;
  /** Runs after the command, as a menu that closes. */
  readonly after?: () => void;
}

/** A held Enter presses a button again and again; this lets it press once. */
export function stopRepeat(event: KeyboardEvent): void {
  if (event.repeat) event.preventDefault();
}

/** A button for a command of the table: its words, its key in the tooltip, off while it cannot act. */
export function CommandButton(props: CommandButtonProps) {
  const { command, parts, className = 'button', showKey = false, after } = props;
  const words = command.wordsNow?.(parts) ?? command.words;
  const key = useStore(parts.shell, (state) => shownKey(command, state));
  const able = canRun(command, parts);
  const why = able ? '' : (command.whyNot?.(parts) ?? '');
  return (
    <button
      type="button"
      className={className}
      title={`${key ? `${words} (${key})` : words}${why ? `: ${why}` : ''}`}
      aria-label={props.readWhole ? words : undefined}
      disabled={!able}
      onKeyDown={command.once ? stopRepeat : undefined}
      onClick={() => {
        command.run(parts);
        after?.();
      }}
    >
      <span>{props.words ?? words}</span>
      {showKey && key ? (
        <span className="key" aria-hidden="true">
          {key}
        </span>
      ) : null}
    </button>
  );
}
