import { useState } from 'react';
import type { Range } from '../../numeric/chance-range';
import { byWords } from '../../recording/evidence/limits-words';
import { rangeWords } from '../../recording/evidence/range-words';
import {
  type ChangeRange,
  type FigureRanges,
  type PhaseRanges,
  type RangesEvidence,
  rangesOfFigure,
} from '../../recording/evidence/ranges';
import { exactWords, ratioWords } from '../../recording/evidence/ranges-words';
import { FIGURES, type FigureDefinition, type Organ } from '../../recording/figure-catalogue';
import { figureWords } from '../../recording/figure-words';
import { useAnalysis } from '../app-context';

const ORGANS: Readonly<Record<Organ, string>> = {
  stomach: 'Stomach',
  heart: 'Heart',
  breathing: 'Breathing and movement',
};

/** The page of the part `ranges`: every range of one phase, a kind a column, and those of the changes. */
export function RangesPage({ value }: { readonly value: RangesEvidence }) {
  const [picked, setPicked] = useState<string | null>(null);
  const phase = value.phases.find(({ name }) => name === picked) ?? value.phases.at(0);
  if (!phase) return <p>No phase has figures.</p>;
  return (
    <>
      <KindsTold openHeartDoubts={value.openHeartDoubts} />
      <label className="ranges-pick">
        Phase{' '}
        <select value={phase.name} onChange={(event) => setPicked(event.target.value)}>
          {value.phases.map(({ name }) => (
            <option key={name}>{name}</option>
          ))}
        </select>
      </label>
      <PhaseTable phase={phase} value={value} />
      <ChangesTable changes={value.changes.filter(({ to }) => to === phase.name)} />
    </>
  );
}

function KindsTold({ openHeartDoubts }: Pick<RangesEvidence, 'openHeartDoubts'>) {
  return (
    <dl className="facts-list">
      <div>
        <dt>By chance</dt>
        <dd>
          Where this person’s tendency lies, told from minutes like these: nominal 95 %. How often
          it really holds was measured on invented people and stands in the documentation.
        </dd>
      </div>
      <div>
        <dt>By doubts</dt>
        <dd>
          Lowest and highest if each open doubt of the heart is decided one way or the other.{' '}
          {openHeartDoubts === 0
            ? 'None is open that reaches the heart’s figures.'
            : `${openHeartDoubts} ${openHeartDoubts === 1 ? 'is' : 'are'} open.`}
        </dd>
      </div>
      <div>
        <dt>By limits</dt>
        <dd>
          Lowest and highest of a percentage under the other published band limits and under epochs
          of 3, 4 and 5 min.
        </dd>
      </div>
    </dl>
  );
}

interface PhaseTableProps {
  readonly phase: PhaseRanges;
  readonly value: RangesEvidence;
}

function PhaseTable({ phase, value }: PhaseTableProps) {
  const organs = Object.entries(ORGANS).map(([organ, title]) => ({
    title,
    organ,
    figures: FIGURES.filter((one) => one.organ === organ).flatMap((figure) => {
      const ranges = rangesOfFigure(value, phase.name, figure.key);
      return ranges ? [{ figure, ranges }] : [];
    }),
  }));
  return (
    <table className="data-table ranges-table">
      <caption>Ranges, {phase.name}</caption>
      <thead>
        <tr>
          <th scope="col">Figure</th>
          <th scope="col">value</th>
          <th scope="col">by chance, 95 %</th>
          <th scope="col">by doubts</th>
          <th scope="col">by limits</th>
        </tr>
      </thead>
      {organs
        .filter(({ figures }) => figures.length > 0)
        .map(({ title, organ, figures }) => (
          <tbody key={organ}>
            <tr>
              <th scope="rowgroup" colSpan={5}>
                {title}
              </th>
            </tr>
            {figures.map(({ figure, ranges }) => (
              <RangeRow key={figure.key} figure={figure} ranges={ranges} phase={phase.name} />
            ))}
          </tbody>
        ))}
    </table>
  );
}

/** A range whose ends are printed alike is no range. */
const apartWords = (range: Range, decimals: number): string =>
  range.low.toFixed(decimals) === range.high.toFixed(decimals)
    ? 'unchanged'
    : rangeWords(range, decimals);

interface RangeRowProps {
  readonly figure: FigureDefinition;
  readonly ranges: FigureRanges;
  readonly phase: string;
}

function RangeRow({ figure, ranges: { chance, doubts, limits }, phase }: RangeRowProps) {
  const findings = useAnalysis((state) => state.findings);
  const printed = findings?.phases.find(({ name }) => name === phase)?.figures[figure.key];
  const { decimals, label, unit } = figure;
  return (
    <tr>
      <th scope="row">
        {label} {unit === '' ? null : <span className="quiet">{unit}</span>}
      </th>
      <td>{figureWords(printed, figure).large}</td>
      <td>{chance ? rangeWords(chance, decimals) : '—'}</td>
      <td>
        {doubts ? apartWords(doubts, decimals) : '—'}
        {doubts ? <span className="figure-small">{exactWords(doubts)}</span> : null}
      </td>
      <td>
        {limits ? apartWords(limits, decimals) : '—'}
        {limits ? <span className="figure-small">{byWords(limits, decimals)}</span> : null}
      </td>
    </tr>
  );
}

function ChangesTable({ changes }: { readonly changes: readonly ChangeRange[] }) {
  if (changes.length === 0) return null;
  return (
    <table className="data-table ranges-table">
      <caption>
        Change from {changes[0].from} to {changes[0].to}: both phases by chance
      </caption>
      <thead>
        <tr>
          <th scope="col">Figure</th>
          <th scope="col">by chance, 95 %</th>
          <th scope="col">as a ratio</th>
        </tr>
      </thead>
      <tbody>
        {FIGURES.flatMap((figure) =>
          changes
            .filter(({ key }) => key === figure.key)
            .map((one) => (
              <tr key={figure.key}>
                <th scope="row">
                  {figure.label} <span className="quiet">{figure.unit}</span>
                </th>
                <td>{rangeWords(one, figure.decimals)}</td>
                <td>{ratioWords(one)}</td>
              </tr>
            )),
        )}
      </tbody>
    </table>
  );
}
