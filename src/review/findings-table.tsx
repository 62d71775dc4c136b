import type { Range } from '../numeric/chance-range';
import { rangeWords } from '../recording/evidence/range-words';
import { type RangesEvidence, rangeOfChange, rangesOfFigure } from '../recording/evidence/ranges';
import type { FigureValue } from '../recording/figure';
import type { FigureDefinition, Organ } from '../recording/figure-catalogue';
import { FIGURES } from '../recording/figure-catalogue';
import type { Findings, PhaseFindings } from '../recording/findings';
import {
  adequacyWords,
  changeWords,
  type FigureWords,
  figureWords,
  NOT_COMPARED,
  type SharedWords,
  sharedMarks,
  sharedWords,
  smallWords,
  stretchWords,
} from './findings-words';

const ORGANS: readonly Organ[] = ['stomach', 'heart', 'breathing'];
const ORGAN_WORDS: Readonly<Record<Organ, string>> = {
  stomach: 'Stomach',
  heart: 'Heart',
  breathing: 'Breathing and movement',
};

/** Ranges of the figures, and whether they are of an edit before the last. */
export interface RangesShown {
  readonly value: RangesEvidence;
  readonly stale: boolean;
}

interface FindingsTableProps {
  readonly findings: Findings;
  /** Null until they are there. */
  readonly ranges: RangesShown | null;
  readonly left: string;
  readonly right: string | null;
  readonly all: boolean;
  readonly onPick: (side: 'left' | 'right', name: string) => void;
  readonly onFigure: (key: string, phase: string) => void;
  readonly onGo: (fromS: number, toS: number) => void;
}

/** Figures of two phases side by side and the change between them, an organ at a time. */
export function FindingsTable(props: FindingsTableProps) {
  const { findings, ranges, left, right, all, onPick, onGo, onFigure } = props;
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
          <td className="findings-legend">{ranges ? 'Small: 95 % range by chance' : ''}</td>
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
          ranges={ranges}
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
        <span className="phase-name">{phase.name}</span>
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
  readonly ranges: RangesShown | null;
  readonly onFigure: (key: string, phase: string) => void;
}

function OrganRows({ organ, definitions, phases, findings, ranges, onFigure }: OrganRowsProps) {
  const [left, right] = phases;
  const shared = phases.map((phase) =>
    sharedWords(definitions.map((one) => phase.figures[one.key])),
  );
  const marksOf = ({ key }: FigureDefinition) =>
    sharedMarks(phases.map((phase) => phase.figures[key]));
  const marksBefore = (row: number) => definitions.slice(0, row).flatMap(marksOf);
  const firstMarks = (row: number) => {
    const said = marksBefore(row);
    return marksOf(definitions[row]).filter((mark) => !said.includes(mark));
  };
  const changes = definitions.map((one) => changeOf(findings, one.key, left, right));
  const sharedChange = sharedWords(changes);
  const notes = [
    ...phases.flatMap((phase, i) => [
      adequacyWords(phase, organ),
      shared[i].reason === null ? '' : `${phase.name}: — ${shared[i].reason}`,
    ]),
    right && sharedChange.reason !== null ? `change: — ${sharedChange.reason}` : '',
  ].filter((note) => note !== '');
  return (
    <tbody className={`organ-${organ}`}>
      <tr className="findings-organ">
        <th scope="rowgroup">{ORGAN_WORDS[organ]}</th>
        {phases.map((_, i) => (
          <td key={i === 0 ? 'left' : 'right'}>{shared[i].basis}</td>
        ))}
        {right ? <td /> : null}
      </tr>
      {notes.length > 0 ? <NotesRow notes={notes} columns={right ? 4 : 2} /> : null}
      {definitions.map((definition, row) => (
        <tr key={definition.key}>
          <RowHead
            definition={definition}
            marks={firstMarks(row)}
            onOpen={() => left && onFigure(definition.key, left.name)}
          />
          {phases.map((phase, i) => (
            <FigureCell
              key={i === 0 ? 'left' : 'right'}
              words={figureWords(phase.figures[definition.key], definition)}
              said={{ ...shared[i], marks: marksOf(definition) }}
              range={chanceOf(ranges, phase.name, definition)}
              about={`${definition.label}, ${phase.name}`}
              onOpen={() => onFigure(definition.key, phase.name)}
            />
          ))}
          {right ? (
            <FigureCell
              words={changeWords(changes[row], definition)}
              said={{ basis: NOT_COMPARED, reason: sharedChange.reason, marks: [] }}
              range={chanceOfChange(ranges, left, right, definition)}
              about={`${definition.label}, change`}
              onOpen={() => onFigure(definition.key, right.name)}
            />
          ) : null}
        </tr>
      ))}
    </tbody>
  );
}

const shown = (
  ranges: RangesShown,
  range: Range | null | undefined,
  { decimals }: FigureDefinition,
): RangeShown | null =>
  range ? { words: rangeWords(range, decimals), stale: ranges.stale } : null;

const chanceOf = (ranges: RangesShown | null, phase: string, figure: FigureDefinition) =>
  ranges && shown(ranges, rangesOfFigure(ranges.value, phase, figure.key)?.chance, figure);

const chanceOfChange = (
  ranges: RangesShown | null,
  from: PhaseFindings | undefined,
  to: PhaseFindings,
  figure: FigureDefinition,
) =>
  ranges &&
  shown(ranges, rangeOfChange(ranges.value, figure.key, from?.name ?? '', to.name), figure);

function changeOf(
  findings: Findings,
  key: string,
  left: PhaseFindings | undefined,
  right: PhaseFindings | undefined,
): FigureValue | undefined {
  return findings.changes.find(
    (one) => one.key === key && one.from === left?.name && one.to === right?.name,
  )?.value;
}

interface NotesRowProps {
  readonly notes: readonly string[];
  readonly columns: number;
}

/** What holds for many figures of an organ: how much is left of a phase, why figures are withheld. */
function NotesRow({ notes, columns }: NotesRowProps) {
  return (
    <tr className="findings-notes">
      <td colSpan={columns}>
        {notes.map((note) => (
          <p key={note}>{note}</p>
        ))}
      </td>
    </tr>
  );
}

interface RowHeadProps {
  readonly definition: FigureDefinition;
  /** Marks that hold for the row in every phase and that no row above has said. */
  readonly marks: readonly string[];
  readonly onOpen: () => void;
}

function RowHead({ definition, marks, onOpen }: RowHeadProps) {
  const { label, unit } = definition;
  return (
    <th scope="row">
      <span className={`organ-square ${squareOf(definition)}`} aria-hidden="true" />
      <button type="button" className="figure-name" tabIndex={-1} onClick={onOpen}>
        {label}
        {unit ? <span className="unit"> {shortUnit(unit)}</span> : null}
      </button>
      {marks.length > 0 ? <span className="figure-small">{marks.join('; ')}</span> : null}
    </th>
  );
}

/** The table is narrow; that percentages are of time is in the definition. */
const shortUnit = (unit: string): string => unit.replace('% of time', '%');

const squareOf = ({ key, organ }: FigureDefinition): string =>
  key === 'movement_pct' ? 'movement' : organ;

interface RangeShown {
  readonly words: string;
  readonly stale: boolean;
}

interface FigureCellProps {
  readonly words: FigureWords;
  /** The range by chance; it takes the place of what the figure stands on, which is read out and told in the figure's page. */
  readonly range: RangeShown | null;
  /** Words said once above or plain to see: only read out here. */
  readonly said: SharedWords & { readonly marks: readonly string[] };
  readonly about: string;
  readonly onOpen: () => void;
}

function FigureCell({ words, range, said, about, onOpen }: FigureCellProps) {
  const own = words.small.filter((line) => !said.marks.includes(line));
  const small = smallWords(own, said).filter((line) => range === null || !isBasis(line));
  const heard = words.small.filter((line) => !small.includes(line));
  const rangeLine = range === null ? [] : [`${range.words} by chance, nominal 95 %`];
  return (
    <td>
      <button
        type="button"
        className="figure"
        title={[`${about}: ${words.large}`, ...rangeLine, ...words.small].join('\n')}
        onClick={onOpen}
      >
        <span className="unseen">{about}: </span>
        <span className="figure-large">{words.large}</span>
        {range === null ? null : (
          <span className={`figure-small figure-range${range.stale ? ' stale' : ''}`}>
            <span aria-hidden="true">{range.words.replace(' to ', '…')}</span>
            <span className="unseen">, {range.words} by chance</span>
          </span>
        )}
        {small.length > 0 ? <span className="figure-small">{small.join('; ')}</span> : null}
        {heard.length > 0 ? <span className="unseen">, {heard.join('; ')}</span> : null}
      </button>
    </td>
  );
}

/** What a figure stands on: "22 epochs", "19 of 26", "1882 NN". */
const isBasis = (line: string): boolean => /^\d[\d.]*( of \d[\d.]*)?( \p{L}+)?$/u.test(line);
