import { type Failure, Refusal } from '../recording/failure';
import type { AnalysisStore } from '../review/analysis-store';
import { asWork } from '../review/idle';
import type { LogLine, Session } from '../session/document';
import { sessionFileName } from '../session/file-name';
import { textToSession } from '../session/read-document';
import { sameValue } from '../session/same-value';
import { editNumber, type SessionStore } from '../session/store';
import { documentText, sessionToDocument } from '../session/write-document';
import { PROGRAM } from '../units/program';
import type { AnalysisRunner } from './analysis-runner';
import type { StudyController } from './controller';
import { download } from './download';
import type { ResultClient } from './results-from-worker';
import type { ShellStore } from './shell-store';
import type { StudyKeeping } from './study-keeping';

interface FileParts {
  readonly session: SessionStore;
  readonly analysis: AnalysisStore;
  readonly shell: ShellStore;
  readonly keeping: StudyKeeping;
  readonly client: ResultClient;
  readonly watched: AnalysisRunner['watched'];
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

/** Sessions and results on their way to and from files of the person's. */
export function createStudyFiles(parts: FileParts) {
  const { session, analysis, shell, keeping, client, watched } = parts;
  const acts: Pick<StudyController, 'downloadSession' | 'gatherResults'> = {
    downloadSession() {
      const open = session.getState().session;
      if (!open) return;
      const fileName = sessionFileName(open);
      download(fileName, documentText(sessionToDocument(open, PROGRAM)), 'application/json');
      keeping.inFile(fileName);
      shell.getState().say(`Saved as ${fileName}. ${IDENTIFYING}`);
    },
    async gatherResults() {
      const open = session.getState().session;
      const { recording, stomach, heart, breathing, findings, edit } = analysis.getState();
      if (!open || !recording || !findings) return null;
      if (edit !== editNumber(open)) {
        shell.getState().sayProblem('The figures are not up to date yet. Download once they are.');
        return null;
      }
      if (!(await keeping.confirmed())) {
        shell.getState().sayProblem(NOT_CONFIRMED);
        return null;
      }
      const { resultsFromWorker } = await asWork(import('./results-from-worker'));
      const fromWorker = await watched('Getting the results together', (watch) =>
        resultsFromWorker(client, open, recording.durationS, watch),
      );
      if (!fromWorker.ok) {
        if (fromWorker.failure.kind !== 'cancelled')
          shell.getState().openDialog({ kind: 'failure', failure: fromWorker.failure });
        return null;
      }
      const sha256 = session.getState().session?.state.study.sha256 ?? null;
      return {
        ...fromWorker.value,
        recording,
        session: open,
        state: open.state,
        sha256,
        program: PROGRAM,
        edit,
        stomach,
        heart,
        breathing,
        findings,
        siteReference: shell.getState().siteReference?.reference ?? null,
        age: null,
      };
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
