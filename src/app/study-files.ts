import type { AnalysisClient } from '../../workers/analysis-client';
import { EVIDENCE_PARTS, type Evidence, wholeOf } from '../recording/evidence/evidence';
import { type Failure, Refusal, type Reply } from '../recording/failure';
import type { AnalysisStore } from '../review/analysis-store';
import { asWork } from '../review/idle';
import type { LogLine, Session } from '../session/document';
import { safeCode, sessionFileName } from '../session/file-name';
import { textToSession } from '../session/read-document';
import { sameValue } from '../session/same-value';
import { editNumber, type SessionStore } from '../session/store';
import { documentText, sessionToDocument } from '../session/write-document';
import { PROGRAM } from '../units/program';
import { inputsOf } from './analysis-runner';
import type { StudyController } from './controller';
import { download } from './download';
import type { ShellStore } from './shell-store';
import type { StudyKeeping } from './study-keeping';

interface FileParts {
  readonly session: SessionStore;
  readonly analysis: AnalysisStore;
  readonly shell: ShellStore;
  readonly keeping: StudyKeeping;
  readonly client: Pick<AnalysisClient, 'doubts' | 'evidence'>;
}

/** Said where results or a signature would stand for a file that is not known yet. */
export const NOT_CONFIRMED =
  'The file could not be read to its end for its SHA-256, so it is not sure which file these figures are of. Open the file again.';

const IDENTIFYING =
  'A heartbeat trace can itself identify a person: keep the file as you keep the recording.';

/** True where the longer log goes on where the shorter one ends. */
function continues(longer: readonly LogLine[], shorter: readonly LogLine[]): boolean {
  return shorter.length <= longer.length && shorter.every((line, i) => sameValue(line, longer[i]));
}

/** All parts of the evidence; those computed already cost nothing. */
async function wholeEvidence(
  client: Pick<AnalysisClient, 'evidence'>,
  open: Session,
): Promise<Reply<Evidence>> {
  const made: Partial<Evidence> = {};
  for (const part of EVIDENCE_PARTS) {
    const reply = await client.evidence(inputsOf(open), open.state.doubts, part);
    if (!reply.ok) return reply;
    Object.assign(made, { [part]: reply.value.value });
  }
  return { ok: true, value: wholeOf(made) };
}

/** Sessions and results on their way to and from files of the person's. */
export function createStudyFiles({ session, analysis, shell, keeping, client }: FileParts) {
  const acts: Pick<StudyController, 'downloadSession' | 'downloadExports'> = {
    downloadSession() {
      const open = session.getState().session;
      if (!open) return;
      const fileName = sessionFileName(open);
      download(fileName, documentText(sessionToDocument(open, PROGRAM)), 'application/json');
      keeping.inFile(fileName);
      shell.getState().say(`Saved as ${fileName}. ${IDENTIFYING}`);
    },
    downloadExports() {
      const open = session.getState().session;
      const { recording, stomach, heart, breathing, findings, edit } = analysis.getState();
      if (!open || !recording || !findings) return;
      if (edit !== editNumber(open)) {
        shell.getState().sayProblem('The figures are not up to date yet. Download once they are.');
        return;
      }
      const { state } = open;
      const results = {
        recording,
        state,
        program: PROGRAM,
        edit,
        stomach,
        heart,
        breathing,
        findings,
      };
      const save = async () => {
        if (!(await keeping.confirmed())) {
          shell.getState().sayProblem(NOT_CONFIRMED);
          return;
        }
        const doubts = await client.doubts(inputsOf(open), state.doubts);
        if (!doubts.ok) {
          shell.getState().openDialog({ kind: 'failure', failure: doubts.failure });
          return;
        }
        const evidence = await wholeEvidence(client, open);
        if (!evidence.ok) {
          shell.getState().openDialog({ kind: 'failure', failure: evidence.failure });
          return;
        }
        const { resultsZip } = await import('./results-zip');
        const sha256 = session.getState().session?.state.study.sha256 ?? null;
        const zip = resultsZip({
          ...results,
          sha256,
          openDoubts: doubts.value.open,
          evidence: evidence.value,
          siteReference: shell.getState().siteReference?.reference ?? null,
        });
        download(`${safeCode(state.study.code)}-results.zip`, zip, 'application/zip');
        shell.getState().say(IDENTIFYING);
      };
      void asWork(save());
    },
  };

  return {
    acts,
    /** Reads a session file; null after the person was told why it cannot be used. */
    async readSession(file: File): Promise<Session | null> {
      try {
        return textToSession(await file.text());
      } catch (error) {
        const failure: Failure =
          error instanceof Refusal
            ? error.failure
            : {
                kind: 'unreadable',
                message: `${file.name} could not be read.`,
                place: null,
                remedy: 'Check that the file is still there, then choose it again.',
              };
        shell.getState().openDialog({ kind: 'failure', failure });
        return null;
      }
    },
    /** Why a session from a file may not take the place of the one kept here; null where it may. */
    refuseOlder(read: Session, kept: Session | null): Failure | null {
      if (!kept || continues(read.log, kept.log)) return null;
      const here = editNumber(kept);
      const message = continues(kept.log, read.log)
        ? `This browser keeps a newer state of session ${kept.state.study.code}: ${here} edits, the file has ${editNumber(read)}.`
        : `This browser keeps a session of the same study that went another way: ${here} edits, the file has ${editNumber(read)}.`;
      return {
        kind: 'wrong-input',
        message,
        place: null,
        remedy:
          'Continue the one kept here from the start page; or download it, forget it there, and open the file again.',
      };
    },
  };
}
