import { blankAnalysis } from '../review/analysis-store';
import { lookAtStudy } from '../review/view-store';
import type { AppParts } from './app-context';

/**
 * Takes everything of the open study off the page: every pane, the session, the place looked at. Runs before another study
 * is opened, so that nothing of one person can stand beside the name of another.
 */
export function blankStudy({
  session,
  analysis,
  view,
}: Pick<AppParts, 'session' | 'analysis' | 'view'>): void {
  session.getState().close();
  blankAnalysis(analysis);
  lookAtStudy(view, 0);
}
