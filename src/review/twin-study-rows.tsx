import { useStore } from 'zustand';
import { leadKey } from '../recording/lead';
import { formatClock } from '../units/time';
import { HeadRow } from './head-row';
import { goTo } from './navigate';
import { ratesByMinute } from './rate-by-minute';
import type { PaneStores } from './row-view';

const MOST_ROWS = 500;
const NONE = '–';

const RHYTHMS = ['brady', 'normo', 'tachy', 'none', 'mixed', 'undecided'] as const;

/** The phases of the study with what is left of each and the rhythms of their epochs: what Whole study draws. */
export function PhaseRows({ stores }: { readonly stores: PaneStores }) {
  const phases = useStore(stores.session, (state) => state.session?.state.phases) ?? [];
  const roles = useStore(stores.session, (state) => state.session?.state.roles);
  const findings = useStore(stores.analysis, (state) => state.findings);
  const stomach = useStore(stores.analysis, (state) => state.stomach);
  const reported = roles?.slow[roles.reported];
  const epochs =
    stomach.find((one) => reported !== undefined && one.lead === leadKey(reported))?.epochs ?? [];
  const rhythmsOf = (phase: string) =>
    RHYTHMS.map((rhythm) => {
      const count = epochs.filter(
        (one) => one.phase === phase && one.kept && (one.rhythm ?? 'none') === rhythm,
      ).length;
      return count > 0 ? `${count} ${rhythm === 'undecided' ? 'not decidable' : rhythm}` : '';
    }).filter((part) => part !== '');
  const minutes = (s: number | undefined) => (s === undefined ? NONE : (s / 60).toFixed(1));
  return (
    <table>
      <caption>Phases</caption>
      <HeadRow
        names={[
          'phase',
          'from',
          'to',
          'minutes',
          'kept, stomach',
          'kept, heart',
          'epochs by rhythm',
          'place',
        ]}
      />
      <tbody>
        {phases.map((phase) => {
          const found = findings?.phases.find(({ name }) => name === phase.name);
          return (
            <tr key={phase.name}>
              <td>{phase.name}</td>
              <td>{formatClock(phase.fromS)}</td>
              <td>{formatClock(phase.toS)}</td>
              <td>{minutes(phase.toS - phase.fromS)}</td>
              <td>{minutes(found?.keptStomachS)}</td>
              <td>{minutes(found?.keptHeartS)}</td>
              <td>{rhythmsOf(phase.name).join(', ') || NONE}</td>
              <td>
                <button
                  type="button"
                  aria-label={`go to the beginning of ${phase.name}`}
                  onClick={() => goTo(stores.view, phase.fromS)}
                >
                  go to
                </button>
              </td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}

/** Heart rate and breathing of the Minutes window, minute by minute. */
export function RateRows({ stores }: { readonly stores: PaneStores }) {
  const window = useStore(stores.view, (state) => state.minutes);
  const rr = useStore(stores.analysis, (state) => state.heart?.rr ?? null);
  const breathing = useStore(stores.analysis, (state) => state.breathing);
  const rows = ratesByMinute(rr, breathing, window).slice(0, MOST_ROWS);
  const shown = (value: number, decimals = 0) =>
    Number.isNaN(value) ? NONE : value.toFixed(decimals);
  return (
    <table>
      <caption>
        Heart rate and breathing from {formatClock(window.fromS)} to {formatClock(window.toS)}, a
        minute
      </caption>
      <HeadRow
        names={['minute from', 'NN intervals', 'heart rate', 'lowest', 'highest', 'breathing']}
      />
      <tbody>
        {rows.map((row) => (
          <tr key={row.fromS}>
            <td>{formatClock(row.fromS)}</td>
            <td>{row.nnBeats}</td>
            <td>{shown(row.mean)}</td>
            <td>{shown(row.low)}</td>
            <td>{shown(row.high)}</td>
            <td>{shown(row.breaths, 1)}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
