import type { FigureDefinition, Organ } from '../recording/figure-catalogue';
import { FIGURES } from '../recording/figure-catalogue';
import type { Findings, PhaseFindings } from '../recording/findings';
import {
  adequacyWords,
  changeWords,
  type FigureWords,
  figureWords,
  sharedBasis,
  stretchWords,
} from './findings-words';

const ORGANS: readonly Organ[] = ['stomach', 'heart', 'breathing'];
const ORGAN_WORDS: Readonly<Record<Organ, string>> = {
  stomach: 'Stomach',
  heart: 'Heart',
  breathing: 'Breathing and movement',
};

interface FindingsTableProps {
  readonly findings: Findings;
  readonly left: string;
  readonly right: string | null;
  readonly all: boolean;
  readonly onPick: (side: 'left' | 'right', name: string) => void;
  readonly onFigure: (key: string, phase: string) => void;
  readonly onGo: (fromS: number, toS: number) => void;
}

/** Figures of two phases side by side and the change between them, an organ at a time. */
export function FindingsTable(props: FindingsTableProps) {
  const { findings, left, right, all, onPick, onGo, onFigure } = props;
  const phases = [left, right]
    .map((name) => findings.phases.find((phase) => phase.name === name))
    .filter((phase) => phase !== undefined);
  const heads = phases.map((phase, i) => (
    <PhaseHead
      key={i === 0 ? 'left' : 'right'}
      phase={phase}
      names={findings.phases.map((one) => one.name)}
      words={i === 0 ? 'First phase' : 'Second phase'}
      onPick={(name) => onPick(i === 0 ? 'left' : 'right', name)}
      onGo={onGo}
    />
  ));
  return (
    <table className="findings-table">
      <caption className="unseen">Figures by phase</caption>
      <thead>
        <tr>
          <td />
          {heads}
          {phases.length === 2 ? <th scope="col">change</th> : null}
        </tr>
      </thead>
      {ORGANS.map((organ) => (
        <OrganRows
          key={organ}
          organ={organ}
          definitions={FIGURES.filter((one) => one.organ === organ && (all || one.main))}
          phases={phases}
          findings={findings}
          onFigure={onFigure}
        />
      ))}
    </table>
  );
}

interface PhaseHeadProps {
  readonly phase: PhaseFindings;
  readonly names: readonly string[];
  readonly words: string;
  readonly onPick: (name: string) => void;
  readonly onGo: (fromS: number, toS: number) => void;
}

function PhaseHead({ phase, names, words, onPick, onGo }: PhaseHeadProps) {
  const { fromS, toS } = phase;
  return (
    <th scope="col">
      {names.length > 1 ? (
        <select
          aria-label={words}
          value={phase.name}
          onChange={(event) => onPick(event.target.value)}
        >
          {names.map((name) => (
            <option key={name}>{name}</option>
          ))}
        </select>
      ) : (
        phase.name
      )}
      <button
        type="button"
        className="findings-range"
        aria-label={`Go to ${phase.name}, ${stretchWords(fromS, toS)}`}
        onClick={() => onGo(fromS, toS)}
      >
        {stretchWords(fromS, toS)}
      </button>
    </th>
  );
}

interface OrganRowsProps {
  readonly organ: Organ;
  readonly definitions: readonly FigureDefinition[];
  readonly phases: readonly PhaseFindings[];
  readonly findings: Findings;
  readonly onFigure: (key: string, phase: string) => void;
}

function OrganRows({ organ, definitions, phases, findings, onFigure }: OrganRowsProps) {
  const bases = phases.map((phase) => sharedBasis(phase, definitions));
  const [left, right] = phases;
  return (
    <tbody className={`organ-${organ}`}>
      <tr className="findings-organ">
        <th scope="rowgroup">{ORGAN_WORDS[organ]}</th>
        {phases.map((phase, i) => (
          <td key={i === 0 ? 'left' : 'right'}>
            <Adequacy words={adequacyWords(phase, organ)} />
            {bases[i]}
          </td>
        ))}
        {right ? <td /> : null}
      </tr>
      {definitions.map((definition) => (
        <tr key={definition.key}>
          <th scope="row">
            <span className={`organ-square ${squareOf(definition)}`} aria-hidden="true" />
            {definition.label}
            {definition.unit ? <span className="unit"> {definition.unit}</span> : null}
          </th>
          {phases.map((phase, i) => (
            <FigureCell
              key={i === 0 ? 'left' : 'right'}
              words={figureWords(phase.figures[definition.key], definition)}
              unsaid={bases[i]}
              about={`${definition.label}, ${phase.name}`}
              unit={definition.unit}
              onOpen={() => onFigure(definition.key, phase.name)}
            />
          ))}
          {left && right ? (
            <FigureCell
              words={changeWords(
                findings.changes.find(
                  (one) =>
                    one.key === definition.key && one.from === left.name && one.to === right.name,
                )?.value,
                definition,
              )}
              unsaid={null}
              about={`${definition.label}, change`}
              unit={definition.unit}
              onOpen={() => onFigure(definition.key, right.name)}
            />
          ) : null}
        </tr>
      ))}
    </tbody>
  );
}

const squareOf = ({ key, organ }: FigureDefinition): string =>
  key === 'movement_pct' ? 'movement' : organ;

function Adequacy({ words }: { readonly words: string }) {
  return words === '' ? null : <strong className="findings-limited">{words}</strong>;
}

interface FigureCellProps {
  readonly words: FigureWords;
  /** A basis said once for all above, left out here. */
  readonly unsaid: string | null;
  readonly about: string;
  readonly unit: string;
  readonly onOpen: () => void;
}

function FigureCell({ words, unsaid, about, unit, onOpen }: FigureCellProps) {
  const small = words.small.filter((line) => line !== unsaid);
  const value = words.large === '—' ? 'withheld' : `${words.large} ${unit}`.trim();
  return (
    <td>
      <button
        type="button"
        className="figure"
        title={[`${about}: ${value}`, ...words.small].join('\n')}
        aria-label={[`${about}: ${value}`, ...words.small].join(', ')}
        onClick={onOpen}
      >
        <span className="figure-large">{words.large}</span>
        {small.length > 0 ? <span className="figure-small">{small.join('; ')}</span> : null}
      </button>
    </td>
  );
}
