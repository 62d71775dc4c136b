import { useAnalysis, useSession, useView } from './app-context';
import type { CommandParts } from './command';
import { CommandButton } from './command-button';
import { commandOf } from './commands';
import { Menu } from './menu';
import { signatureState } from './signature-words';
import { factsWords, keptWords, personWords } from './study-words';

interface TopBarProps {
  readonly parts: CommandParts;
  /** False while nothing of a study may be shown. */
  readonly studyShown: boolean;
  readonly reportShown: boolean;
}

/** The bar over everything: whose study, where the work is, who reviews, and the acts. */
export function TopBar({ parts, studyShown, reportShown }: TopBarProps) {
  return (
    <header className="top-bar">
      <h1 className="wordmark">Bicadence</h1>
      {studyShown ? <StudyStrip parts={parts} /> : <p className="quiet strip">no study open</p>}
      <div className="top-acts">
        {studyShown ? <Reviewer parts={parts} /> : null}
        <Menu words="Open" name="open" parts={parts} />
        {studyShown ? <StudyActs parts={parts} reportShown={reportShown} /> : null}
        <Menu words="Help" name="help" parts={parts} />
      </div>
    </header>
  );
}

function StudyStrip({ parts }: { readonly parts: CommandParts }) {
  const study = useSession((state) => state.session?.state.study ?? null);
  const recording = useAnalysis((state) => state.recording);
  const hidden = useView((state) => state.identityHidden);
  const code = study?.code ?? 'being opened';
  const invented = (study ?? recording)?.invented ?? false;
  const person = recording && !hidden && !invented ? personWords(recording) : '';
  return (
    <div className="strip">
      <p className="who">
        <strong>{hidden ? 'identity hidden' : code}</strong>
        {person ? <span className="person">{person}</span> : null}
        <CommandButton
          command={commandOf('hide-identity')}
          parts={parts}
          words={hidden ? 'Show' : 'Hide'}
          className="button slight"
        />
        {invented ? <span className="badge">invented data</span> : null}
      </p>
      <p className="facts">
        <Kept />
        <Signed />
        {recording ? <span title={factsWords(recording)}>{factsWords(recording)}</span> : null}
      </p>
    </div>
  );
}

function Kept() {
  const kept = useSession((state) => state.kept);
  const edit = useSession((state) => state.session?.log.length ?? 0);
  const words = keptWords(kept, edit);
  return (
    <span className={kept.kind === 'nowhere' ? 'kept tab' : 'kept'} title={words}>
      {words}
    </span>
  );
}

function Signed() {
  const session = useSession((state) => state.session);
  const signature = session && signatureState(session);
  if (!signature || signature.words === '') return null;
  return (
    <span className={signature.changed ? 'signed tab' : 'signed'} title={signature.whole}>
      {signature.words}
    </span>
  );
}

function Reviewer({ parts }: { readonly parts: CommandParts }) {
  const reviewer = useSession((state) => state.reviewer);
  return (
    <CommandButton
      command={commandOf('reviewer')}
      parts={parts}
      words={`Reviewer: ${reviewer === '' ? 'not set' : reviewer}`}
      className="button plain reviewer"
    />
  );
}

interface StudyActsProps {
  readonly parts: CommandParts;
  readonly reportShown: boolean;
}

function StudyActs({ parts, reportShown }: StudyActsProps) {
  useView((state) => state.identityHidden);
  useSession((state) => state.session);
  useAnalysis((state) => state.findings);
  return (
    <>
      <CommandButton command={commandOf('undo')} parts={parts} className="button named" />
      <CommandButton command={commandOf('redo')} parts={parts} words="Redo" readWhole />
      <Menu words="Study" name="study" parts={parts} />
      <CommandButton command={commandOf('settings')} parts={parts} words="Settings" />
      <CommandButton
        command={commandOf('room')}
        parts={parts}
        words="Room view"
        className="button room-door"
      />
      {parts.page.reportThere ? (
        <CommandButton
          command={commandOf('report')}
          parts={parts}
          words={reportShown ? 'Review' : 'Report'}
          className="button strong"
        />
      ) : null}
    </>
  );
}
