import { useEffect, useId, useState } from 'react';
import { useStore } from 'zustand';
import { SPAN_CAUSES, SPAN_TARGETS, type Span } from '../recording/span';
import type { Edit } from '../session/document';
import { changeSpan, removeSpans } from '../session/edits';
import type { SessionStore } from '../session/store';
import { formatClock } from '../units/time';
import { useCommandLinks } from './command-links';
import { goToStretch } from './findings-go';
import type { ViewStore } from './view-store';

const FIRST_SHOWN = 60;
const NO_SPANS: readonly Span[] = [];

interface FindingsSpansProps {
  readonly session: SessionStore;
  readonly view: ViewStore;
  readonly onEdit: (edit: Edit) => void;
}

/** The spoiled spans as a list: where, for what, why, by whom; one opens for changes when it is picked out. */
export function FindingsSpans({ session, view, onEdit }: FindingsSpansProps) {
  const spans = useStore(session, (state) => state.session?.state.spans ?? NO_SPANS);
  const selection = useStore(view, (state) => state.selection);
  const [open, setOpen] = useState(false);
  const [all, setAll] = useState(false);
  const id = useId();
  const { hint, run } = useCommandLinks();
  const selected = selection.kind === 'span' ? selection.id : null;
  useEffect(() => {
    if (selected !== null) setOpen(true);
  }, [selected]);
  const shown = spans.filter((span, i) => all || i < FIRST_SHOWN || span.id === selected);
  return (
    <section className="spans" aria-label="Spoiled spans">
      <button
        type="button"
        className="spans-head"
        aria-expanded={open}
        aria-controls={id}
        onClick={() => setOpen(!open)}
      >
        <span aria-hidden="true">{open ? '▾' : '▸'}</span> Spoiled spans{' '}
        <span className="quiet small">{countWords(spans)}</span>
      </button>
      <div id={id} hidden={!open}>
        {open && spans.length > 0 ? (
          <ul className="span-list">
            {shown.map((span) => (
              <SpanRow
                key={span.id}
                span={span}
                selected={span.id === selected}
                session={session}
                view={view}
                onEdit={onEdit}
              />
            ))}
          </ul>
        ) : null}
        {open && spans.length === 0 ? (
          <p className="quiet">Nothing is excluded. Draw a span on the traces to exclude it.</p>
        ) : null}
        {open ? (
          <button
            type="button"
            className="button slight"
            title={hint('All of them with typed times', 'spans')}
            onClick={() => run('spans')}
          >
            By number…
          </button>
        ) : null}
        {open && spans.length > shown.length ? (
          <button type="button" className="button slight" onClick={() => setAll(true)}>
            Show all {spans.length}
          </button>
        ) : null}
      </div>
    </section>
  );
}

function countWords(spans: readonly Span[]): string {
  if (spans.length === 0) return 'none';
  const proposed = spans.filter((span) => span.origin === 'proposed').length;
  const drawn = spans.length - proposed;
  return [drawn > 0 ? `${drawn} drawn` : '', proposed > 0 ? `${proposed} proposed` : '']
    .filter((part) => part !== '')
    .join(', ');
}

interface SpanRowProps extends FindingsSpansProps {
  readonly span: Span;
  readonly selected: boolean;
}

function SpanRow({ span, selected, session, view, onEdit }: SpanRowProps) {
  const stretch = `${formatClock(span.fromS)}–${formatClock(span.toS)}`;
  const state = () => session.getState().session?.state;
  const change = (parts: Partial<Omit<Span, 'id'>>) => {
    const now = state();
    if (now) onEdit(changeSpan(now, span.id, parts));
  };
  const remove = () => {
    const now = state();
    if (now) onEdit(removeSpans(now, [span.id]));
    view.setState({ selection: { kind: 'none' } });
  };
  const pick = () => {
    view.setState({
      selection: selected ? { kind: 'none' } : { kind: 'span', id: span.id },
    });
    if (!selected) goToStretch(view, span.fromS, span.toS);
  };
  return (
    <li className={selected ? 'span-row selected' : 'span-row'}>
      <button type="button" className="span-pick" aria-expanded={selected} onClick={pick}>
        <span className="go">{stretch}</span>
        <span>
          {span.cause}, {targetWords(span)}
        </span>
        <span className="quiet small">{span.origin}</span>
        <span className="unseen">: go there</span>
      </button>
      {selected ? (
        <SpanEdit span={span} onChange={change} onRemove={remove} />
      ) : span.note ? (
        <p className="small quiet span-note">{span.note}</p>
      ) : null}
    </li>
  );
}

interface SpanEditProps {
  readonly span: Span;
  readonly onChange: (parts: Partial<Omit<Span, 'id'>>) => void;
  readonly onRemove: () => void;
}

function SpanEdit({ span, onChange, onRemove }: SpanEditProps) {
  return (
    <div className="span-edit">
      <label>
        <span>for</span>
        <select
          value={span.target}
          onChange={(event) => {
            const target = SPAN_TARGETS.find((one) => one === event.target.value);
            if (target) onChange({ target });
          }}
        >
          {SPAN_TARGETS.map((target) => (
            <option key={target}>{target}</option>
          ))}
        </select>
      </label>
      <label>
        <span>cause</span>
        <select
          value={span.cause}
          onChange={(event) => {
            const cause = SPAN_CAUSES.find((one) => one === event.target.value);
            if (cause) onChange({ cause });
          }}
        >
          {SPAN_CAUSES.map((cause) => (
            <option key={cause}>{cause}</option>
          ))}
        </select>
      </label>
      <button type="button" className="button slight" onClick={onRemove}>
        Remove
      </button>
      <NoteField key={span.note} note={span.note} onCommit={(note) => onChange({ note })} />
      <p className="small quiet">
        {span.lead === null ? 'On all leads.' : `On lead ${span.lead}.`}
      </p>
    </div>
  );
}

const targetWords = (span: Span): string =>
  span.target === 'both' ? 'stomach and heart' : span.target;

interface NoteFieldProps {
  readonly note: string;
  readonly onCommit: (note: string) => void;
}

/** The note is one edit when it is left or Enter is pressed, not one a letter. */
function NoteField({ note, onCommit }: NoteFieldProps) {
  const [text, setText] = useState(note);
  const commit = () => {
    if (text.trim() !== note) onCommit(text.trim());
  };
  return (
    <label className="span-note-field">
      <span>note</span>
      <input
        type="text"
        value={text}
        autoComplete="off"
        onChange={(event) => setText(event.target.value)}
        onBlur={commit}
        onKeyDown={(event) => {
          if (event.key === 'Enter') commit();
        }}
      />
    </label>
  );
}
