import { Refusal } from '../recording/failure';
import type { Edit } from '../session/document';
import { type AppParts, withReviewer } from './app-context';
import type { StudyEdits } from './study-edits';

/** Applies one edit once someone reviews: alone, or with the beats of what it frees; a refused one is said. */
export function applyEdit(
  { session, shell }: Pick<AppParts, 'session' | 'shell'>,
  edits: StudyEdits,
  edit: Edit,
): void {
  withReviewer({ session, shell }, () => {
    try {
      if (!edits.findsFreed(edit)) session.getState().apply(edit);
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      shell.getState().sayProblem(`${error.failure.message} ${error.failure.remedy}`);
    }
  });
}
