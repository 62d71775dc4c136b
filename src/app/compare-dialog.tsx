import './history.css';
import { useMemo, useRef, useState } from 'react';
import { type Failure, Refusal } from '../recording/failure';
import { asWork } from '../review/idle';
import { otherStudy } from '../session/compare-sessions';
import type { Session } from '../session/document';
import { textToSession } from '../session/read-document';
import { editNumber } from '../session/store';
import { useAnalysis, useApp, useSession, useShell, useView } from './app-context';
import type { CommandParts } from './command';
import { commandOf } from './commands';
import { FiguresCompared } from './compare-figures';
import { Agreement, OtherDifferences, Places } from './compare-tables';
import { comparisonOf, goToDifference } from './comparing';
import { Dialog } from './dialog';
import { FileInput } from './file-input';
import { shownKey } from './own-keys';
import type { Compared } from './shell-store';
import { FailureWords } from './small-dialogs';
import { useHide } from './use-hide';

/** Reads a session to compare the open one with; a failure where it is none, or one of another study. */
async function readOther(file: File, open: Session): Promise<Session | Failure> {
  try {
    const read = textToSession(await file.text());
    const why = otherStudy(open.state.study, read.state.study);
    if (why === null) return read;
    return {
      kind: 'wrong-input',
      message: why,
      place: null,
      remedy: 'Choose a session that was made on the recording that is open.',
    };
  } catch (error) {
    if (error instanceof Refusal) return error.failure;
    return {
      kind: 'unreadable',
      message: `${file.name} could not be read.`,
      place: null,
      remedy: 'Check that the file is still there, then choose it again.',
    };
  }
}

/** Two sessions of the open study side by side. Nothing of the open one is changed. */
export function CompareDialog({ parts }: { readonly parts: CommandParts }) {
  const { shell } = useApp();
  const session = useSession((state) => state.session);
  const compared = useShell((state) => state.compared);
  const [failure, setFailure] = useState<Failure | null>(null);
  const input = useRef<HTMLInputElement>(null);
  if (!session) return null;
  const same = compared?.session.state.study.quickKey === session.state.study.quickKey;
  const shown = same ? compared : null;
  const close = () => shell.getState().closeDialog();
  const take = async (file: File) => {
    const read = await readOther(file, session);
    if ('kind' in read) setFailure(read);
    else {
      setFailure(null);
      shell.setState({ compared: { session: read, fileName: file.name, at: -1 } });
    }
  };
  return (
    <Dialog
      title="Compare with another session"
      subtitle="Another review of the same recording. The open session stays as it is."
      size="large"
      onClose={close}
      actions={
        <>
          <button
            type="button"
            className={shown ? 'button left' : 'button strong left'}
            onClick={() => input.current?.click()}
          >
            {shown ? 'Choose another session file…' : 'Choose the session file…'}
          </button>
          <button type="button" className={shown ? 'button strong' : 'button'} onClick={close}>
            Close
          </button>
        </>
      }
    >
      <FileInput
        input={input}
        label="Session to compare with"
        accept=".json"
        onFile={(file) => void asWork(take(file))}
      />
      {failure ? <FailureWords failure={failure} /> : null}
      {shown ? <Comparison session={session} other={shown} parts={parts} /> : <Explained />}
    </Dialog>
  );
}

function Explained() {
  return (
    <p>
      Choose a session file (.bicadence.json) that someone else, or you at another time, made of
      this recording. You will see which beats and excluded stretches differ, how far the two agree,
      and the figures each of them gives.
    </p>
  );
}

const STEPS = ['next-difference', 'previous-difference'] as const;

interface ComparisonProps {
  readonly session: Session;
  readonly other: Compared;
  readonly parts: CommandParts;
}

function Comparison({ session, other, parts }: ComparisonProps) {
  const recording = useAnalysis((state) => state.recording);
  const hidden = useView((state) => state.identityHidden);
  const found = useMemo(
    () => comparisonOf(session.state, other.session.state, recording),
    [session.state, other.session.state, recording],
  );
  const hide = useHide();
  const hint = useShell((state) => {
    const [next, before] = STEPS.map((id) => shownKey(commandOf(id), state));
    const keys = next && before ? ` In the panes ${next} goes to the next, ${before} back.` : '';
    return `A time takes the panes there.${keys}`;
  });
  return (
    <>
      <p>
        Here: {sessionWords(session, hidden)}. There: {hidden ? '' : `${other.fileName}, `}
        {sessionWords(other.session, hidden)}.
      </p>
      <Agreement comparison={found} />
      <Places
        places={found.places}
        hint={hint}
        hide={hide}
        onGo={(at) => {
          parts.shell.getState().closeDialog();
          goToDifference(parts, at);
        }}
      />
      <OtherDifferences differences={found.others} hide={hide} />
      <FiguresCompared other={other.session} />
    </>
  );
}

/** "12 edits by A. Tech, B. Tech". */
function sessionWords(session: Session, hidden: boolean): string {
  const edits = editNumber(session);
  const reviewers = [...new Set(session.log.map(({ reviewer }) => reviewer))];
  const by = hidden || edits === 0 ? '' : ` by ${reviewers.join(', ')}`;
  return `${edits === 1 ? '1 edit' : `${edits} edits`}${by}`;
}
