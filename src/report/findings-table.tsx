import { placeOf } from '../export/report-chances';
import type {
  FindingsCell,
  FindingsColumn,
  FindingsGroup,
  FindingsRow,
  FindingsTable,
} from '../export/report-findings';
import { Letters, Notes } from './report-parts';

/** Figures by phase with what changed, and the small print that their letters point to. */
export function Figures({
  table,
  caption,
  terms,
}: {
  readonly table: FindingsTable;
  readonly caption: string;
  /** Short names of the table in full, where they stand for the first time. */
  readonly terms?: string;
}) {
  const { columns, groups, notes } = table;
  return (
    <div className="report-whole">
      <table className={`report-table report-findings${columns.length < 3 ? ' report-few' : ''}`}>
        <caption className="report-heard">{caption}</caption>
        <thead>
          <tr>
            <th scope="col">Figure</th>
            {columns.map(({ kind, name }) => (
              <th scope="col" key={`${kind} ${name}`} className={kind}>
                {kind === 'change' ? 'change' : name}
              </th>
            ))}
          </tr>
        </thead>
        {groups.map((group) => (
          <Group key={group.organ} group={group} columns={columns} chances={table.chances} />
        ))}
      </table>
      <Notes notes={notes}>
        <p>{[...(terms === undefined ? [] : [terms]), ...readingWords(table)].join(' ')}</p>
      </Notes>
    </div>
  );
}

/** How the table and its notes are to be read. */
function readingWords(table: FindingsTable): readonly string[] {
  const { columns, inOrderOf, hasNotCompared, hasWithheld, hasRanges, chances } = table;
  const compared = columns.flatMap(({ kind, name }) => (kind === 'change' ? [name] : []));
  return [
    ...(compared.length > 0 ? [`Change: ${compared.join(', ')} less fasting.`] : []),
    ...(Object.keys(chances).length > 0
      ? ['Beneath a figure: its range by chance, nominal 95 %.']
      : []),
    ...(hasNotCompared ? ['–: not compared between phases.'] : []),
    ...(hasWithheld ? ['—: withheld; its letter says why.'] : []),
    ...(hasRanges ? ['site: a reference of this site; its letter says for what and whence.'] : []),
    ...(inOrderOf.length > 0
      ? [`Counts in the notes are in the order ${inOrderOf.join(', ')}.`]
      : []),
  ];
}

function Group({
  group: { organ, title, rows, beside },
  columns,
  chances,
}: {
  readonly group: FindingsGroup;
  readonly columns: readonly FindingsColumn[];
  readonly chances: FindingsTable['chances'];
}) {
  const width = columns.length + 1;
  return (
    <>
      <tbody>
        <tr>
          <th scope="rowgroup" colSpan={width} className={`report-organ ${organ}`}>
            {title}
          </th>
        </tr>
        {rows.map((row) => (
          <Row key={row.key} row={row} columns={columns} chances={chances} />
        ))}
      </tbody>
      {beside.length > 0 && (
        <tbody className="report-beside">
          <tr>
            <th scope="rowgroup" colSpan={width}>
              {columns.some(({ kind }) => kind === 'change')
                ? 'In the same minutes, and may explain a change above'
                : 'In the same minutes'}
            </th>
          </tr>
          {beside.map((row) => (
            <Row key={row.key} row={row} columns={columns} chances={chances} />
          ))}
        </tbody>
      )}
    </>
  );
}

function Row({
  row: { key, name, letters, cells },
  columns,
  chances,
}: {
  readonly row: FindingsRow;
  readonly columns: readonly FindingsColumn[];
  readonly chances: FindingsTable['chances'];
}) {
  return (
    <tr>
      <th scope="row">
        {name}
        <Letters letters={letters} />
      </th>
      {columns.map((column, place) => (
        <Cell
          key={`${column.kind} ${column.name}`}
          cell={cells[place]}
          column={column.kind}
          chance={chances[placeOf(key, column)]}
        />
      ))}
    </tr>
  );
}

function Cell({
  cell: { kind, words, small, ranges, letters },
  column,
  chance,
}: {
  readonly cell: FindingsCell;
  readonly column: FindingsColumn['kind'];
  readonly chance: string | undefined;
}) {
  if (kind === 'not-compared')
    return (
      <td className={column}>
        <span aria-hidden="true">{words}</span>
        <span className="report-heard">not compared</span>
      </td>
    );
  return (
    <td className={column}>
      {words}
      {small !== '' && <small> ({small})</small>}
      <Letters letters={letters} />
      {chance !== undefined && <span className="report-chance">{chance}</span>}
      {ranges.map((range) => (
        <small key={range} className="report-range">
          site {range}
        </small>
      ))}
    </td>
  );
}
