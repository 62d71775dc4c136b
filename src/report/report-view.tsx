import { useEffect, useMemo, useRef, useState } from 'react';
import { useStore } from 'zustand';
import { reportModel } from '../export/report-model';
import type { Evidence } from '../recording/evidence/evidence';
import type { SiteReference } from '../recording/site-reference';
import type { AnalysisStore, SignalAccess } from '../review/analysis-store';
import { asWork } from '../review/idle';
import type { ViewStore } from '../review/view-store';
import type { SessionState } from '../session/document';
import { editNumber, type SessionStore } from '../session/store';
import { PROGRAM } from '../units/program';
import { excerptWaves } from './excerpt-waves';
import { usePageFoot } from './page-foot';
import { ReportPage } from './report-page';
import { type PictureInput, type ReportPictures, reportPictures } from './report-pictures';
import './report.css';

export interface ReportViewProps {
  readonly session: SessionStore;
  readonly analysis: AnalysisStore;
  readonly view: ViewStore;
  readonly signals: SignalAccess;
  /** How many doubts are open; null while they have not been looked for. */
  readonly openDoubts: number | null;
  /** The parts of the evidence that belong to the last edit. */
  readonly evidence: Partial<Evidence>;
  /** Reference values that the site keeps; null where it gave none. */
  readonly siteReference: SiteReference | null;
}

/** The report of the session as it stands, drawn again with every edit. */
export function ReportView(props: ReportViewProps) {
  const { session, analysis, view, signals, openDoubts, evidence, siteReference } = props;
  const open = useStore(session, (state) => state.session);
  const { recording, findings, edit } = useStore(analysis);
  const identityHidden = useStore(view, (state) => state.identityHidden);
  const pictures = usePictures(open?.state ?? null, analysis, signals);
  const model = useMemo(
    () =>
      open && recording && findings
        ? reportModel({
            recording,
            session: open,
            findings,
            program: PROGRAM,
            identityHidden,
            openDoubts,
            evidence,
            siteReference,
            age: null,
          })
        : null,
    [open, recording, findings, identityHidden, openDoubts, evidence, siteReference],
  );
  usePageFoot(model?.foot ?? null);
  const page = useFocusOnce(model !== null);
  if (!open || !model) return <p className="report-waiting">The figures are being computed.</p>;
  const stale = model.kind === 'draft' && edit !== editNumber(open);
  return (
    <section className="report-view" aria-label="Report" ref={page}>
      {stale && (
        <output className="report-stale">
          Not current: the figures are of an earlier edit. Print once this line is gone.
        </output>
      )}
      <ReportPage model={model} pictures={pictures} />
    </section>
  );
}

/** Gives the focus to an element when it is first there, so that keys scroll it at once. */
function useFocusOnce(there: boolean) {
  const place = useRef<HTMLElement>(null);
  useEffect(() => {
    if (!there || !place.current) return;
    place.current.tabIndex = -1;
    place.current.focus({ preventScroll: true });
  }, [there]);
  return place;
}

/** The pictures; null until a slow wave has been analysed. */
function usePictures(
  state: SessionState | null,
  analysis: AnalysisStore,
  signals: SignalAccess,
): ReportPictures | null {
  const { recording, stomach, heart, breathing, fileAtHand, signalVersion } = useStore(analysis);
  const durationS = recording?.durationS ?? 0;
  const version = fileAtHand ? signalVersion : null;
  const waves = useWaves(state, durationS, version, signals);
  return useMemo(() => {
    const rhythm = state ? stomach[state.roles.reported] : undefined;
    if (!state || !rhythm) return null;
    const { settings } = state;
    return reportPictures({ state, settings, rhythm, heart, breathing, durationS, waves });
  }, [state, stomach, heart, breathing, durationS, waves]);
}

/** The slow wave of the excerpts, asked for again when phases, lead or `version` change; null: no file to draw from. */
function useWaves(
  state: SessionState | null,
  durationS: number,
  version: number | null,
  signals: SignalAccess,
): PictureInput['waves'] {
  const [drawn, setDrawn] = useState<DrawnWaves | null>(null);
  const lead = state?.roles.slow[state.roles.reported];
  const phases = state?.phases;
  useEffect(() => {
    if (!lead || !phases || version === null) return;
    let current = true;
    const asked = excerptWaves({ lead, phases, durationS }, (request) => signals.columns(request));
    void asWork(asked).then((found) => {
      if (current) setDrawn({ version, waves: found });
    });
    return () => {
      current = false;
      setDrawn(null);
    };
  }, [lead, phases, durationS, version, signals]);
  return drawn?.waves ?? NO_WAVES;
}

interface DrawnWaves {
  readonly version: number;
  readonly waves: PictureInput['waves'];
}

const NO_WAVES: PictureInput['waves'] = [];
