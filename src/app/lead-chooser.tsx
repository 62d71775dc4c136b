import type { ReactNode } from 'react';
import type { Channel } from '../recording/channel';
import type { LeadUse } from '../recording/lead';
import { Choice } from './fields';
import { canServe, type LeadDraft } from './roles-draft';

interface LeadChooserProps {
  readonly name: string;
  readonly draft: LeadDraft;
  readonly channels: readonly Channel[];
  /** Channels that cannot serve it are not offered; one that stands there already is. */
  readonly use: LeadUse;
  /** True where "none" is a choice. */
  readonly optional: boolean;
  readonly error: string | null;
  /** Why the program proposed what it did; '' where nothing is known. */
  readonly reason: string;
  readonly onChange: (draft: LeadDraft) => void;
  readonly children?: ReactNode;
}

const NONE = 'none';

/** Two lists that make a lead: a channel, and what is taken from it. */
export function LeadChooser(props: LeadChooserProps) {
  const { name, draft, channels, use, optional, error, reason, onChange, children } = props;
  const chosen = [draft.plus, draft.minus];
  const options = channels
    .filter(({ index }) => chosen.includes(index) || canServe(index, channels, use))
    .map((channel) => [String(channel.index), channelWords(channel)] as const);
  const numberOf = (value: string) => (value === NONE ? null : Number(value));
  return (
    <div className="lead-row">
      <div className="lead-line">
        <Choice
          label={name}
          value={draft.plus === null ? NONE : String(draft.plus)}
          options={optional ? [[NONE, 'none'], ...options] : options}
          onChange={(value) => {
            const plus = numberOf(value);
            onChange({ ...draft, plus, minus: plus === null ? null : draft.minus });
          }}
          error={error}
        />
        <Choice
          label="minus"
          value={draft.minus === null ? NONE : String(draft.minus)}
          options={[[NONE, 'nothing'], ...(draft.plus === null ? [] : options)]}
          onChange={(value) => onChange({ ...draft, minus: numberOf(value) })}
        />
        {children}
      </div>
      {reason ? <p className="small quiet">{reason}</p> : null}
    </div>
  );
}

function channelWords({ index, label, rateHz, unit }: Channel): string {
  const words = `#${index + 1} ${label}, ${Math.round(rateHz * 1000) / 1000} Hz`;
  return unit.kind === 'unknown' ? `${words}, unit not known` : words;
}
