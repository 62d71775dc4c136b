import { type RefObject, useEffect, useId, useRef, useState } from 'react';
import type { Command, CommandParts } from './command';
import { CommandButton } from './command-button';
import { COMMANDS } from './commands';

interface MenuProps {
  readonly words: string;
  readonly name: NonNullable<Command['menu']>;
  readonly parts: CommandParts;
}

/** A button that opens a list of commands; Escape, a click elsewhere or leaving by Tab closes it. */
export function Menu({ words, name, parts }: MenuProps) {
  const [open, setOpen] = useState(false);
  const root = useRef<HTMLDivElement>(null);
  const id = useId();
  useMenuKeys(root, open, setOpen);
  useLeaving(root, open, setOpen);
  const rows = COMMANDS.filter((one) => one.menu === name);
  return (
    <div className="menu" ref={root} data-own-arrows>
      <button
        type="button"
        className="button"
        aria-expanded={open}
        aria-controls={id}
        onClick={() => setOpen(!open)}
      >
        {words} <span aria-hidden="true">▾</span>
      </button>
      <ul id={id} className="menu-list" hidden={!open}>
        {rows.map((command) => (
          <li key={command.id}>
            <CommandButton
              command={command}
              parts={parts}
              className="menu-row"
              showKey
              after={() => setOpen(false)}
            />
          </li>
        ))}
      </ul>
    </div>
  );
}

function moveFocus(root: HTMLElement | null, step: number): void {
  const rows = [...(root?.querySelectorAll<HTMLButtonElement>('.menu-row:enabled') ?? [])];
  const at = rows.indexOf(document.activeElement as HTMLButtonElement);
  rows[(at + step + rows.length) % rows.length]?.focus();
}

type Root = RefObject<HTMLDivElement | null>;
type SetOpen = (open: boolean) => void;

/** Escape closes and goes back to the button; the arrows open and walk the list. */
function useMenuKeys(root: Root, open: boolean, setOpen: SetOpen): void {
  useEffect(() => {
    const onKey = (event: KeyboardEvent) => {
      if (event.key === 'Escape' && open) {
        event.preventDefault();
        setOpen(false);
        root.current?.querySelector('button')?.focus();
      } else if (event.key === 'ArrowDown' || event.key === 'ArrowUp') {
        event.preventDefault();
        if (open) moveFocus(root.current, event.key === 'ArrowDown' ? 1 : -1);
        else setOpen(true);
      }
    };
    const menu = root.current;
    menu?.addEventListener('keydown', onKey);
    return () => menu?.removeEventListener('keydown', onKey);
  }, [root, open, setOpen]);
}

/** A click or the focus elsewhere closes. */
function useLeaving(root: Root, open: boolean, setOpen: SetOpen): void {
  useEffect(() => {
    if (!open) return;
    const onElsewhere = (event: Event) => {
      if (!(event.target instanceof Node && root.current?.contains(event.target))) setOpen(false);
    };
    window.addEventListener('pointerdown', onElsewhere);
    window.addEventListener('focusin', onElsewhere);
    return () => {
      window.removeEventListener('pointerdown', onElsewhere);
      window.removeEventListener('focusin', onElsewhere);
    };
  }, [root, open, setOpen]);
}
