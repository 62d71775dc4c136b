import type { PhaseFindings } from '../recording/findings';
import type { HeartSegment } from '../recording/heart-series';
import { leadKey } from '../recording/lead';
import type { Epoch } from '../recording/rhythm';
import { formatClock } from '../units/time';
import { useAnalysis, useSession } from './app-context';

interface FigureDataProps {
  readonly part: PhaseFindings;
  readonly onGo: (fromS: number, toS: number) => void;
}

const inside = (part: PhaseFindings, one: { phase: string; fromS: number; toS: number }): boolean =>
  one.phase === part.phase && one.fromS >= part.fromS && one.toS <= part.toS;

const shown = (value: number | null, decimals: number): string =>
  value === null ? '—' : value.toFixed(decimals).replace('-', '−');

/** The epochs of the reported lead that a stomach figure stands on, each with a way to its place. */
export function EpochTable({ part, onGo }: FigureDataProps) {
  const stomach = useAnalysis((state) => state.stomach);
  const roles = useSession((state) => state.session?.state.roles);
  const lead = roles?.slow[roles.reported];
  const rhythm = stomach.find((one) => lead !== undefined && one.lead === leadKey(lead));
  const epochs = rhythm?.epochs.filter((one) => inside(part, one)) ?? [];
  if (epochs.length === 0) return <p className="quiet">No epoch lies wholly inside.</p>;
  return (
    <table className="data-table">
      <caption>Epochs of the reported lead</caption>
      <thead>
        <tr>
          <th scope="col">centre</th>
          <th scope="col">DF, cpm</th>
          <th scope="col">DP, dB</th>
          <th scope="col">rhythm</th>
          <th scope="col">spoiled</th>
        </tr>
      </thead>
      <tbody>
        {epochs.map((epoch) => (
          <EpochRow key={epoch.fromS} epoch={epoch} onGo={onGo} />
        ))}
      </tbody>
    </table>
  );
}

function EpochRow({ epoch, onGo }: { readonly epoch: Epoch } & Pick<FigureDataProps, 'onGo'>) {
  const { fromS, toS, dfCpm, dpDb, rhythm, flags, kept, spoiledFraction } = epoch;
  const centre = formatClock((fromS + toS) / 2);
  return (
    <tr>
      <th scope="row">
        <button
          type="button"
          className="go"
          aria-label={`Go to the epoch at ${centre}`}
          onClick={() => onGo(fromS, toS)}
        >
          {centre}
        </button>
      </th>
      <td>{shown(dfCpm, 2)}</td>
      <td>{shown(dpDb, 1)}</td>
      <td>{[kept ? rhythmWords(rhythm) : 'not kept', ...flags].join(', ')}</td>
      <td>{Math.round(100 * spoiledFraction)} %</td>
    </tr>
  );
}

const rhythmWords = (rhythm: Epoch['rhythm']): string =>
  rhythm === null ? '—' : rhythm === 'undecided' ? 'not decidable' : rhythm;

const STATES: Readonly<Record<HeartSegment['state'], string>> = {
  used: 'used',
  irregular: 'irregular, withheld',
  'too-few-nn': 'too few NN, withheld',
  'too-short': 'too short, withheld',
};

/** The segments that a heart figure stands on, each with a way to its place. */
export function SegmentTable({ part, onGo }: FigureDataProps) {
  const segments = useAnalysis((state) => state.heart?.segments);
  const rows = segments?.filter((one) => inside(part, one)) ?? [];
  if (rows.length === 0) return null;
  return (
    <table className="data-table">
      <caption>Segments</caption>
      <thead>
        <tr>
          <th scope="col">from</th>
          <th scope="col">NN</th>
          <th scope="col">SDNN, ms</th>
          <th scope="col">LF, ms²</th>
          <th scope="col">HF, ms²</th>
          <th scope="col">state</th>
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => (
          <tr key={row.fromS}>
            <th scope="row">
              <button
                type="button"
                className="go"
                aria-label={`Go to the segment at ${formatClock(row.fromS)}`}
                onClick={() => onGo(row.fromS, row.toS)}
              >
                {formatClock(row.fromS)}
              </button>
            </th>
            <td>{Math.floor(100 * row.nnShare)} %</td>
            <td>{shown(row.sdnnMs, 1)}</td>
            <td>{shown(row.lfMs2, 0)}</td>
            <td>{shown(row.hfMs2, 0)}</td>
            <td>{STATES[row.state]}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
