import type { AdequacyRow, AdequacyTable, KeptPart } from '../export/report-adequacy';
import { Letters, Notes } from './report-parts';

/** What stands before every figure: how much of each phase was left to make it of. */
export function Adequacy({ table }: { readonly table: AdequacyTable }) {
  return (
    <>
      <table className="report-table report-adequacy">
        <colgroup>
          <col className="report-phase" />
          <col className="report-stretch" />
          <col className="report-number" span={3} />
          <col />
          <col className="report-number" span={2} />
          <col />
        </colgroup>
        <thead>
          <tr>
            <th scope="col" rowSpan={2}>
              Phase
            </th>
            <th scope="col" rowSpan={2}>
              From–to
            </th>
            <th scope="col" rowSpan={2}>
              min
            </th>
            <th scope="colgroup" colSpan={3} className="report-kept-from">
              Kept, stomach
            </th>
            <th scope="colgroup" colSpan={3} className="report-kept-from">
              Kept, heart
            </th>
          </tr>
          <tr>
            <KeptHeads />
            <KeptHeads />
          </tr>
        </thead>
        <tbody>
          {table.rows.map((row) => (
            <Row key={row.phase} row={row} />
          ))}
        </tbody>
      </table>
      <Notes notes={table.notes} />
    </>
  );
}

function KeptHeads() {
  return (
    <>
      <th scope="col">min</th>
      <th scope="col">share</th>
      <th scope="col" className="report-left">
        for figures
      </th>
    </>
  );
}

function Row({ row }: { readonly row: AdequacyRow }) {
  return (
    <tr>
      <th scope="row">{row.phase}</th>
      <td>{row.stretch}</td>
      <td>{row.minutes}</td>
      <Kept part={row.stomach} printed={row.printed} />
      <Kept part={row.heart} printed={row.printed} />
    </tr>
  );
}

function Kept({ part, printed }: { readonly part: KeptPart | null; readonly printed: boolean }) {
  if (!part)
    return (
      <td colSpan={3} className="report-left report-kept-from">
        no heart lead
      </td>
    );
  return (
    <>
      <td>{part.minutes}</td>
      <td>{part.percent}</td>
      <td className="report-left">
        {printed ? part.words : 'in Findings, not here'}
        <Letters letters={part.letters} />
      </td>
    </>
  );
}
