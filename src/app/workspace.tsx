import { lazy, Suspense } from 'react';
import { FindingsPane } from '../review/findings-pane';
import { asWork } from '../review/idle';
import { type PaneProps, TracePanes, WholeStudyPane } from '../review/panes';
import { useAnalysis, useApp } from './app-context';
import type { CommandParts } from './command';

const DoubtsPane = lazy(() =>
  asWork(import('./doubts-pane')).then((pane) => ({ default: pane.DoubtsPane })),
);

interface WorkspaceProps {
  readonly panes: PaneProps;
  readonly parts: CommandParts;
}

/** A study on the page: Whole study above, the two panes below it, findings and doubts beside them. */
export function Workspace({ panes, parts }: WorkspaceProps) {
  const { session, analysis, view, shell, controller, evidence } = useApp();
  const fileAtHand = useAnalysis((state) => state.fileAtHand);
  const working = useAnalysis((state) => state.progress !== null);
  return (
    <main className="workspace">
      {fileAtHand || working ? null : (
        <p className="file-wanted">
          The figures are here; the traces need the recording again.
          <button type="button" className="button slight" onClick={parts.page.chooseFile}>
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
        <div className="findings-scroll">
          <FindingsPane
            session={session}
            analysis={analysis}
            view={view}
            onFigure={(key, phase) => shell.getState().openDialog({ kind: 'figure', key, phase })}
            onEdit={(edit) => controller.edit(edit)}
            evidence={evidence}
            onEvidence={(page) => shell.getState().openDialog({ kind: 'evidence', page })}
          />
        </div>
        <Suspense fallback={<div className="doubts" />}>
          <DoubtsPane parts={parts} act={panes.act} />
        </Suspense>
      </div>
    </main>
  );
}
