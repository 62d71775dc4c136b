import type { SharedMedian, SharedPhase, SharedWindow } from '../../recording/evidence/together';
import { HeadRow } from '../../review/head-row';
import { formatClock } from '../../units/time';
import { written } from './chart-scale';

const shown = (value: number | null, decimals: number) =>
  value === null ? '—' : written(value, decimals);

const COLUMNS = ['DF, cpm', 'DP, dB', 'heart rate, 1/min', 'HF, ms²', 'breathing, 1/min'] as const;

/** Medians of each phase over the windows in which both organs are known. */
export function PhaseTable({ phases }: { readonly phases: readonly SharedPhase[] }) {
  const median = ({ value, windows }: SharedMedian, decimals: number, shared: number) =>
    value !== null && windows < shared
      ? `${shown(value, decimals)} (${windows})`
      : shown(value, decimals);
  return (
    <table className="data-table">
      <caption>Medians by phase</caption>
      <HeadRow names={['phase', 'windows of both', ...COLUMNS]} />
      <tbody>
        {phases.map((phase) => (
          <tr key={phase.name}>
            <th scope="row">{phase.name}</th>
            <td>
              {phase.shared} of {phase.windows}
            </td>
            <td>{median(phase.dfCpm, 2, phase.shared)}</td>
            <td>{median(phase.dpDb, 1, phase.shared)}</td>
            <td>{median(phase.heartRateBpm, 1, phase.shared)}</td>
            <td>{median(phase.hfMs2, 0, phase.shared)}</td>
            <td>{median(phase.breathingPerMin, 1, phase.shared)}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

/** Every window in numbers. */
export function WindowTable({ windows }: { readonly windows: readonly SharedWindow[] }) {
  return (
    <table className="data-table">
      <HeadRow names={['centre', 'rhythm', ...COLUMNS]} />
      <tbody>
        {windows.map((one) => (
          <tr key={`${one.phase} ${one.fromS}`}>
            <th scope="row">{formatClock((one.fromS + one.toS) / 2)}</th>
            <td>{one.rhythm === 'undecided' ? 'not decidable' : (one.rhythm ?? '—')}</td>
            <td>{shown(one.dfCpm, 2)}</td>
            <td>{shown(one.dpDb, 1)}</td>
            <td>{shown(one.heartRateBpm, 1)}</td>
            <td>{shown(one.hfMs2, 0)}</td>
            <td>{shown(one.breathingPerMin, 1)}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
