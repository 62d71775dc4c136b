import { useState } from 'react';
import { SPAN_CAUSES, SPAN_TARGETS, type Span } from '../recording/span';
import { goToStretch } from '../review/findings-go';
import { HeadRow } from '../review/head-row';
import type { Edit, Session } from '../session/document';
import { addSpan, changeSpan, removeSpans } from '../session/edits';
import { timeColumn, timeText } from '../units/typed-time';
import { useApp, useSession, useView, withReviewer } from './app-context';
import { EntryDialog } from './entry-dialog';
import { Choice, Field } from './fields';
import {
  BLANK_SPAN,
  leadOptions,
  readSpan,
  type SpanDraft,
  type SpanFaults,
  type SpanParts,
  spanDraft,
} from './span-draft';
import { TimeField, timeRule, useSnapPlaces, useTimeFrame } from './time-field';
import { useFirstField } from './use-first-field';

/** All spoiled spans by number: added, changed and taken away from the keyboard. */
export function SpansDialog() {
  const session = useSession((now) => now.session);
  return session ? <SpansForm session={session} /> : null;
}

function SpansForm({ session }: { readonly session: Session }) {
  const parts = useApp();
  const frame = useTimeFrame();
  const { spans } = session.state;
  const [changing, setChanging] = useState(() =>
    selectedOf(spans, parts.view.getState().selection),
  );
  const [draft, setDraft] = useState(() => (changing ? spanDraft(changing) : BLANK_SPAN));
  const [tried, setTried] = useState(false);
  const [done, setDone] = useState('');
  const { form, again } = useFirstField();
  const read = readSpan(draft, frame, changing);
  const close = () => parts.shell.getState().closeDialog();
  const begin = (span: Span | null) => {
    setChanging(span);
    setDraft(span ? spanDraft(span) : BLANK_SPAN);
    setTried(false);
    again();
  };
  const put = (edit: Edit, then: () => void) =>
    withReviewer(parts, () => {
      if (edit.changes.length > 0) parts.controller.edit(edit);
      setDone(edit.changes.length > 0 ? `Done: ${edit.name}` : 'Nothing was changed.');
      then();
    });
  const save = () => {
    setTried(true);
    if (!read.ok) return;
    const { parts: typed } = read;
    const edit = changing
      ? changeSpan(session.state, changing.id, changed(changing, typed))
      : addSpan(session, { ...typed, origin: 'drawn' });
    put(edit, () => begin(null));
  };
  return (
    <EntryDialog
      title="Spoiled spans"
      subtitle={timeRule(frame)}
      size="large"
      legend={changing ? `Change the span at ${timeText(changing.fromS)}` : 'Exclude a stretch'}
      fields={
        <SpanFields
          draft={draft}
          faults={tried && !read.ok ? read.faults : {}}
          onChange={setDraft}
        />
      }
      form={form}
      go="Exclude it"
      changing={changing !== null}
      done={done}
      onSave={save}
      onLeave={() => begin(null)}
      onClose={close}
    >
      <SpanTable
        spans={spans}
        changing={changing?.id ?? null}
        onChange={begin}
        onRemove={(span) => {
          put(removeSpans(session.state, [span.id]), () =>
            changing?.id === span.id ? begin(null) : again(),
          );
        }}
        onGo={(span) => {
          close();
          parts.view.setState({ selection: { kind: 'span', id: span.id } });
          goToStretch(parts.view, span.fromS, span.toS);
        }}
      />
    </EntryDialog>
  );
}

function selectedOf(
  spans: readonly Span[],
  selection: { readonly kind: string; readonly id?: number },
): Span | null {
  return selection.kind === 'span' ? (spans.find(({ id }) => id === selection.id) ?? null) : null;
}

/** A proposed span that a person has changed is theirs; one left as it is stays the program's. */
function changed(before: Span, parts: SpanParts): Omit<Span, 'id'> {
  const same = (Object.keys(parts) as (keyof SpanParts)[]).every(
    (key) => parts[key] === before[key],
  );
  return { ...parts, origin: same ? before.origin : 'drawn' };
}

const TARGETS = SPAN_TARGETS.map(
  (one) => [one, one === 'both' ? 'stomach and heart' : one] as const,
);
const CAUSES = SPAN_CAUSES.map((one) => [one, one] as const);

interface SpanFieldsProps {
  readonly draft: SpanDraft;
  readonly faults: SpanFaults;
  readonly onChange: (draft: SpanDraft) => void;
}

function SpanFields({ draft, faults, onChange }: SpanFieldsProps) {
  const frame = useTimeFrame();
  const places = useSnapPlaces();
  const state = useSession((now) => now.session?.state);
  const type = (parts: Partial<SpanDraft>) => onChange({ ...draft, ...parts });
  const leads = state ? leadOptions(state.roles, state.study.channelLabels, state.spans) : [];
  return (
    <div className="span-fields">
      {(['from', 'to'] as const).map((end) => (
        <TimeField
          key={end}
          label={end}
          value={draft[end]}
          frame={frame}
          places={places}
          onChange={(text) => type({ [end]: text })}
          error={faults[end]}
        />
      ))}
      <Choice
        label="excluded for"
        value={draft.target}
        options={TARGETS}
        onChange={(target) => type({ target })}
      />
      <Choice
        label="cause"
        value={draft.cause}
        options={CAUSES}
        onChange={(cause) => type({ cause })}
      />
      <Choice label="lead" value={draft.lead} options={leads} onChange={(lead) => type({ lead })} />
      <Field label="note" value={draft.note} onChange={(note) => type({ note })} />
    </div>
  );
}

interface SpanTableProps {
  readonly spans: readonly Span[];
  readonly changing: number | null;
  readonly onChange: (span: Span) => void;
  readonly onRemove: (span: Span) => void;
  readonly onGo: (span: Span) => void;
}

function SpanTable({ spans, changing, onChange, onRemove, onGo }: SpanTableProps) {
  const state = useSession((now) => now.session?.state);
  const hidden = useView((view) => view.identityHidden);
  const names = new Map(state ? leadOptions(state.roles, state.study.channelLabels, spans) : []);
  if (spans.length === 0) return <p className="quiet">Nothing is excluded.</p>;
  const timeOf = timeColumn(spans.flatMap(({ fromS, toS }) => [fromS, toS]));
  return (
    <table className="acts-table">
      <caption>Spoiled spans</caption>
      <HeadRow names={['from', 'to', 'excluded for', 'cause', 'lead', 'note', 'origin', 'acts']} />
      <tbody>
        {spans.map((span) => {
          const place = `${timeOf(span.fromS)} to ${timeOf(span.toS)}`;
          return (
            <tr key={span.id} aria-current={span.id === changing ? 'true' : undefined}>
              <td>
                <button type="button" className="go" onClick={() => onGo(span)}>
                  {timeOf(span.fromS)}
                  <span className="unseen">: go there</span>
                </button>
              </td>
              <td>{timeOf(span.toS)}</td>
              <td>{span.target === 'both' ? 'stomach and heart' : span.target}</td>
              <td>{span.cause}</td>
              <td>{names.get(span.lead ?? '') ?? span.lead}</td>
              <td className="note-cell">{hidden && span.note !== '' ? 'hidden' : span.note}</td>
              <td>{span.origin}</td>
              <td>
                <button
                  type="button"
                  className="button slight"
                  aria-label={`Change the span ${place}`}
                  onClick={() => onChange(span)}
                >
                  Change
                </button>
                <button
                  type="button"
                  className="button slight"
                  aria-label={`Remove the span ${place}`}
                  onClick={() => onRemove(span)}
                >
                  Remove
                </button>
              </td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}
