import { readFileSync } from 'node:fs';
import type { ExportInput } from '../../src/export/export-input';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import { initialState, studyIdentity } from '../../src/session/initial-state';
import { startJob } from '../../workers/job';
import { createPipeline } from '../../workers/pipeline';

/** Record 208 (test/fixtures/record208) through the pipeline with nothing mended, as results go out of it. */
export async function analysedFixture(): Promise<ExportInput> {
  const { job } = startJob(() => undefined);
  const pipeline = createPipeline();
  const bytes = readFileSync('test/fixtures/record208/record208-abdomen.edf');
  const opened = await pipeline.open(1, new Blob([bytes]), 'record208.edf', null, job);
  pipeline.accept(opened.ticket);
  const given = { roles: null, phases: null, spans: null, settings: DEFAULT_SETTINGS };
  const proposal = await pipeline.propose(given, job);
  const state = initialState(studyIdentity(opened.recording, opened.quickKey, 'MITDB-208'), {
    ...proposal,
    settings: DEFAULT_SETTINGS,
  });
  const inputs = { ...state, edit: 0 };
  const analysis = await pipeline.analyse(inputs, job);
  return {
    recording: opened.recording,
    state,
    sha256: null,
    program: 'Bicadence 0.1.0',
    edit: 0,
    stomach: analysis.stomach ?? [],
    heart: analysis.heart?.value ?? null,
    breathing: analysis.breathing,
    findings: analysis.findings,
    openDoubts: await pipeline.openDoubts(inputs, [], job),
    evidence: await pipeline.allEvidence(inputs, [], job),
    siteReference: null,
  };
}
