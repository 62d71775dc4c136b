import { useStore } from 'zustand';
import { beatAt } from '../recording/beat';
import { ticksToSeconds } from '../units/ticks';
import { formatClock } from '../units/time';
import { beatsInView, rrMsAt } from './beats-in-view';
import { HeadRow } from './head-row';
import { goTo } from './navigate';
import { openBeats, selectedTicks } from './open-beats';
import type { PaneStores } from './row-view';
import type { TwinProps } from './twin-tables';

export { PhaseRows, RateRows } from './twin-study-rows';

const MOST_ROWS = 500;

/** The beats of the Seconds window, each a way to select it. */
export function BeatRows({ stores, commands }: TwinProps) {
  const seconds = useStore(stores.view, (state) => state.seconds);
  useStore(stores.view, (state) => state.selection);
  useStore(stores.session, (state) => state.session?.state.beats);
  const open = openBeats(stores);
  if (!open) return <p>No beats.</p>;
  const [from, to] = beatsInView(open.state.beats, seconds, open.rateHz);
  const chosen = new Set(selectedTicks(stores));
  const indexes = Array.from({ length: Math.min(MOST_ROWS, to - from) }, (_, i) => from + i);
  return (
    <table>
      <caption>
        Beats from {formatClock(seconds.fromS, 1)} to {formatClock(seconds.toS, 1)}
      </caption>
      <thead>
        <tr>
          <th scope="col">time</th>
          <th scope="col">class</th>
          <th scope="col">interval, ms</th>
          <th scope="col">origin</th>
          <th scope="col">selected</th>
        </tr>
      </thead>
      <tbody>
        {indexes.map((index) => {
          const { tick, beatClass, origin } = beatAt(open.state.beats, index);
          const rrMs = rrMsAt(open.state.beats, index, open.rateHz);
          const time = formatClock(ticksToSeconds(tick, open.rateHz), 3);
          return (
            <tr key={tick}>
              <td>{time}</td>
              <td>{beatClass}</td>
              <td>{!Number.isNaN(rrMs) ? Math.round(rrMs) : ''}</td>
              <td>{origin}</td>
              <td>
                <button
                  type="button"
                  aria-pressed={chosen.has(tick)}
                  aria-label={`select the beat at ${time}`}
                  onClick={(event) => commands.selectBeat(tick, event.shiftKey)}
                >
                  {chosen.has(tick) ? 'yes' : 'select'}
                </button>
              </td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}

/** The epochs of the Minutes window. */
export function EpochRows({ stores }: { readonly stores: PaneStores }) {
  const { fromS, toS } = useStore(stores.view, (state) => state.minutes);
  const stomach = useStore(stores.analysis, (state) => state.stomach);
  const epochs = stomach
    .flatMap((one) => one.epochs)
    .filter((one) => one.toS > fromS && one.fromS < toS)
    .slice(0, MOST_ROWS);
  return (
    <table>
      <caption>
        Epochs from {formatClock(fromS)} to {formatClock(toS)}
      </caption>
      <HeadRow names={['lead', 'phase', 'from', 'to', 'DF, cpm', 'DP, dB', 'rhythm', 'flags']} />
      <tbody>
        {epochs.map((one) => (
          <tr key={`${one.lead} ${one.fromS}`}>
            <td>{one.lead}</td>
            <td>{one.phase}</td>
            <td>{formatClock(one.fromS)}</td>
            <td>{formatClock(one.toS)}</td>
            <td>{one.dfCpm?.toFixed(2) ?? '–'}</td>
            <td>{one.dpDb?.toFixed(1) ?? '–'}</td>
            <td>{one.kept ? one.rhythm : 'not kept'}</td>
            <td>{one.flags.join(' ')}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

/** All spoiled spans, each a way to select it. */
export function SpanRows({ stores, commands }: TwinProps) {
  const spans = useStore(stores.session, (state) => state.session?.state.spans) ?? [];
  return (
    <table>
      <caption>Spoiled spans</caption>
      <HeadRow names={['from', 'to', 'excluded for', 'cause', 'lead', 'origin', 'place']} />
      <tbody>
        {[...spans]
          .sort((a, b) => a.fromS - b.fromS)
          .map((span) => (
            <tr key={span.id}>
              <td>{formatClock(span.fromS, 1)}</td>
              <td>{formatClock(span.toS, 1)}</td>
              <td>{span.target}</td>
              <td>{span.cause}</td>
              <td>{span.lead ?? 'all'}</td>
              <td>{span.origin}</td>
              <td>
                <button
                  type="button"
                  aria-label={`go to the span at ${formatClock(span.fromS, 1)}`}
                  onClick={() => {
                    commands.selectSpan(span.id);
                    goTo(stores.view, (span.fromS + span.toS) / 2);
                  }}
                >
                  go to
                </button>
              </td>
            </tr>
          ))}
      </tbody>
    </table>
  );
}
