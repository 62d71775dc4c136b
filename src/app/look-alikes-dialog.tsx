import './look-alikes.css';
import { useEffect, useMemo, useState } from 'react';
import { useStore } from 'zustand';
import type { LookAlike, LookAlikes } from '../../workers/analysis-api';
import type { DoubtEnding } from '../recording/doubt';
import type { Reply } from '../recording/failure';
import { openBeats } from '../review/beat-commands';
import { KIND_WORDS, placeWords, tabWords } from '../review/doubt-words';
import { asWork } from '../review/idle';
import { mendableTogether, openDoubts } from '../review/open-doubts';
import { type WaveFrame, wavePath, waveRange } from '../review/wave-path';
import { inputsOf } from './analysis-runner';
import { type AppParts, useApp } from './app-context';
import { Dialog } from './dialog';
import { FailureWords } from './small-dialogs';

/** The open doubts whose beats look most like that of one of them, drawn over each other and settled together. */
export function LookAlikesDialog({ doubtId }: { readonly doubtId: string }) {
  const parts = useApp();
  const reply = useLookAlikes(parts, doubtId);
  const close = () => parts.shell.getState().closeDialog();
  if (reply?.ok) return <Found found={reply.value} onClose={close} />;
  return (
    <Dialog title="Look-alikes" size="large" onClose={close}>
      {reply ? (
        <FailureWords failure={reply.failure} />
      ) : (
        <p role="status">Looking for beats that look alike…</p>
      )}
    </Dialog>
  );
}

function useLookAlikes(
  { session, doubtAccess }: AppParts,
  doubtId: string,
): Reply<LookAlikes> | null {
  const [reply, setReply] = useState<Reply<LookAlikes> | null>(null);
  useEffect(() => {
    const open = session.getState().session;
    if (!open) return undefined;
    const abort = new AbortController();
    const { signal } = abort;
    const asked = doubtAccess.lookAlikes(inputsOf(open), open.state.doubts, doubtId, { signal });
    void asWork(asked).then((found) => {
      if (!signal.aborted) setReply(found);
    });
    return () => abort.abort();
  }, [session, doubtAccess, doubtId]);
  return reply;
}

interface FoundProps {
  readonly found: LookAlikes;
  readonly onClose: () => void;
}

function Found({ found, onClose }: FoundProps) {
  const parts = useApp();
  const acts = useStore(parts.doubts, (state) => state.acts);
  const [left, setLeft] = useState(() => otherwiseProposed(found));
  const rows = useMemo(() => [found.asked, ...found.others], [found]);
  const rateHz = openBeats(parts)?.rateHz ?? null;
  const taken = rows.filter(({ doubt }) => !left.has(doubt.id));
  const mendable = mendableTogether(taken.map(({ doubt }) => doubt));
  const settle = (ending: DoubtEnding) => {
    const state = parts.session.getState().session?.state;
    const chosen = ending === 'kept' ? taken.map(({ doubt }) => doubt) : mendable;
    onClose();
    if (state && acts) acts.settle(openDoubts(chosen, state), ending);
  };
  const turn = (id: string, on: boolean) => {
    const next = new Set(left);
    if (on) next.delete(id);
    else next.add(id);
    setLeft(next);
  };
  const { doubt } = found.asked;
  return (
    <Dialog
      title="Look-alikes"
      subtitle={`Open doubts whose beats look most like the one at ${placeWords(doubt, rateHz)}, ${KIND_WORDS[doubt.kind]}`}
      size="large"
      onClose={onClose}
      actions={
        <>
          <button type="button" className="button left" onClick={onClose}>
            Leave them open
          </button>
          <button
            type="button"
            className="button"
            disabled={taken.length === 0}
            onClick={() => settle('kept')}
          >
            Keep {countWords(taken.length)}
          </button>
          <button
            type="button"
            className="button strong"
            disabled={mendable.length === 0}
            onClick={() => settle('mended')}
          >
            Mend {countWords(mendable.length)}
          </button>
        </>
      }
    >
      <Overlay found={found} taken={taken} />
      {found.others.length === 0 ? (
        <p>No other open doubt has a beat that looks like this one.</p>
      ) : (
        <p className="small quiet">
          Take out of the choice what does not belong: {taken.length} of {rows.length} are chosen.
          Each is mended as it proposes, all as one step that Undo takes back.
        </p>
      )}
      <ul className="alike-list">
        {rows.map((row) => (
          <li key={row.doubt.id}>
            <Tile
              row={row}
              average={found.averageUv}
              place={placeWords(row.doubt, rateHz)}
              asked={row === found.asked}
              on={!left.has(row.doubt.id)}
              onTurn={(on) => turn(row.doubt.id, on)}
            />
          </li>
        ))}
      </ul>
    </Dialog>
  );
}

/** What is left out to begin with: beats for which something else is proposed than for the one in doubt. */
function otherwiseProposed({ asked, others }: LookAlikes): ReadonlySet<string> {
  const words = tabWords(asked.doubt);
  const unlike = others.filter(({ doubt }) => tabWords(doubt) !== words);
  return new Set(unlike.map(({ doubt }) => doubt.id));
}

const countWords = (count: number): string => (count === 1 ? 'the one' : `all ${count}`);

const OVERLAY = { width: 900, height: 170 } as const;
const TILE = { width: 190, height: 56 } as const;

const framed = (
  size: { readonly width: number; readonly height: number },
  series: readonly ArrayLike<number>[],
): WaveFrame => {
  const [low, high] = waveRange(series);
  return { ...size, low, high };
};

interface OverlayProps {
  readonly found: LookAlikes;
  readonly taken: readonly LookAlike[];
}

/** All chosen beats over each other, the one asked for the heaviest, the usual shape behind them. */
function Overlay({ found, taken }: OverlayProps) {
  const { asked, others, averageUv, beforeS, rateHz } = found;
  const all = [asked, ...others].map(({ heartbeatUv }) => heartbeatUv);
  const frame = framed(OVERLAY, averageUv ? [averageUv, ...all] : all);
  const { width, height } = OVERLAY;
  const atX = ((beforeS * rateHz) / Math.max(1, asked.heartbeatUv.length - 1)) * width;
  return (
    <figure className="alike-overlay">
      <svg viewBox={`0 0 ${width} ${height}`} preserveAspectRatio="none" aria-hidden="true">
        <line className="alike-at" x1={atX} x2={atX} y1={0} y2={height} />
        {averageUv ? <path className="alike-average" d={wavePath(averageUv, frame)} /> : null}
        {taken.map((row) => (
          <path
            key={row.doubt.id}
            className={row === asked ? 'alike-asked' : 'alike-beat'}
            d={wavePath(row.heartbeatUv, frame)}
          />
        ))}
      </svg>
      <figcaption className="small quiet">
        {taken.length} {taken.length === 1 ? 'beat' : 'beats'} over each other, one second
        {averageUv ? '; the broad grey line is the usual shape of this study' : ''}. Height{' '}
        {Math.round(frame.high - frame.low)} µV.
      </figcaption>
    </figure>
  );
}

interface TileProps {
  readonly row: LookAlike;
  readonly average: Float32Array | null;
  readonly place: string;
  readonly asked: boolean;
  readonly on: boolean;
  readonly onTurn: (on: boolean) => void;
}

function Tile({ row, average, place, asked, on, onTurn }: TileProps) {
  const { doubt, likeness, heartbeatUv } = row;
  const frame = framed(TILE, average ? [average, heartbeatUv] : [heartbeatUv]);
  const alike = asked ? 'the one in doubt' : `${Math.round(100 * likeness)} % alike`;
  return (
    <label className={on ? 'alike' : 'alike off'}>
      <span className="alike-head">
        <input type="checkbox" checked={on} onChange={(event) => onTurn(event.target.checked)} />
        <span>{place}</span>
        <span className="doubt-tab">{tabWords(doubt)}</span>
      </span>
      <svg
        viewBox={`0 0 ${TILE.width} ${TILE.height}`}
        preserveAspectRatio="none"
        aria-hidden="true"
      >
        {average ? <path className="alike-average" d={wavePath(average, frame)} /> : null}
        <path className="alike-asked" d={wavePath(heartbeatUv, frame)} />
      </svg>
      <span className="small quiet">{alike}</span>
    </label>
  );
}
