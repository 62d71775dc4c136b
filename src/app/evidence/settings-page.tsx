import './settings-map.css';
import { useEffect, useState } from 'react';
import type { Failure } from '../../recording/failure';
import type { Settings } from '../../recording/settings';
import {
  bestCell,
  type MapScores,
  type NoMap,
  type OrganMap,
  type SettingsMap,
} from '../../recording/settings-map';
import { stateInputs } from '../analysis-runner';
import { useAnalysis, useApp, useSession, withReviewer } from '../app-context';
import { Tick } from '../fields';
import { FailureWords } from '../small-dialogs';
import { HeatMap, LEVELS } from './heat-map';
import {
  aheadText,
  type Cell,
  cellText,
  cellWords,
  proposalWords,
  scoreNumber,
  scoreText,
  settingText,
  stretchWords,
} from './settings-map-words';

type Work =
  | { readonly kind: 'waiting'; readonly done: number }
  | { readonly kind: 'there' }
  | { readonly kind: 'failed'; readonly failure: Failure };

/** The maps of the session as it stands; computed anew after each edit that they depend on, given up when the page is left. */
function useSettingsMap(): { readonly map: SettingsMap | null; readonly work: Work } {
  const { evidenceAccess } = useApp();
  const state = useSession(({ session }) => session?.state ?? null);
  const edit = useSession(({ session }) => session?.log.length ?? 0);
  const fileAtHand = useAnalysis((analysis) => analysis.fileAtHand);
  const [map, setMap] = useState<SettingsMap | null>(null);
  const [work, setWork] = useState<Work>({ kind: 'waiting', done: 0 });
  useEffect(() => {
    if (!state || !fileAtHand) return;
    const abort = new AbortController();
    setWork({ kind: 'waiting', done: 0 });
    const onProgress = (_: string, done: number) => {
      if (!abort.signal.aborted) setWork({ kind: 'waiting', done });
    };
    void evidenceAccess
      .settingsMap(stateInputs(state, edit), { signal: abort.signal, onProgress })
      .then((reply) => {
        if (abort.signal.aborted) return;
        if (reply.ok) setMap(reply.value);
        setWork(reply.ok ? { kind: 'there' } : { kind: 'failed', failure: reply.failure });
      });
    return () => abort.abort();
  }, [evidenceAccess, state, edit, fileAtHand]);
  return { map, work };
}

/** Which settings would do best on this recording: a map an organ, and one button to take a cell. */
export function SettingsPage() {
  const settings = useSession(({ session }) => session?.state.settings ?? null);
  const fileAtHand = useAnalysis((state) => state.fileAtHand);
  const { map, work } = useSettingsMap();
  const [noisy, setNoisy] = useState(false);
  if (!settings) return null;
  if (!fileAtHand) return <p>It can be computed once the recording’s file is open.</p>;
  return (
    <>
      {work.kind === 'failed' ? <FailureWords failure={work.failure} /> : null}
      <p className="small quiet" role="status">
        {work.kind === 'waiting' ? `Being computed, ${Math.floor(100 * work.done)} %.` : ''}
      </p>
      {map ? (
        <div className={work.kind === 'waiting' ? 'stale' : undefined}>
          <p>
            A score is the power of what follows the known signal over the power of the rest, in
            what the route would draw, after the best scale and delay: 0 dB is half and half. It is
            of one stretch of this study, and it is no promise for another.
          </p>
          <Tick label="Add white noise" checked={noisy} onChange={setNoisy} />
          <div className="maps">
            <OrganPart key="slow" title="Slow wave" map={map.slow} {...{ noisy, settings }} />
            <OrganPart key="heart" title="Heartbeat" map={map.heart} {...{ noisy, settings }} />
          </div>
          <Numbers title="Slow wave" map={map.slow} noisy={noisy} />
          <Numbers title="Heartbeat" map={map.heart} noisy={noisy} />
        </div>
      ) : null}
    </>
  );
}

interface OrganPartProps {
  readonly title: string;
  readonly map: OrganMap | NoMap;
  readonly noisy: boolean;
  readonly settings: Settings;
}

function OrganPart({ title, map, noisy, settings }: OrganPartProps) {
  return (
    <section
      aria-label={title}
      className={`map-part of-${title === 'Slow wave' ? 'slow' : 'heart'}`}
    >
      <h3>{title}</h3>
      {map.kind === 'map' ? (
        <MapPart {...{ title, map, noisy, settings }} />
      ) : (
        <p>No map. {map.reason}</p>
      )}
    </section>
  );
}

const highest = (scores: MapScores): number => {
  const { order, window } = bestCell(scores);
  return scores.cells[order][window].snrDb;
};

function MapPart({ title, map, noisy, settings }: OrganPartProps & { readonly map: OrganMap }) {
  const parts = useApp();
  const scores = noisy ? map.noisy : map.recorded;
  const topDb = Math.max(highest(map.recorded), highest(map.noisy));
  const [chosen, setChosen] = useState<Cell | null>(null);
  const [hovered, setHovered] = useState<Cell | null>(null);
  const cell = chosen ?? bestCell(scores);
  const shown = hovered ?? cell;
  const { aheadS } = scores.cells[shown.order][shown.window];
  const take = () =>
    withReviewer(parts, () => parts.controller.changeSettings(withCell(settings, map, cell)));
  return (
    <>
      <HeatMap
        {...{ map, scores, topDb, cell }}
        label={`${title}: score by window and order${noisy ? ', noise added' : ''}`}
        onCell={setChosen}
        onHover={setHovered}
        onChoose={take}
      />
      <Legend topDb={topDb} />
      <p className="map-figure">
        <strong>{cellWords(map, scores, shown)}</strong>
        <span className="small quiet">{aheadText(map, aheadS)}</span>
      </p>
      <p className="button-row">
        <button type="button" className="button" onClick={take}>
          Use fractional, {cellText(map, cell)}
        </button>
      </p>
      <Bars {...{ map, scores }} />
      <p>{proposalWords(map, scores, settings)} Nothing is changed unless you choose it.</p>
      {otherToo(map, settings) ? (
        <p className="small">
          The {map.organ === 'slow' ? 'heartbeat' : 'slow wave'} takes route fractional too: the
          order is one for both.
        </p>
      ) : null}
      <p className="small quiet">{stretchWords(map)}</p>
    </>
  );
}

/** The other organ's route shares the order. */
const otherToo = ({ organ }: OrganMap, { slowRoute, heartRoute }: Settings): boolean =>
  (organ === 'slow' ? heartRoute : slowRoute) === 'fractional';

function withCell(settings: Settings, map: OrganMap, { order, window }: Cell): Settings {
  const fractional = { ...settings.fractional, order: map.orders[order] };
  const windowMs = map.windowsMs[window];
  return map.organ === 'slow'
    ? {
        ...settings,
        slowRoute: 'fractional',
        fractional: { ...fractional, slowWindowMs: windowMs },
      }
    : {
        ...settings,
        heartRoute: 'fractional',
        fractional: { ...fractional, heartWindowMs: windowMs },
      };
}

function Legend({ topDb }: { readonly topDb: number }) {
  return (
    <p className="map-legend small">
      <span>{scoreText(topDb - LEVELS)} and below</span>
      <svg width={LEVELS * 12 + 12} height={14} aria-hidden="true">
        {Array.from({ length: LEVELS + 1 }, (_, level) => (
          <rect
            // biome-ignore lint/suspicious/noArrayIndexKey: a level is its index
            key={level}
            className={`level-${level}`}
            x={level * 12}
            y={1}
            width={12}
            height={12}
          />
        ))}
      </svg>
      <span>{scoreText(topDb)}</span>
      <span className="quiet">○ best × as set □ in hand</span>
    </p>
  );
}

/** Full length of a bar, and what it stands for. */
const BAR_PX = 150;
const BAR_DB = 30;

/** The routes without a map, and the fractional one as set, as single bars. */
function Bars({ map, scores }: { readonly map: OrganMap; readonly scores: MapScores }) {
  const rows = [
    ...scores.bars.map(({ route, snrDb }) => ({ name: `route ${route}`, snrDb })),
    {
      name: `route fractional as set (${settingText(map.order, map.windowMs)})`,
      snrDb: scores.asSet.snrDb,
    },
  ];
  return (
    <table className="map-bars">
      <caption>Routes by the same score</caption>
      <tbody>
        {rows.map(({ name, snrDb }) => (
          <tr key={name}>
            <th scope="row">{name}</th>
            <td>{scoreText(snrDb)}</td>
            <td>
              <svg width={BAR_PX} height={12} aria-hidden="true">
                <rect
                  className="bar"
                  y={1}
                  width={(BAR_PX * Math.max(0, Math.min(BAR_DB, snrDb))) / BAR_DB}
                  height={10}
                />
              </svg>
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

/** A map as a table, made when it is asked for. */
function Numbers({ title, map, noisy }: Omit<OrganPartProps, 'settings'>) {
  const [open, setOpen] = useState(false);
  if (map.kind === 'no-map') return null;
  const scores = noisy ? map.noisy : map.recorded;
  return (
    <details onToggle={(event) => setOpen(event.currentTarget.open)}>
      <summary>{title}: all figures of the map</summary>
      {open ? (
        <div className="map-numbers">
          <table>
            <caption>{title}: score in dB by order and window in ms</caption>
            <thead>
              <tr>
                <th scope="col">order</th>
                {map.windowsMs.map((windowMs) => (
                  <th key={windowMs} scope="col">
                    {windowMs}
                  </th>
                ))}
              </tr>
            </thead>
            <tbody>
              {map.orders.map((order, a) => (
                <tr key={order}>
                  <th scope="row">{order.toFixed(2)}</th>
                  {map.windowsMs.map((windowMs, w) => (
                    <td key={windowMs}>{scoreNumber(scores.cells[a][w].snrDb)}</td>
                  ))}
                </tr>
              ))}
            </tbody>
          </table>
        </div>
      ) : null}
    </details>
  );
}
