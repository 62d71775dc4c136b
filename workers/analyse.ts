import { createHash } from 'node:crypto';
import { createReadStream, openAsBlob } from 'node:fs';
import { mkdir, readFile, writeFile } from 'node:fs/promises';
import { basename, extname, join } from 'node:path';
import { exportFiles } from '../src/export/all-files';
import { separatedEdf } from '../src/export/separated-edf';
import { NO_BEATS } from '../src/recording/beat';
import { Refusal } from '../src/recording/failure';
import { leadChannels, leadKey } from '../src/recording/lead';
import { failedChecks } from '../src/recording/self-check';
import { DEFAULT_SETTINGS, type Settings } from '../src/recording/settings';
import type { SiteReference } from '../src/recording/site-reference';
import { confirmStudy } from '../src/session/confirm-study';
import type { Session, SessionState } from '../src/session/document';
import { initialState, studyIdentity } from '../src/session/initial-state';
import { beginSession } from '../src/session/log';
import { notesOf } from '../src/session/note-edits';
import { textToSession } from '../src/session/read-document';
import { siteReferenceOf } from '../src/session/read-site-reference';
import { editNumber } from '../src/session/store';
import { PROGRAM } from '../src/units/program';
import type { Opened } from './analysis-api';
import { checkRoles, codeOf, phasesWithin } from './command-choices';
import { type AnalyseRequest, parseArguments, USAGE, WrongArguments } from './command-line';
import { proposalOf } from './command-proposal';
import { isSelfCheck, selfCheckText } from './command-self-check';
import { type Job, startJob } from './job';
import { createPipeline, type Pipeline, selfCheck } from './pipeline';

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

const referenceIn = async (path: string | null): Promise<SiteReference | null> =>
  path === null ? null : siteReferenceOf(await readFile(path, 'utf8'), basename(path));

async function sha256Of(path: string): Promise<string> {
  const hash = createHash('sha256');
  for await (const chunk of createReadStream(path)) hash.update(chunk);
  return hash.digest('hex');
}

async function analyseStudy(
  path: string,
  folder: string,
  request: AnalyseRequest,
  siteReference: SiteReference | null,
): Promise<void> {
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
  const files = exportFiles({
    recording: opened.recording,
    state,
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
  });
  await mkdir(folder, { recursive: true });
  for (const { name, text } of files) await writeFile(join(folder, name), text);
  const separated = separatedOf(pipeline, opened, state);
  await writeFile(join(folder, 'separated.edf'), Buffer.concat(separated));
}

/** What made the slow wave, in the 80 characters of a header's field. */
const slowPrefilter = ({ slowRoute, slowBandCpm, slowGain, breathingOut }: Settings): string =>
  slowRoute !== 'fractional'
    ? `slow wave, ${slowRoute} ${slowBandCpm.join('-')} cpm, gain ${slowGain}, breathing out ${breathingOut}`
    : `slow wave, ${slowRoute}`;

/** The separated signals of the analysed state, as an EDF+ file. */
function separatedOf(pipeline: Pipeline, { recording }: Opened, state: SessionState) {
  const { roles, settings } = state;
  const heartbeat = roles.heart && pipeline.heartbeat(roles.heart);
  return separatedEdf({
    code: state.study.code,
    start: recording.start.kind === 'known' ? recording.start.local : null,
    durationS: recording.durationS,
    program: PROGRAM,
    slow: roles.slow.flatMap((lead) => {
      const drawn = pipeline.slowWave(lead);
      if (!drawn) return [];
      const { rateHz, slowWave } = drawn;
      const prefilter = slowPrefilter(settings);
      return [{ label: `slow ${leadKey(lead)}`, rateHz, samples: slowWave, prefilter }];
    }),
    heart:
      roles.heart && heartbeat
        ? {
            label: `heart ${leadKey(roles.heart)}`,
            rateHz: heartbeat.rateHz,
            samples: heartbeat.heartbeat,
            prefilter: `heartbeat, route ${settings.heartRoute}`,
          }
        : null,
    beats: heartbeat ? state.beats : NO_BEATS,
    beatRateHz: roles.heart ? recording.channels[leadChannels(roles.heart)[0]].rateHz : 1,
    phases: state.phases,
    spans: state.spans,
    notes: notesOf(state),
  });
}

/** Folder names of several studies: the file's name without its ending, told apart by a number where two are equal. */
function foldersOf(paths: readonly string[], out: string): readonly string[] {
  if (paths.length === 1) return [out];
  const used = new Map<string, number>();
  return paths.map((path) => {
    const name = basename(path, extname(path));
    const count = (used.get(name) ?? 0) + 1;
    used.set(name, count);
    return join(out, count === 1 ? name : `${name}-${count}`);
  });
}

function reasonOf(error: unknown): string {
  if (!(error instanceof Refusal)) return error instanceof Error ? error.message : String(error);
  const { message, place, remedy } = error.failure;
  return [message, place ? `(${place})` : '', remedy].filter((part) => part !== '').join(' ');
}

/** Prints every check value with what this machine made of it; 1 where one failed. */
async function printSelfCheck(): Promise<number> {
  const check = await selfCheck(startJob(() => undefined).job);
  process.stdout.write(`${PROGRAM}\n${selfCheckText(check)}`);
  return failedChecks(check) > 0 ? 1 : 0;
}

async function main(words: readonly string[]): Promise<number> {
  if (isSelfCheck(words)) return printSelfCheck();
  const request = parseArguments(words);
  const folders = foldersOf(request.studies, request.out);
  const siteReference = await referenceIn(request.reference);
  let failed = 0;
  for (const [i, path] of request.studies.entries()) {
    try {
      await analyseStudy(path, folders[i], request, siteReference);
      process.stdout.write(`${path}: written to ${folders[i]}\n`);
    } catch (error) {
      if (error instanceof WrongArguments) throw error;
      failed += 1;
      process.stderr.write(`${path}: ${reasonOf(error)}\n`);
    }
  }
  return failed > 0 ? 1 : 0;
}

try {
  process.exitCode = await main(process.argv.slice(2));
} catch (error) {
  process.stderr.write(`${reasonOf(error)}\n`);
  if (error instanceof WrongArguments) process.stderr.write(`\n${USAGE}\n`);
  process.exitCode = error instanceof WrongArguments ? 2 : 1;
}
