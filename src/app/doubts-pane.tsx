import './doubts-pane.css';
import { useEffect, useMemo } from 'react';
import { useStore } from 'zustand';
import type { Doubt, SettledDoubt } from '../recording/doubt';
import { openBeats } from '../review/beat-commands';
import { outcomeWords } from '../review/doubt-follow';
import type { DoubtOutcome, DoubtState } from '../review/doubt-store';
import { effectWords, KIND_WORDS, placeWords } from '../review/doubt-words';
import { doubtInFront, openDoubts } from '../review/open-doubts';
import type { PaneActs } from '../review/pane-acts';
import { useAnalysis, useSession } from './app-context';
import type { CommandParts } from './command';
import { CommandButton } from './command-button';
import { commandOf } from './commands';
import { DoubtCard } from './doubt-card';
import { startDoubts } from './doubt-desk';
import { FailureWords } from './small-dialogs';

interface DoubtsPaneProps {
  readonly parts: CommandParts;
  readonly act: PaneActs;
}

const NONE: readonly never[] = [];
const MOST_ROWS = 40;

/** The places where the program is unsure: the one in front with what can be done about it, the next ones below it. */
export function DoubtsPane({ parts, act }: DoubtsPaneProps) {
  useEffect(() => startDoubts(parts, act), [parts, act]);
  const doubts = useStore(parts.doubts);
  const state = useSession(({ session }) => session?.state);
  const edit = useSession(({ session }) => session?.log.length ?? 0);
  const { listed, frontId } = doubts;
  const open = useMemo(() => (listed && state ? openDoubts(listed, state) : NONE), [listed, state]);
  const front = doubtInFront(open, frontId);
  const stale = listed !== null && doubts.edit < edit;
  const settled = state?.doubts ?? NONE;
  return (
    <section className={stale ? 'doubts stale' : 'doubts'} aria-labelledby="doubts-title">
      <header className="doubts-head">
        <h2 id="doubts-title">Doubts</h2>
        {doubts.outcome ? null : <p className="quiet">{headWords(doubts, open, settled)}</p>}
        <Outcome parts={parts} outcome={doubts.outcome} />
      </header>
      <p className="unseen" role="status" data-part="spoken">
        {doubts.spoken}
      </p>
      <div className="doubts-body" aria-busy={doubts.search.kind === 'looking'}>
        {front ? (
          <DoubtCard parts={parts} doubt={front} at={open.indexOf(front) + 1} of={open.length} />
        ) : (
          <NoDoubt doubts={doubts} settled={settled} />
        )}
        {front && doubts.search.kind === 'failed' ? <Failed doubts={doubts} /> : null}
        <Others parts={parts} open={open} front={front} />
      </div>
    </section>
  );
}

function headWords(
  { listed, search }: DoubtState,
  open: readonly Doubt[],
  settled: readonly SettledDoubt[],
): string {
  if (!listed) return search.kind === 'looking' ? 'being looked for' : '';
  const effect = open.length > 0 ? open[0].effect : null;
  const most = effect && effectWords(effect);
  const count =
    settled.length > 0 ? `${open.length} open, ${settled.length} settled` : `${open.length} open`;
  return most && !most.same ? `${count}; first what moves ${most.name}` : count;
}

interface OutcomeProps {
  readonly parts: CommandParts;
  readonly outcome: DoubtOutcome | null;
}

/** What was settled last, with the way to take it back. */
function Outcome({ parts, outcome }: OutcomeProps) {
  return (
    <>
      <p role="status" className={outcome ? undefined : 'unseen'}>
        {outcome ? outcomeWords(outcome) : ''}
      </p>
      {outcome ? (
        <CommandButton
          command={commandOf('undo')}
          parts={parts}
          words="Undo"
          readWhole
          className="button slight"
        />
      ) : null}
    </>
  );
}

interface NoDoubtProps {
  readonly doubts: DoubtState;
  readonly settled: readonly SettledDoubt[];
}

/** What stands in the place of a doubt: why there is none, or that they are still being looked for. */
function NoDoubt({ doubts, settled }: NoDoubtProps) {
  const fileAtHand = useAnalysis((state) => state.fileAtHand);
  const stopped = useAnalysis((state) => state.stopped);
  const { search, listed } = doubts;
  if (search.kind === 'failed') return <Failed doubts={doubts} />;
  if (listed && search.kind === 'there') {
    const mended = settled.filter(({ ending }) => ending === 'mended').length;
    return (
      <div className="doubts-none">
        <p>No open doubts</p>
        <p className="quiet small">
          {settled.length === 0
            ? 'The program is unsure of nothing here. It may be wrong all the same: look at the traces.'
            : `${mended} mended, ${settled.length - mended} kept as it was.`}
        </p>
      </div>
    );
  }
  const words =
    search.kind === 'looking'
      ? 'Looking for places where the program is unsure…'
      : !fileAtHand
        ? 'Doubts are looked for once the recording is chosen again.'
        : stopped
          ? 'Doubts are looked for once the figures are computed.'
          : 'Doubts are looked for after the figures.';
  return <p className="doubts-none quiet">{words}</p>;
}

function Failed({ doubts: { search, acts } }: Pick<NoDoubtProps, 'doubts'>) {
  if (search.kind !== 'failed') return null;
  return (
    <div className="doubts-failed">
      <p className="failure-what">Doubts could not be looked for.</p>
      <FailureWords failure={search.failure} />
      <button type="button" className="button slight" onClick={() => acts?.lookAgain()}>
        Look again
      </button>
    </div>
  );
}

interface OthersProps {
  readonly parts: CommandParts;
  readonly open: readonly Doubt[];
  readonly front: Doubt | null;
}

/** The doubts that come after the one in front, each a way to its place. */
function Others({ parts, open, front }: OthersProps) {
  const at = front ? open.indexOf(front) : -1;
  const others = [...open.slice(at + 1), ...open.slice(0, Math.max(0, at))];
  if (others.length === 0) return null;
  const rateHz = openBeats(parts)?.rateHz ?? null;
  return (
    <>
      <ul className="doubt-list" aria-label="Further doubts">
        {others.slice(0, MOST_ROWS).map((doubt) => (
          <li key={doubt.id}>
            <DoubtRow
              doubt={doubt}
              place={placeWords(doubt, rateHz)}
              onGo={() => parts.doubts.getState().acts?.goTo(doubt.id)}
            />
          </li>
        ))}
      </ul>
      {others.length > MOST_ROWS ? (
        <p className="small quiet">and {others.length - MOST_ROWS} more</p>
      ) : null}
    </>
  );
}

interface DoubtRowProps {
  readonly doubt: Doubt;
  readonly place: string;
  readonly onGo: () => void;
}

function DoubtRow({ doubt, place, onGo }: DoubtRowProps) {
  const words = doubt.effect && effectWords(doubt.effect);
  return (
    <button type="button" className="doubt-row" title={doubt.why} onClick={onGo}>
      <span className="go">{place}</span>
      <span>{KIND_WORDS[doubt.kind]}</span>
      {words && !words.same ? (
        <span className="quiet small">
          {words.name} {words.before} → {words.after}
        </span>
      ) : null}
      <span className="unseen">: go there</span>
    </button>
  );
}
