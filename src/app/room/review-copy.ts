import {
  findingsWithout,
  identityTexts,
  recordingWithout,
  stateWithout,
} from '../../export/without-identity';
import { type AnalysisStore, createAnalysisStore } from '../../review/analysis-store';
import { createViewStore, type ViewStore } from '../../review/view-store';
import { beginSession } from '../../session/log';
import { createSessionStore, type SessionStore } from '../../session/store';
import type { AppParts } from '../app-context';
import { createShellStore, type ShellStore } from '../shell-store';

/** Stores of a review that nothing keeps and that do not say whose it is. */
export interface ReviewCopy {
  readonly session: SessionStore;
  readonly analysis: AnalysisStore;
  readonly view: ViewStore;
  readonly shell: ShellStore;
}

/** Whoever edits in the room: no name is asked, since nothing is kept. */
const NOBODY = 'room view';

/**
 * Copies the open review as it stands, without who it is: edits of the copy reach no log, no store of the browser and not the
 * review itself. Throws Error where no study with figures is open.
 */
export function copyReview(
  parts: Pick<AppParts, 'session' | 'analysis' | 'view' | 'shell'>,
): ReviewCopy {
  const open = parts.session.getState().session;
  const { recording, findings, ...results } = parts.analysis.getState();
  if (!open || !recording || !findings) throw new Error('there is no review to copy');
  const identity = identityTexts(recording, open);

  const session = createSessionStore(() => new Date().toISOString());
  session.getState().begin(beginSession(stateWithout(open.state, identity)));
  session.getState().setReviewer(NOBODY);

  const analysis = createAnalysisStore();
  analysis.setState({
    ...results,
    recording: recordingWithout(recording),
    findings: findingsWithout(findings, identity),
    reasons: null,
    edit: 0,
    stopped: false,
    progress: null,
  });

  const view = createViewStore();
  view.setState({
    ...parts.view.getState(),
    cursorS: null,
    draft: null,
    doubt: null,
    phaseDraft: null,
    bordersShown: false,
    selection: { kind: 'none' },
    tool: 'look',
    identityHidden: true,
  });

  const shell = createShellStore(null);
  const { theme, plainKeys, ownKeys } = parts.shell.getState();
  shell.setState({ theme, plainKeys, ownKeys });
  return { session, analysis, view, shell };
}
