import { createHash } from 'node:crypto';
import { createReadStream, openAsBlob } from 'node:fs';
import { readFile } from 'node:fs/promises';
import { basename } from 'node:path';
import { DEFAULT_SETTINGS, type Settings } from '../src/recording/settings';
import type { SiteReference } from '../src/recording/site-reference';
import { excerptWaves } from '../src/report/excerpt-waves';
import type { ResultInput } from '../src/report/result-files';
import { confirmStudy } from '../src/session/confirm-study';
import type { Session } from '../src/session/document';
import { initialState, studyIdentity } from '../src/session/initial-state';
import { beginSession } from '../src/session/log';
import { textToSession } from '../src/session/read-document';
import { siteReferenceOf } from '../src/session/read-site-reference';
import { editNumber } from '../src/session/store';
import { PROGRAM } from '../src/units/program';
import type { Opened } from './analysis-api';
import { checkRoles, codeOf, phasesWithin } from './command-choices';
import type { AnalyseRequest } from './command-line';
import { proposalOf } from './command-proposal';
import { type Job, startJob } from './job';
import { createPipeline, type Pipeline } from './pipeline';

async function proposedSession(
  pipeline: Pipeline,
  { recording, quickKey }: Opened,
  request: AnalyseRequest,
  sha256: string,
  job: Job,
): Promise<Session> {
  const { route } = request;
  const settings: Settings = route
    ? {
        ...DEFAULT_SETTINGS,
        slowRoute: route,
        heartRoute: route === 'beat-average' ? 'band' : route,
      }
    : DEFAULT_SETTINGS;
  const proposal = await proposalOf(pipeline, recording, request, settings, job);
  const study = studyIdentity(recording, quickKey, codeOf(request.code, recording, sha256));
  return confirmStudy(
    beginSession(initialState(study, { ...proposal, settings })),
    sha256,
    quickKey,
  );
}

async function keptSession(
  path: string,
  { recording, quickKey }: Opened,
  sha256: string,
): Promise<Session> {
  const session = confirmStudy(textToSession(await readFile(path, 'utf8')), sha256, quickKey);
  checkRoles(session.state.roles, recording);
  phasesWithin(session.state.phases, recording);
  return session;
}

async function sha256Of(path: string): Promise<string> {
  const hash = createHash('sha256');
  for await (const chunk of createReadStream(path)) hash.update(chunk);
  return hash.digest('hex');
}

/** The site's reference values of a file; null where none is named. Throws Refusal with row and column of what is wrong. */
export const referenceIn = async (path: string | null): Promise<SiteReference | null> =>
  path === null ? null : siteReferenceOf(await readFile(path, 'utf8'), basename(path));

/**
 * Everything that is written of one study, computed from its file alone, beside the site's reference values. Throws Refusal
 * where it cannot be analysed.
 */
export async function analyseStudy(
  path: string,
  request: AnalyseRequest,
  siteReference: SiteReference | null,
): Promise<ResultInput> {
  const { job } = startJob(() => undefined);
  const pipeline = createPipeline();
  const file = await openAsBlob(path);
  const reading = { rateHz: request.rateHz, unit: request.unit };
  const opened = await pipeline.open(1, file, basename(path), reading, job);
  pipeline.accept(opened.ticket);
  const sha256 = await sha256Of(path);
  const session = request.session
    ? await keptSession(request.session, opened, sha256)
    : await proposedSession(pipeline, opened, request, sha256, job);
  const { state } = session;
  const edit = editNumber(session);
  const analysis = await pipeline.analyse({ ...state, edit }, job);
  const openDoubts = await pipeline.openDoubts({ ...state, edit }, state.doubts, job);
  const evidence = await pipeline.allEvidence({ ...state, edit }, state.doubts, job);
  const lead = state.roles.slow[state.roles.reported];
  return {
    recording: opened.recording,
    state,
    session,
    sha256,
    program: PROGRAM,
    edit,
    stomach: analysis.stomach ?? [],
    heart: analysis.heart?.value ?? null,
    breathing: analysis.breathing,
    findings: analysis.findings,
    openDoubts,
    evidence,
    siteReference,
    age: null,
    signals: await pipeline.separated({ ...state, edit }, job),
    waves: await excerptWaves(
      { lead, phases: state.phases, durationS: opened.recording.durationS },
      (request) => pipeline.columns(request),
    ),
  };
}
