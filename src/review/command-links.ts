import { createContext, useContext } from 'react';

/** What the panes know of the command table, which belongs to the shell: keys for tooltips, and acts by their id. */
export interface CommandLinks {
  /** The key that acts for a command, in words; '' where none does. */
  readonly keyOf: (commandId: string) => string;
  readonly run: (commandId: string) => void;
}

const LinksContext = createContext<CommandLinks>({ keyOf: () => '', run: () => undefined });
export const CommandLinksProvider = LinksContext.Provider;

/** The command table for a part of a pane; `hint` makes a tooltip of words and the key that does the same. */
export function useCommandLinks() {
  const { keyOf, run } = useContext(LinksContext);
  const hint = (words: string, commandId: string): string => {
    const key = keyOf(commandId);
    return key === '' ? words : `${words} (${key})`;
  };
  return { hint, run };
}
