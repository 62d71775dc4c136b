import { useEffect, useLayoutEffect, useState, useSyncExternalStore } from 'react';
import { useStore } from 'zustand';
import { applyTheme, type ThemeName } from '../review/theme-tokens';
import { editNumber } from '../session/store';
import type { AppParts } from './app-context';
import type { ShellStore } from './shell-store';
import { hasUnfiledWork } from './study-words';

const DARK = '(prefers-color-scheme: dark)';

const onSystemTheme = (tell: () => void) => {
  const dark = window.matchMedia(DARK);
  dark.addEventListener('change', tell);
  return () => dark.removeEventListener('change', tell);
};

/** Puts the chosen theme on the page and returns it; `system` follows the system while the page is open. */
export function useTheme(shell: ShellStore): ThemeName {
  const choice = useStore(shell, (state) => state.theme);
  const systemDark = useSyncExternalStore(onSystemTheme, () => window.matchMedia(DARK).matches);
  const theme = choice === 'system' ? (systemDark ? 'dark' : 'light') : choice;
  useLayoutEffect(() => applyTheme(document, theme), [theme]);
  return theme;
}

/** Asks before the page is left while some of the work is in no file. */
export function useLeaveGuard(session: AppParts['session']): void {
  useEffect(() => {
    const onLeave = (event: BeforeUnloadEvent) => {
      const { session: open, kept } = session.getState();
      if (open && hasUnfiledWork(kept, editNumber(open))) event.preventDefault();
    };
    window.addEventListener('beforeunload', onLeave);
    return () => window.removeEventListener('beforeunload', onLeave);
  }, [session]);
}

const onHash = (tell: () => void) => {
  window.addEventListener('hashchange', tell);
  return () => window.removeEventListener('hashchange', tell);
};

/** The part of the address behind '#', which names the view and never a study. */
export const useHash = (): string => useSyncExternalStore(onHash, () => window.location.hash);

/** Takes files dropped anywhere on the page; true while one is held over it. */
export function useFileDrop(take: (files: readonly File[]) => void): boolean {
  const [over, setOver] = useState(false);
  useEffect(() => {
    const hasFiles = (event: DragEvent) => event.dataTransfer?.types.includes('Files') ?? false;
    const onOver = (event: DragEvent) => {
      if (!hasFiles(event)) return;
      event.preventDefault();
      setOver(true);
    };
    const onLeave = (event: DragEvent) => {
      if (event.relatedTarget === null) setOver(false);
    };
    const onDrop = (event: DragEvent) => {
      if (!hasFiles(event)) return;
      event.preventDefault();
      setOver(false);
      take([...(event.dataTransfer?.files ?? [])]);
    };
    window.addEventListener('dragover', onOver);
    window.addEventListener('dragleave', onLeave);
    window.addEventListener('drop', onDrop);
    return () => {
      window.removeEventListener('dragover', onOver);
      window.removeEventListener('dragleave', onLeave);
      window.removeEventListener('drop', onDrop);
    };
  }, [take]);
  return over;
}
