import { useState } from 'react';
import { useStore } from 'zustand';
import { openDoubtsWords } from '../recording/doubt';
import { countOpen } from '../review/open-doubts';
import type { SessionState, Signature } from '../session/document';
import { formatClock } from '../units/time';
import { useAnalysis, useApp, useSession } from './app-context';
import { Dialog } from './dialog';
import { Field, TextArea, Tick } from './fields';
import { FormActions } from './form-actions';
import { meaningsNow, readSign, type SignDraft, type SignErrors, signDraft } from './sign-draft';
import { localWords } from './study-words';

const MEANING_WORDS: Readonly<Record<Signature['meaning'], string>> = {
  prepared: 'prepared: edited and ready to be read',
  read: 'read: looked at and concluded',
  amended: 'amended: changed after it was signed; the former stays',
};

/** Signing: confirm who it is, say what the signature means, keep the figures as they are. */
export function SignDialog() {
  const state = useSession((now) => now.session?.state);
  return state ? <SignForm state={state} /> : null;
}

function SignForm({ state }: { readonly state: SessionState }) {
  const { controller, shell, session, doubts } = useApp();
  const listed = useStore(doubts, (now) => now.listed);
  const open = countOpen(listed, state);
  const [draft, setDraft] = useState(() => signDraft(state, session.getState().reviewer));
  const [tried, setTried] = useState(false);
  const edit = useSession((now) => now.session?.log.length ?? 0);
  const computed = useAnalysis((now) => (now.findings ? now.edit : -1));
  const current = computed === edit;
  const { request, errors } = readSign(draft);
  const close = () => shell.getState().closeDialog();
  const sign = () => {
    setTried(true);
    if (!current || !request) return;
    close();
    controller.sign(request);
  };
  return (
    <Dialog
      title="Sign"
      subtitle="The figures, settings and words are kept as they stand now. The name is typed, not authenticated."
      onClose={close}
      onSubmit={sign}
      actions={<FormActions stay="Not now" go="Sign" onStay={close} disabled={!current} />}
    >
      {current ? null : (
        <p className="tab" role="status">
          Figures are of an earlier edit. Wait until they belong to edit {edit}.
        </p>
      )}
      {open === 0 ? null : (
        <p className="tab">
          {open === null ? 'The doubts have not been looked for yet.' : openDoubtsWords(open)}
        </p>
      )}
      <SignFields
        state={state}
        draft={draft}
        errors={tried ? errors : NO_ERRORS}
        onChange={(parts) => setDraft({ ...draft, ...parts })}
      />
    </Dialog>
  );
}

const NO_ERRORS: SignErrors = { sure: null, reason: null, name: null };

interface SignFieldsProps {
  readonly state: SessionState;
  readonly draft: SignDraft;
  readonly errors: SignErrors;
  readonly onChange: (parts: Partial<SignDraft>) => void;
}

function SignFields({ state, draft, errors, onChange }: SignFieldsProps) {
  return (
    <>
      <Tick
        label={
          <>
            This is the study <strong>{state.study.code}</strong>, {studyWords(state)}.
          </>
        }
        checked={draft.sure}
        onChange={(sure) => onChange({ sure })}
      />
      {errors.sure ? <p className="field-error">{errors.sure}</p> : null}
      <Meanings state={state} draft={draft} onChange={onChange} />
      {draft.meaning === 'amended' ? (
        <Field
          label="Reason for the amendment"
          value={draft.reason}
          onChange={(reason) => onChange({ reason })}
          required
          error={errors.reason}
        />
      ) : null}
      <TextArea
        label="Remarks"
        value={draft.notes}
        onChange={(notes) => onChange({ notes })}
        rows={3}
      />
      <TextArea
        label="Conclusion"
        value={draft.conclusion}
        onChange={(conclusion) => onChange({ conclusion })}
        rows={3}
      />
      <Field
        label="Name"
        value={draft.name}
        onChange={(name) => onChange({ name })}
        required
        error={errors.name}
      />
    </>
  );
}

function Meanings({ state, draft, onChange }: Omit<SignFieldsProps, 'errors'>) {
  return (
    <fieldset className="choices">
      <legend>What the signature means</legend>
      {meaningsNow(state.signed).map((meaning) => (
        <label key={meaning} className="tick">
          <input
            type="radio"
            name="meaning"
            checked={draft.meaning === meaning}
            onChange={() => onChange({ meaning })}
          />
          <span>{MEANING_WORDS[meaning]}</span>
        </label>
      ))}
    </fieldset>
  );
}

function studyWords({ study }: SessionState): string {
  const start = study.start === null ? 'start not known' : `recorded ${localWords(study.start)}`;
  const hash = study.sha256 === null ? 'hash not known yet' : `hash ${study.sha256.slice(0, 12)}`;
  return `${start}, ${formatClock(study.durationS)} long, ${hash}`;
}
