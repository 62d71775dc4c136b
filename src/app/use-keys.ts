import { useEffect, useRef } from 'react';
import type { CommandParts } from './command';
import { canRun, commandForKey } from './commands';
import { keyName } from './key-names';

const TEXT_INPUTS = /^(text|search|url|tel|email|password|number|date|time)$/;

/** True where a key belongs to what has the focus: text being typed, a list being searched. */
export function isTyping(target: EventTarget | null): boolean {
  if (!(target instanceof HTMLElement)) return false;
  if (target.isContentEditable) return true;
  if (target instanceof HTMLInputElement) return TEXT_INPUTS.test(target.type);
  return target instanceof HTMLTextAreaElement || target instanceof HTMLSelectElement;
}

/** Enter and Space press the button that has the focus; the arrows belong to parts that say so. */
function belongsToFocus(target: EventTarget | null, name: string): boolean {
  if (!(target instanceof HTMLElement)) return false;
  if (name === 'Enter' || name === 'Space')
    return target.closest('button, a, summary, input') !== null;
  return /Arrow|Home|End/.test(name) && target.closest('[data-own-arrows]') !== null;
}

/**
 * Runs the commands' keys on the whole page: never while typing, never under an open dialog, never one that was handled. A key
 * that stands for nothing now goes to `otherwise`, which says whether it took it. Without parts no key is heard.
 */
export function useKeys(
  parts: CommandParts | null,
  otherwise: (name: string) => boolean = () => false,
): void {
  const rest = useRef(otherwise);
  rest.current = otherwise;
  useEffect(() => {
    if (!parts) return;
    const onKeyDown = (event: KeyboardEvent) => {
      if (event.defaultPrevented || event.isComposing || isTyping(event.target)) return;
      if (parts.shell.getState().dialog.kind !== 'none') return;
      const name = keyName(event);
      if (belongsToFocus(event.target, name)) return;
      const command = commandForKey(name, parts);
      if (!command || !canRun(command, parts)) {
        if (rest.current(name)) event.preventDefault();
        return;
      }
      event.preventDefault();
      if (event.repeat && command.once) return;
      command.run(parts);
    };
    window.addEventListener('keydown', onKeyDown);
    return () => window.removeEventListener('keydown', onKeyDown);
  }, [parts]);
}
