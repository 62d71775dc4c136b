import type { ReactNode } from 'react';
import type { CommandParts } from './command';
import { CommandButton } from './command-button';
import { commandOf } from './commands';

interface ReportFrameProps {
  readonly parts: CommandParts;
  readonly children: ReactNode;
}

/** The report with its acts above it; print leaves the acts out. */
export function ReportFrame({ parts, children }: ReportFrameProps) {
  return (
    <main className="report-frame">
      <p className="report-acts button-row">
        <CommandButton command={commandOf('report')} parts={parts} words="Back to the review" />
        <CommandButton command={commandOf('sign')} parts={parts} />
        <button type="button" className="button strong" onClick={() => window.print()}>
          Print, or save as PDF…
        </button>
      </p>
      {children}
    </main>
  );
}
