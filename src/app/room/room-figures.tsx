import { useStore } from 'zustand';
import { FIGURES, type FigureDefinition } from '../../recording/figure-catalogue';
import type { Findings, PhaseFindings } from '../../recording/findings';
import { figureWords, firstPair } from '../../review/findings-words';
import { editNumber } from '../../session/store';
import type { CommandParts } from '../command';

/** The few figures a room can read at once. */
const SHOWN = [
  'df_median_cpm',
  'time_normo_pct',
  'dp_mean_spectrum_db',
  'heart_rate_bpm',
  'rmssd_ms',
];
const COLUMNS = FIGURES.filter(({ key }) => SHOWN.includes(key));

interface RoomFiguresProps {
  readonly commands: CommandParts;
  /** The figures as they were on entering. */
  readonly before: Findings | null;
}

/** A few figures by phase, large; one that an edit made here has changed says what it was. */
export function RoomFigures({ commands, before }: RoomFiguresProps) {
  const findings = useStore(commands.analysis, (state) => state.findings);
  const computed = useStore(commands.analysis, (state) => state.edit);
  const stopped = useStore(commands.analysis, (state) => state.stopped);
  const edit = useStore(commands.session, ({ session }) => (session ? editNumber(session) : 0));
  if (!findings) return null;
  const stale = computed < edit;
  const phases = firstPair(findings).flatMap((name) =>
    findings.phases.filter((phase) => phase.name === name),
  );
  return (
    <section
      className={stale ? 'room-figures stale' : 'room-figures'}
      aria-label="Figures"
      aria-busy={stale && !stopped}
    >
      <table>
        <thead>
          <tr>
            <td />
            {COLUMNS.map(({ key, organ, label, unit }) => (
              <th scope="col" key={key} className={`organ-${organ}`}>
                {label} <span className="unit">{unit.replace('% of time', '%')}</span>
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {phases.map((phase) => (
            <tr key={phase.name}>
              <th scope="row">{phase.name}</th>
              {COLUMNS.map((column) => (
                <FigureCell
                  key={column.key}
                  column={column}
                  phase={phase}
                  before={before?.phases.find(({ name }) => name === phase.name)}
                />
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}

interface FigureCellProps {
  readonly column: FigureDefinition;
  readonly phase: PhaseFindings;
  readonly before: PhaseFindings | undefined;
}

function FigureCell({ column, phase, before }: FigureCellProps) {
  const words = figureWords(phase.figures[column.key], column);
  const was = before && figureWords(before.figures[column.key], column).large;
  const small = was === undefined || was === words.large ? words.small[0] : `was ${was}`;
  return (
    <td>
      <strong>{words.large}</strong> <span className="room-beside">{small ?? ''}</span>
    </td>
  );
}
