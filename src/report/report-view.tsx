import { useEffect, useMemo, useState } from 'react';
import { useStore } from 'zustand';
import { reportModel } from '../export/report-model';
import type { AnalysisStore, SignalAccess } from '../review/analysis-store';
import { asWork } from '../review/idle';
import type { ViewStore } from '../review/view-store';
import { editNumber, type SessionStore } from '../session/store';
import { PROGRAM } from '../units/program';
import { ReportPage } from './report-page';
import {
  excerptsOf,
  type PictureInput,
  type ReportPictures,
  reportPictures,
} from './report-pictures';
import './report.css';

export interface ReportViewProps {
  readonly session: SessionStore;
  readonly analysis: AnalysisStore;
  readonly view: ViewStore;
  readonly signals: SignalAccess;
}

const WAVE_COLUMNS = 960;

/** The report of the session as it stands, drawn again with every edit. */
export function ReportView({ session, analysis, view, signals }: ReportViewProps) {
  const open = useStore(session, (state) => state.session);
  const { recording, findings, stomach, heart, edit, fileAtHand } = useStore(analysis);
  const identityHidden = useStore(view, (state) => state.identityHidden);
  const [waves, setWaves] = useState<PictureInput['waves']>([]);
  const state = open?.state;
  const lead = state?.roles.slow[state.roles.reported];
  const phases = state?.phases;
  const durationS = recording?.durationS ?? 0;

  useEffect(() => {
    if (!lead || !phases || !fileAtHand) return;
    let current = true;
    const excerpts = excerptsOf(phases, durationS);
    const asked = excerpts.map(async (excerpt) => {
      const { fromS, toS } = excerpt;
      const columns = await signals.columns({
        lead,
        signal: 'slow-wave',
        fromS,
        toS,
        columns: WAVE_COLUMNS,
      });
      return columns ? [{ excerpt, columns }] : [];
    });
    void asWork(Promise.all(asked)).then((found) => {
      if (current) setWaves(found.flat());
    });
    return () => {
      current = false;
    };
  }, [lead, phases, durationS, fileAtHand, signals]);

  const pictures = useMemo((): ReportPictures | null => {
    const rhythm = state ? stomach[state.roles.reported] : undefined;
    if (!state || !rhythm) return null;
    return reportPictures({ state, settings: state.settings, rhythm, heart, durationS, waves });
  }, [state, stomach, heart, durationS, waves]);

  if (!open || !recording || !findings)
    return <p className="report-waiting">The figures are being computed.</p>;
  const model = reportModel({
    recording,
    session: open,
    findings,
    program: PROGRAM,
    identityHidden,
  });
  const stale = edit !== editNumber(open);
  return (
    <div className="report-view">
      {stale && (
        <output className="report-stale">
          The figures are being brought up to the last edit; print once this line is gone.
        </output>
      )}
      <ReportPage model={model} pictures={pictures} />
    </div>
  );
}
