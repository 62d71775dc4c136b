import { useState } from 'react';
import type { Protocol } from '../recording/protocol';
import { useApp, useSession, withReviewer } from './app-context';
import { Dialog } from './dialog';
import { Field } from './fields';
import { FormActions } from './form-actions';
import {
  PROTOCOL_NUMBERS,
  PROTOCOL_TEXTS,
  type ProtocolDraft,
  type ProtocolText,
  protocolDraft,
  readProtocol,
} from './protocol-draft';

const POSTURES = ['lying, trunk raised', 'lying flat', 'reclined chair', 'sitting'];
const HINTS: Readonly<Partial<Record<ProtocolText, string>>> = {
  medicines: 'Those that act on gut or heart rhythm, and when last taken.',
  implants: 'Pacemaker, stimulator, pump.',
};

/** What was done around the recording; a report prints it beside the figures. */
export function ProtocolDialog() {
  const protocol = useSession((state) => state.session?.state.protocol);
  return protocol ? <ProtocolForm before={protocol} /> : null;
}

function ProtocolForm({ before }: { readonly before: Protocol }) {
  const parts = useApp();
  const [draft, setDraft] = useState(() => protocolDraft(before));
  const { protocol, errors } = readProtocol(draft);
  const close = () => parts.shell.getState().closeDialog();
  const save = () => {
    if (Object.keys(errors).length > 0) return;
    if (JSON.stringify(protocol) === JSON.stringify(before)) return close();
    withReviewer(parts, () => {
      parts.controller.changeProtocol(protocol);
      close();
    });
  };
  return (
    <Dialog
      title="Meal and protocol"
      subtitle="What was done, as it was done. Leave empty what is not known."
      onClose={close}
      onSubmit={save}
      actions={<FormActions stay="Leave as it was" go="Use this" onStay={close} />}
    >
      <Texts keys={['meal']} draft={draft} onChange={setDraft} />
      <div className="field-grid">
        {PROTOCOL_NUMBERS.map(({ key, label, bounds }) => (
          <Field
            key={key}
            label={label}
            size="short"
            inputMode="decimal"
            unit={bounds.unit}
            value={draft[key]}
            error={errors[key]}
            onChange={(text) => setDraft({ ...draft, [key]: text })}
          />
        ))}
      </div>
      <Texts keys={['posture', 'medicines', 'implants']} draft={draft} onChange={setDraft} />
    </Dialog>
  );
}

interface TextsProps {
  readonly keys: readonly ProtocolText[];
  readonly draft: ProtocolDraft;
  readonly onChange: (draft: ProtocolDraft) => void;
}

function Texts({ keys, draft, onChange }: TextsProps) {
  return PROTOCOL_TEXTS.filter((one) => keys.includes(one.key)).map(({ key, label }) => (
    <Field
      key={key}
      label={label}
      value={draft[key]}
      {...(HINTS[key] ? { hint: HINTS[key] } : {})}
      {...(key === 'posture' ? { suggestions: POSTURES } : {})}
      onChange={(text) => onChange({ ...draft, [key]: text })}
    />
  ));
}
