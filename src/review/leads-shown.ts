import { useSyncExternalStore } from 'react';
import { useStore } from 'zustand';
import type { ViewStore } from './view-store';

/** Leads that Minutes draws: every slow-wave lead, or only the reported one, which leaves each row more height. */
export type LeadsShown = 'all' | 'reported';

/** On lower pages the rows of several leads would be too low to read. */
const ROOM_FOR_ALL = '(min-height: 900px)';

const asFits = (): LeadsShown => (window.matchMedia(ROOM_FOR_ALL).matches ? 'all' : 'reported');

/** What is drawn now: what the person chose, else what fits the height of the page. */
export const leadsShownNow = (view: ViewStore): LeadsShown =>
  view.getState().leadsShown ?? asFits();

/** leadsShownNow, followed as it changes. */
export function useLeadsShown(view: ViewStore): LeadsShown {
  const chosen = useStore(view, (state) => state.leadsShown);
  const fitting = useSyncExternalStore(hearHeight, asFits);
  return chosen ?? fitting;
}

function hearHeight(tell: () => void): () => void {
  const query = window.matchMedia(ROOM_FOR_ALL);
  query.addEventListener('change', tell);
  return () => query.removeEventListener('change', tell);
}
