import { useState } from 'react';
import type { SessionState, Signature } from '../session/document';
import { formatClock } from '../units/time';
import { useAnalysis, useApp, useSession } from './app-context';
import { Dialog } from './dialog';
import { Field, TextArea, Tick } from './fields';
import { localWords } from './study-words';

type Meaning = Signature['meaning'];

const MEANING_WORDS: Readonly<Record<Meaning, string>> = {
  prepared: 'prepared: edited and ready to be read',
  read: 'read: looked at and concluded',
  amended: 'amended: changed after it was signed; the former stays',
};

/** The meanings a signature can have now: after a study was read, only an amendment. */
export function meaningsNow(signed: readonly Signature[]): readonly Meaning[] {
  const readBefore = signed.some((one) => one.meaning !== 'prepared');
  return readBefore ? ['amended'] : ['prepared', 'read'];
}

/** Signing: confirm who it is, say what the signature means, keep the figures as they are. */
export function SignDialog() {
  const state = useSession((now) => now.session?.state);
  return state ? <SignForm state={state} /> : null;
}

function SignForm({ state }: { readonly state: SessionState }) {
  const { controller, shell, session } = useApp();
  const meanings = meaningsNow(state.signed);
  const [meaning, setMeaning] = useState(meanings[0]);
  const [name, setName] = useState(session.getState().reviewer);
  const [reason, setReason] = useState('');
  const [notes, setNotes] = useState(state.notes);
  const [conclusion, setConclusion] = useState(state.conclusion);
  const [sure, setSure] = useState(false);
  const [tried, setTried] = useState(false);
  const edit = useSession((now) => now.session?.log.length ?? 0);
  const computed = useAnalysis((now) => (now.findings ? now.edit : -1));
  const current = computed === edit;
  const wantsReason = meaning === 'amended' && reason.trim() === '';
  const close = () => shell.getState().closeDialog();
  const sign = () => {
    setTried(true);
    if (!current || !sure || wantsReason || name.trim() === '') return;
    close();
    controller.sign({
      meaning,
      name: name.trim(),
      reason: meaning === 'amended' ? reason.trim() : '',
      notes,
      conclusion,
    });
  };
  return (
    <Dialog
      title="Sign"
      subtitle="The figures, settings and words are kept as they stand now. The name is typed, not authenticated."
      onClose={close}
      onSubmit={sign}
      actions={
        <>
          <button type="button" className="button" onClick={close}>
            Not now
          </button>
          <button type="submit" className="button strong" disabled={!current}>
            Sign
          </button>
        </>
      }
    >
      {current ? null : (
        <p className="tab" role="status">
          Figures are of an earlier edit. Wait until they belong to edit {edit}.
        </p>
      )}
      <Tick
        label={
          <>
            This is the study <strong>{state.study.code}</strong>, {studyWords(state)}.
          </>
        }
        checked={sure}
        onChange={setSure}
      />
      {tried && !sure ? <p className="field-error">Confirm which study it is.</p> : null}
      <fieldset className="choices">
        <legend>What the signature means</legend>
        {meanings.map((one) => (
          <label key={one} className="tick">
            <input
              type="radio"
              name="meaning"
              checked={meaning === one}
              onChange={() => setMeaning(one)}
            />
            <span>{MEANING_WORDS[one]}</span>
          </label>
        ))}
      </fieldset>
      {meaning === 'amended' ? (
        <Field
          label="Reason for the amendment"
          value={reason}
          onChange={setReason}
          required
          error={tried && wantsReason ? 'Say why it is amended.' : null}
        />
      ) : null}
      <TextArea label="Remarks" value={notes} onChange={setNotes} rows={3} />
      <TextArea label="Conclusion" value={conclusion} onChange={setConclusion} rows={3} />
      <Field
        label="Name"
        value={name}
        onChange={setName}
        required
        error={tried && name.trim() === '' ? 'Type your name.' : null}
      />
    </Dialog>
  );
}

function studyWords({ study }: SessionState): string {
  const start = study.start === null ? 'start not known' : `recorded ${localWords(study.start)}`;
  const hash = study.sha256 === null ? 'hash not known yet' : `hash ${study.sha256.slice(0, 12)}`;
  return `${start}, ${formatClock(study.durationS)} long, ${hash}`;
}
