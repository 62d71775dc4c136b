import { FindingsPane } from '../review/findings-pane';
import { type PaneProps, TracePanes, WholeStudyPane } from '../review/panes';
import { useAnalysis, useApp } from './app-context';
import type { PageActs } from './command';

interface WorkspaceProps {
  readonly panes: PaneProps;
  readonly page: PageActs;
}

/** A study on the page: Whole study above, the two panes below it, the findings beside them. */
export function Workspace({ panes, page }: WorkspaceProps) {
  const { session, analysis, view, shell, controller } = useApp();
  const fileAtHand = useAnalysis((state) => state.fileAtHand);
  const working = useAnalysis((state) => state.progress !== null);
  return (
    <main className="workspace">
      {fileAtHand || working ? null : (
        <p className="file-wanted">
          The figures are here; the traces need the recording again.
          <button type="button" className="button slight" onClick={page.chooseFile}>
            Choose the same file to go on…
          </button>
        </p>
      )}
      <div className="place-whole">
        <WholeStudyPane {...panes} />
      </div>
      <div className="place-traces">
        <TracePanes {...panes} />
      </div>
      <div className="place-findings">
        <FindingsPane
          session={session}
          analysis={analysis}
          view={view}
          onFigure={(key, phase) => shell.getState().openDialog({ kind: 'figure', key, phase })}
          onEdit={(edit) => controller.edit(edit)}
        />
      </div>
    </main>
  );
}
