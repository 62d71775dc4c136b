import { lazy, Suspense, useMemo } from 'react';
import { createRoot } from 'react-dom/client';
import { useStore } from 'zustand';
import analysisWorkerUrl from '../workers/analysis.worker?worker&url';
import hashWorkerUrl from '../workers/hash.worker?worker&url';
import { Shell } from './app/shell';
import { createShellStore } from './app/shell-store';
import { recallReference } from './app/site-reference-kept';
import { createStudyController } from './app/study-controller';
import { createAnalysisStore } from './review/analysis-store';
import { createDoubtStore } from './review/doubt-store';
import { createEvidenceStore, evidenceAt } from './review/evidence-store';
import { asWork } from './review/idle';
import { countOpen } from './review/open-doubts';
import { createViewStore } from './review/view-store';
import { browserStores } from './session/browser-stores';
import { createKeeper } from './session/keeper';
import { createSessionStore } from './session/store';
import { PROGRAM } from './units/program';

const nowUtc = () => new Date().toISOString();
const browser = browserStores();
const session = createSessionStore(nowUtc);
const analysis = createAnalysisStore();
const view = createViewStore();
const doubts = createDoubtStore();
const evidence = createEvidenceStore();
const shell = createShellStore(browser.localStorage);
const stores = { session, analysis, view, shell };
const keeper = createKeeper({ ...browser, program: PROGRAM, nowUtc });
const controller = createStudyController({ ...stores, keeper, analysisWorkerUrl, hashWorkerUrl });
const Report = lazy(() =>
  asWork(import('./report/report-view')).then(({ ReportView }) => ({ default: ReportView })),
);
function ReportNow() {
  const listed = useStore(doubts, (now) => now.listed);
  const state = useStore(session, (now) => now.session?.state);
  const open = countOpen(listed, state);
  const edit = useStore(session, (now) => now.session?.log.length ?? 0);
  const found = useStore(evidence, (now) => now.found);
  const known = useMemo(() => evidenceAt(found, edit), [found, edit]);
  const siteReference = useStore(shell, (now) => now.siteReference?.reference ?? null);
  return (
    <Report
      {...stores}
      signals={controller.signals}
      openDoubts={open}
      evidence={known}
      siteReference={siteReference}
    />
  );
}
const renderReport = () => (
  <Suspense fallback={<output>Loading the report.</output>}>
    <ReportNow />
  </Suspense>
);
const root = document.getElementById('root');
if (root)
  createRoot(root).render(
    <Shell
      parts={{
        ...stores,
        doubts,
        controller,
        signals: controller.signals,
        doubtAccess: controller.doubtAccess,
        evidence,
        evidenceAccess: controller.evidenceAccess,
      }}
      renderReport={renderReport}
    />,
  );
void recallReference(shell, browser.localStorage);
void controller.resume();
