import { createContext, useContext } from 'react';
import { useStore } from 'zustand';
import type { AnalysisClient } from '../../workers/analysis-client';
import type { AnalysisState, AnalysisStore, SignalAccess } from '../review/analysis-store';
import type { DoubtStore } from '../review/doubt-store';
import type { EvidenceStore } from '../review/evidence-store';
import type { ViewState, ViewStore } from '../review/view-store';
import type { SessionStore, SessionStoreState } from '../session/store';
import type { StudyController } from './controller';
import type { EvidenceAccess } from './evidence-runner';
import type { ShellState, ShellStore } from './shell-store';

/** Doubts and what looks like them, on demand. */
export type DoubtAccess = Pick<AnalysisClient, 'doubts' | 'lookAlikes'>;

/** The parts the page is made of; main.tsx joins them. */
export interface AppParts {
  readonly session: SessionStore;
  readonly analysis: AnalysisStore;
  readonly view: ViewStore;
  readonly shell: ShellStore;
  readonly controller: StudyController;
  readonly signals: SignalAccess;
  readonly doubts: DoubtStore;
  readonly doubtAccess: DoubtAccess;
  readonly evidence: EvidenceStore;
  readonly evidenceAccess: EvidenceAccess;
}

const PartsContext = createContext<AppParts | null>(null);
export const AppProvider = PartsContext.Provider;

/** The parts, for components inside the shell. Throws outside it. */
export function useApp(): AppParts {
  const parts = useContext(PartsContext);
  if (!parts) throw new Error('useApp outside the shell');
  return parts;
}

export const useSession = <T>(pick: (state: SessionStoreState) => T): T =>
  useStore(useApp().session, pick);
export const useAnalysis = <T>(pick: (state: AnalysisState) => T): T =>
  useStore(useApp().analysis, pick);
export const useView = <T>(pick: (state: ViewState) => T): T => useStore(useApp().view, pick);
export const useShell = <T>(pick: (state: ShellState) => T): T => useStore(useApp().shell, pick);

/** Runs an act that edits, after asking who edits where nobody has said so yet. */
export function withReviewer(
  { session, shell }: Pick<AppParts, 'session' | 'shell'>,
  act: () => void,
): void {
  if (session.getState().reviewer !== '') act();
  else shell.getState().openDialog({ kind: 'reviewer', act });
}
