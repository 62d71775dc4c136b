import { useState } from 'react';
import type { Channel } from '../recording/channel';
import type { RoleReasons, Roles } from '../recording/roles';
import { useAnalysis, useApp, useSession, withReviewer } from './app-context';
import { Dialog } from './dialog';
import { Field } from './fields';
import { FormActions } from './form-actions';
import { LeadChooser } from './lead-chooser';
import {
  addSlowLead,
  BREATH_ID,
  HEART_ID,
  type LeadDraft,
  leadReason,
  type RolesDraft,
  type RolesErrors,
  readRoles,
  removeSlowLead,
  reportedChanged,
  rolesDraft,
} from './roles-draft';

const MOST_SLOW_LEADS = 8;
const NO_CHANNELS: readonly Channel[] = [];

/** Which lead serves what, with the program's reason for each. */
export function RolesDialog() {
  const roles = useSession((state) => state.session?.state.roles);
  const channels = useAnalysis((state) => state.recording?.channels ?? NO_CHANNELS);
  return roles ? <RolesForm before={roles} channels={channels} /> : null;
}

interface RolesFormProps {
  readonly before: Roles;
  readonly channels: readonly Channel[];
}

function RolesForm({ before, channels }: RolesFormProps) {
  const parts = useApp();
  const [draft, setDraft] = useState(() => rolesDraft(before));
  const [tried, setTried] = useState(false);
  const { roles, errors } = readRoles(draft, before, channels);
  const close = () => parts.shell.getState().closeDialog();
  const save = () => {
    setTried(true);
    if (!roles) return;
    withReviewer(parts, () => {
      const reason = reportedChanged(before, roles) ? draft.reason.trim() : '';
      parts.controller.changeRoles(roles, reason);
      close();
    });
  };
  return (
    <Dialog
      title="Leads and their roles"
      subtitle="A lead is a channel, or one channel minus another."
      onClose={close}
      onSubmit={save}
      actions={<FormActions stay="Leave as it was" go="Use these leads" onStay={close} />}
    >
      <SlowLeads
        draft={draft}
        before={before}
        channels={channels}
        errors={tried ? errors : null}
        onChange={setDraft}
      />
      <OtherLeads
        draft={draft}
        channels={channels}
        errors={tried ? errors : null}
        onChange={setDraft}
      />
    </Dialog>
  );
}

interface LeadsProps {
  readonly draft: RolesDraft;
  readonly channels: readonly Channel[];
  readonly errors: RolesErrors | null;
  readonly onChange: (draft: RolesDraft) => void;
}

function SlowLeads(props: LeadsProps & { readonly before: Roles }) {
  const { draft, before, channels, errors, onChange } = props;
  const leadChoice = useSession((state) => state.session?.state.leadChoice ?? '');
  const changed = draft.reported !== before.reported || wantsReason(draft, before, channels);
  return (
    <fieldset>
      <legend className="organ-stomach">Slow wave of the stomach</legend>
      <p className="small quiet">
        Figures are those of the reported lead. It is chosen by the quality of its fasting phase,
        before any rhythm is drawn.
      </p>
      <SlowRows draft={draft} channels={channels} errors={errors} onChange={onChange} />
      {draft.slow.length < Math.min(MOST_SLOW_LEADS, 2 * channels.length) ? (
        <button
          type="button"
          className="button slight"
          onClick={() => onChange(addSlowLead(draft, channels))}
        >
          Add a slow-wave lead
        </button>
      ) : null}
      {changed ? (
        <Field
          label="Reason for reporting another lead"
          value={draft.reason}
          onChange={(reason) => onChange({ ...draft, reason })}
          error={errors?.reason}
          required
        />
      ) : (
        <p className="small quiet">Why this lead is reported: {leadChoice}</p>
      )}
    </fieldset>
  );
}

function SlowRows({ draft, channels, errors, onChange }: LeadsProps) {
  const { proposed, reasons } = useProposal();
  const change = (next: LeadDraft) =>
    onChange({ ...draft, slow: draft.slow.map((row) => (row.id === next.id ? next : row)) });
  return draft.slow.map((row, i) => (
    <LeadChooser
      key={row.id}
      name={`Lead ${i + 1}`}
      draft={row}
      channels={channels}
      use="slow-wave"
      optional={false}
      error={errors?.slow[row.id] ?? null}
      reason={leadReason(row, proposed?.slow ?? [], reasons?.slow ?? null)}
      onChange={change}
    >
      <label className="tick">
        <input
          type="radio"
          name="reported"
          checked={row.id === draft.reported}
          onChange={() => onChange({ ...draft, reported: row.id })}
        />
        <span>reported</span>
      </label>
      {draft.slow.length > 1 ? (
        <button
          type="button"
          className="button slight"
          aria-label={`Remove lead ${i + 1}`}
          onClick={() => onChange(removeSlowLead(draft, row.id))}
        >
          Remove
        </button>
      ) : null}
    </LeadChooser>
  ));
}

/** The roles the program proposed at the beginning of the session, and why. */
function useProposal(): { readonly proposed: Roles | null; readonly reasons: RoleReasons | null } {
  const proposed = useSession((state) => state.session?.start.roles ?? null);
  const reasons = useAnalysis((state) => state.reasons);
  return { proposed, reasons };
}

function wantsReason(draft: RolesDraft, before: Roles, channels: readonly Channel[]): boolean {
  const { roles } = readRoles({ ...draft, reason: 'asked' }, before, channels);
  return roles !== null && reportedChanged(before, roles);
}

function OtherLeads({ draft, channels, errors, onChange }: LeadsProps) {
  const { proposed, reasons } = useProposal();
  return (
    <>
      <fieldset>
        <legend className="organ-heart">Heartbeat</legend>
        <LeadChooser
          name="Heart lead"
          draft={draft.heart}
          channels={channels}
          use="heart"
          optional
          error={errors?.heart ?? null}
          reason={leadReason(draft.heart, [proposed?.heart ?? null], reasons && [reasons.heart])}
          onChange={(heart) => onChange({ ...draft, heart: { ...heart, id: HEART_ID } })}
        />
        <p className="small quiet">Another heart lead means that all beats are found again.</p>
      </fieldset>
      <fieldset>
        <legend className="organ-breathing">Breathing</legend>
        <LeadChooser
          name="Breathing lead"
          draft={draft.breath}
          channels={channels}
          use="breathing"
          optional
          error={errors?.breath ?? null}
          reason={leadReason(draft.breath, [proposed?.breath ?? null], reasons && [reasons.breath])}
          onChange={(breath) => onChange({ ...draft, breath: { ...breath, id: BREATH_ID } })}
        />
      </fieldset>
    </>
  );
}
