import { useStore } from 'zustand';
import type { Roles } from '../recording/roles';
import type { PaneStores } from './row-view';

/** Roles that the panes draw by: the session's, or the first proposal while the session is still being prepared. */
export function useRoles({ session, analysis }: PaneStores): Roles | null {
  const first = useStore(analysis, (state) => state.firstRoles);
  return useStore(session, (state) => state.session?.state.roles ?? null) ?? first;
}
