import './findings-pane.css';
import { useState } from 'react';
import { useStore } from 'zustand';
import type { EvidencePart } from '../recording/evidence/evidence';
import { withEvidenceMarks } from '../recording/evidence/evidence-marks';
import type { Findings } from '../recording/findings';
import type { Edit } from '../session/document';
import type { SessionStore } from '../session/store';
import { formatClock } from '../units/time';
import type { AnalysisStore } from './analysis-store';
import { type EvidenceStore, evidenceAt } from './evidence-store';
import { goToStretch } from './findings-go';
import { FindingsSpans } from './findings-spans';
import { FindingsTable, type RangesShown } from './findings-table';
import { firstPair } from './findings-words';
import { TrustLines } from './trust-lines';
import type { ViewStore } from './view-store';

export interface FindingsPaneProps {
  readonly session: SessionStore;
  readonly analysis: AnalysisStore;
  readonly view: ViewStore;
  /** Opens the definition of a figure, for a phase of the findings. */
  readonly onFigure: (key: string, phase: string) => void;
  readonly onEdit: (edit: Edit) => void;
  readonly evidence: EvidenceStore;
  readonly onEvidence: (part: EvidencePart) => void;
}

/** The column of numbers: figures by phase, what stands above them, what was seen in passing, the spoiled spans. */
export function FindingsPane(props: FindingsPaneProps) {
  const { session, analysis, view, onFigure, onEdit, evidence, onEvidence } = props;
  const figures = useStore(analysis, (state) => state.findings);
  const found = useStore(evidence, (state) => state.found);
  const computed = useStore(analysis, (state) => state.edit);
  const edit = useStore(session, (state) => state.session?.log.length ?? 0);
  const working = useStore(analysis, (state) => state.progress !== null);
  const stopped = useStore(analysis, (state) => state.stopped);
  const findings = figures && withEvidenceMarks(figures, evidenceAt(found, computed));
  const stale = findings !== null && computed < edit;
  const ranges = found.ranges && { value: found.ranges.value, stale: found.ranges.edit !== edit };
  const go = (fromS: number, toS: number) => goToStretch(view, fromS, toS);
  return (
    <section className="findings" id="findings" tabIndex={-1} aria-labelledby="findings-title">
      <header className="findings-head">
        <h2 id="findings-title">Findings</h2>
        <p className="small quiet" role="status">
          {statusWords(findings !== null, stale ? { stopped } : null, working, computed)}
        </p>
      </header>
      {findings ? (
        <div
          className={stale ? 'findings-body stale' : 'findings-body'}
          aria-busy={stale && !stopped}
        >
          <Warnings findings={findings} />
          <PhaseFigures findings={findings} ranges={ranges ?? null} onFigure={onFigure} onGo={go} />
          <Seen findings={findings} onGo={go} />
        </div>
      ) : null}
      {findings ? <TrustLines evidence={evidence} edit={edit} onOpen={onEvidence} /> : null}
      <FindingsSpans session={session} view={view} onEdit={onEdit} />
    </section>
  );
}

function statusWords(
  there: boolean,
  stale: { readonly stopped: boolean } | null,
  working: boolean,
  edit: number,
): string {
  if (!there) return working ? 'being computed' : 'no figures yet';
  if (!stale) return `of edit ${edit}`;
  return stale.stopped ? `of edit ${edit}, then stopped` : `of edit ${edit}, updating`;
}

function Warnings({ findings }: { readonly findings: Findings }) {
  if (findings.warnings.length === 0) return null;
  return (
    <ul className="findings-warnings" aria-label="Warnings">
      {findings.warnings.map((warning) => (
        <li key={`${warning.about} ${warning.text}`}>
          {warning.about === 'study' ? null : (
            <span className={`organ-square ${warning.about}`} aria-hidden="true" />
          )}
          {warning.about === 'study' ? '' : `${warning.about}: `}
          {warning.text}
        </li>
      ))}
    </ul>
  );
}

interface PhaseFiguresProps {
  readonly findings: Findings;
  readonly ranges: RangesShown | null;
  readonly onFigure: (key: string, phase: string) => void;
  readonly onGo: (fromS: number, toS: number) => void;
}

function PhaseFigures({ findings, ranges, onFigure, onGo }: PhaseFiguresProps) {
  const [picked, setPicked] = useState<{ left?: string; right?: string }>({});
  const [all, setAll] = useState(false);
  const [left, right] = firstPair(findings);
  const there = (name: string | undefined) =>
    findings.phases.some((phase) => phase.name === name) ? name : undefined;
  return (
    <>
      <FindingsTable
        findings={findings}
        ranges={ranges}
        left={there(picked.left) ?? left}
        right={there(picked.right) ?? right}
        all={all}
        onPick={(side, name) => setPicked((before) => ({ ...before, [side]: name }))}
        onFigure={onFigure}
        onGo={onGo}
      />
      <p>
        <button type="button" className="button slight" onClick={() => setAll(!all)}>
          {all ? 'Main figures only' : 'All figures'}
        </button>
      </p>
    </>
  );
}

function Seen({ findings, onGo }: Pick<PhaseFiguresProps, 'findings' | 'onGo'>) {
  if (findings.seen.length === 0) return null;
  return (
    <section aria-labelledby="seen-title">
      <h3 id="seen-title">Seen in passing</h3>
      <p className="small quiet">
        Seen in the recording; have it looked at under local protocol. Not a diagnosis.
      </p>
      <ul className="seen-list">
        {findings.seen.map((one) => (
          <li key={`${one.fromS} ${one.text}`}>
            <button
              type="button"
              className="go"
              aria-label={`Go to ${formatClock(one.fromS)}: ${one.text}`}
              onClick={() => onGo(one.fromS, one.toS)}
            >
              {formatClock(one.fromS)}
            </button>
            <span>{one.text}</span>
          </li>
        ))}
      </ul>
    </section>
  );
}
