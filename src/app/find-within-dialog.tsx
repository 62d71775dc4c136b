import { useEffect, useState } from 'react';
import type { FoundWithin } from '../../workers/analysis-api';
import type { Failure, Reply } from '../recording/failure';
import { type Lead, leadKey, leadName, sameLead } from '../recording/lead';
import { openBeats } from '../review/open-beats';
import { lookAtSeconds, type TimeWindow } from '../review/view-store';
import {
  changePhrase,
  type FoundChange,
  foundEdit,
  foundName,
  foundWithin,
} from '../session/found-within';
import { ticksToSeconds } from '../units/ticks';
import { formatClock } from '../units/time';
import { useApp } from './app-context';
import { Dialog } from './dialog';
import { Choice } from './fields';
import {
  choiceWords,
  EAGERNESS,
  type FindChoices,
  leadsToLookIn,
  POLARITIES,
} from './find-within-draft';
import { FormActions } from './form-actions';
import { RangeFields, rangeAtFirst, readRange } from './range-fields';
import { FailureWords } from './small-dialogs';
import { timeRule, useTimeFrame } from './time-field';

/** Finds the beats of a stretch again with other choices; what would change is drawn in Seconds before it is taken. */
export function FindWithinDialog() {
  const parts = useApp();
  const { shell, view, session, analysis, controller } = parts;
  const [range, setRange] = useState(() => rangeAtFirst(parts));
  const state = session.getState().session?.state;
  const { recording } = analysis.getState();
  const heart = state?.roles.heart ?? null;
  const [choices, setChoices] = useState<FindChoices>({
    lead: heart ? leadKey(heart) : '',
    polarity: 'dominant',
    eager: 'usual',
  });
  const frame = useTimeFrame();
  const read = readRange(range, frame);
  const [before] = useState(() => {
    const { minutes, seconds } = view.getState();
    return { minutes, seconds };
  });
  const close = () => shell.getState().closeDialog();
  const leave = () => {
    view.setState(before);
    close();
  };
  const channels = recording?.channels ?? [];
  const leads = state ? leadsToLookIn(state.roles, channels) : [];
  const lead = leads.find((one) => leadKey(one) === choices.lead);
  const looked = useFound(read.ok ? read.window : null, lead ?? null, choices);
  const change = looked.kind === 'found' ? looked.change : null;
  const take = () => {
    if (!change || !read.ok || !heart) return;
    const words = choiceWords(choices, heart, channels, leads);
    const edit = foundEdit(change, foundName(read.window, words, change));
    if (edit.changes.length === 0) return;
    close();
    controller.edit(edit);
  };
  return (
    <Dialog
      title="Find the beats of a stretch again"
      subtitle={timeRule(frame)}
      size="above"
      onClose={leave}
      onSubmit={take}
      actions={
        <FormActions
          stay="Leave them"
          go="Take the change"
          onStay={leave}
          disabled={!change || foundEdit(change, '').changes.length === 0}
        />
      }
    >
      <div className="find-fields">
        <RangeFields
          draft={range}
          onDraft={setRange}
          frame={frame}
          faults={read.ok ? null : read}
        />
        <Choice
          label="Look in"
          value={choices.lead}
          options={leads.map((one) => [
            leadKey(one),
            `${leadName(one, channels)}${heart && sameLead(one, heart) ? ' (heart lead)' : ''}`,
          ])}
          onChange={(key) => setChoices({ ...choices, lead: key })}
        />
        <Choice
          label="R peaks are"
          value={choices.polarity}
          options={POLARITIES}
          onChange={(polarity) => setChoices({ ...choices, polarity })}
        />
        <Choice
          label="Look"
          value={choices.eager}
          options={EAGERNESS}
          onChange={(eager) => setChoices({ ...choices, eager })}
        />
      </div>
      <Outcome looked={looked} />
    </Dialog>
  );
}

type Looked =
  | { readonly kind: 'nothing' }
  | { readonly kind: 'looking' }
  | { readonly kind: 'failed'; readonly failure: Failure }
  | { readonly kind: 'found'; readonly change: FoundChange; readonly leftOut: boolean };

/** Looks for the beats whenever the choices change, the look before being stopped; shows what would change in Seconds. */
function useFound(
  window: TimeWindow | null,
  lead: Lead | null,
  { polarity, eager }: FindChoices,
): Looked {
  const { controller, session, view, analysis } = useApp();
  const [looked, setLooked] = useState<Looked>({ kind: 'nothing' });
  const [fromS, toS] = [window?.fromS ?? 0, window?.toS ?? 0];
  const key = lead ? leadKey(lead) : '';
  // biome-ignore lint/correctness/useExhaustiveDependencies: the lead is told by its key
  useEffect(() => {
    const open = openBeats({ session, view, analysis });
    const heartLead = open?.state.roles.heart;
    if (!open || !heartLead || !lead || !(toS > fromS)) {
      setLooked({ kind: 'nothing' });
      return undefined;
    }
    const stop = new AbortController();
    const { spans, settings, beats } = open.state;
    setLooked({ kind: 'looking' });
    const within = { fromS, toS };
    const show = (reply: Reply<FoundWithin>) => {
      if (stop.signal.aborted) return;
      if (!reply.ok) {
        setLooked({ kind: 'failed', failure: reply.failure });
        return;
      }
      const { beats: found, left } = reply.value;
      const times = polarity !== 'dominant' ? 'take' : sameLead(lead, heartLead) ? 'stay' : 'shift';
      const change = foundWithin({
        current: beats,
        found,
        rateHz: open.rateHz,
        within,
        left,
        times,
      });
      setLooked({ kind: 'found', change, leftOut: left.length > 0 });
      view.setState({ preview: { ...within, ...previewOf(change) } });
    };
    void controller
      .findWithin(
        { ...within, lead, heartLead, polarity, eager, spans, settings },
        { signal: stop.signal },
      )
      .then(show);
    lookAtSeconds(view, (fromS + toS) / 2, Math.min(60, Math.max(10, 1.1 * (toS - fromS))));
    return () => {
      stop.abort();
      view.setState({ preview: null });
    };
  }, [fromS, toS, key, polarity, eager]);
  return looked;
}

const previewOf = ({ gained, lost, moved }: FoundChange) => ({
  gained: gained.map(({ tick }) => tick),
  lost: lost.map(({ tick }) => tick),
  moved: moved.map(({ from, to }) => [from.tick, to.tick] as const),
});

/** Places listed, at most. */
const MOST_LISTED = 40;

function Outcome({ looked }: { readonly looked: Looked }) {
  if (looked.kind === 'failed') return <FailureWords failure={looked.failure} />;
  return (
    <>
      <p role="status" className="find-outcome">
        {looked.kind === 'nothing' ? 'Type a stretch of the recording.' : null}
        {looked.kind === 'looking' ? 'Looking…' : null}
        {looked.kind === 'found' ? <strong>{changePhrase(looked.change)}</strong> : null}
        {looked.kind === 'found' && looked.leftOut
          ? '. Spans spoiled for the heart were left out; beats in them stay.'
          : null}
      </p>
      {looked.kind === 'found' ? <Places change={looked.change} /> : null}
    </>
  );
}

/** What would change, one by one; each goes to its place. */
function Places({ change }: { readonly change: FoundChange }) {
  const { view, session, analysis } = useApp();
  const open = openBeats({ view, session, analysis });
  if (!open) return null;
  const places = [
    ...change.gained.map(({ tick, beatClass }) => ({ tick, words: `+ ${beatClass}` })),
    ...change.lost.map(({ tick, beatClass }) => ({ tick, words: `× ${beatClass}` })),
    ...change.moved.map(({ to }) => ({ tick: to.tick, words: '→' })),
  ].sort((a, b) => a.tick - b.tick);
  if (places.length === 0) return null;
  return (
    <>
      <ul className="find-list" aria-label="What would change">
        {places.slice(0, MOST_LISTED).map(({ tick, words }) => {
          const atS = ticksToSeconds(tick, open.rateHz);
          return (
            <li key={`${words} ${tick}`}>
              <button
                type="button"
                className="button slight"
                onClick={() => lookAtSeconds(view, atS, 10)}
              >
                {words} {formatClock(atS, 1)}
              </button>
            </li>
          );
        })}
      </ul>
      <p className="small quiet">
        + gained, × lost, → moved; drawn so in Seconds below.
        {places.length > MOST_LISTED ? ` The first ${MOST_LISTED} of ${places.length}.` : ''}
      </p>
    </>
  );
}
