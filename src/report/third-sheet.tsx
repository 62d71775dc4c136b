import type { SpanRow } from '../export/report-making';
import type { ReportModel } from '../export/report-model';
import { Figures } from './findings-table';
import { Facts, Part } from './report-parts';

/** Every figure that is not a main one, and how all of them came about. */
export function ThirdSheet({ model }: { readonly model: ReportModel }) {
  return (
    <>
      <Part title="All other figures">
        {model.others.map((table) => (
          <Figures key={table.inOrderOf.join()} table={table} caption="All other figures" />
        ))}
      </Part>
      {model.evidence.length > 0 && (
        <Part title="How far to believe it">
          <Facts facts={model.evidence} />
        </Part>
      )}
      <Part title="How it was made">
        <Facts facts={model.making} />
        <h3>Settings</h3>
        <Facts facts={model.settings} />
        <Spans rows={model.spans} />
      </Part>
      <Differences model={model} />
    </>
  );
}

function Spans({ rows }: { readonly rows: readonly SpanRow[] }) {
  if (rows.length === 0) return <p>No spoiled spans.</p>;
  return (
    <table className="report-table report-spans">
      <thead>
        <tr>
          <th scope="col">Spoiled spans by cause</th>
          {rows.map(({ cause }) => (
            <th scope="col" key={cause}>
              {cause}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        <SpanLine title="spans" cells={rows.map(({ cause, spans }) => [cause, String(spans)])} />
        <SpanLine
          title="minutes of the study"
          cells={rows.map(({ cause, minutes }) => [cause, minutes])}
        />
        <SpanLine
          title="minutes excluded for the stomach, reported lead"
          cells={rows.map(({ cause, stomachMinutes }) => [cause, stomachMinutes])}
        />
        <SpanLine
          title="minutes excluded for the heart"
          cells={rows.map(({ cause, heartMinutes }) => [cause, heartMinutes ?? '—'])}
        />
        <SpanLine
          title="set by hand / proposed by the program"
          cells={rows.map(({ cause, byHand, proposed }) => [cause, `${byHand} / ${proposed}`])}
        />
      </tbody>
    </table>
  );
}

function SpanLine({
  title,
  cells,
}: {
  readonly title: string;
  readonly cells: readonly (readonly [cause: string, words: string])[];
}) {
  return (
    <tr>
      <th scope="row">{title}</th>
      {cells.map(([cause, words]) => (
        <td key={cause}>{words}</td>
      ))}
    </tr>
  );
}

function Differences({ model: { differences } }: { readonly model: ReportModel }) {
  if (differences.length === 0) return null;
  return (
    <Part title="Figures this program would now give differently">
      <table className="report-table">
        <thead>
          <tr>
            <th scope="col">Figure</th>
            <th scope="col">Phase</th>
            <th scope="col">as signed</th>
            <th scope="col">now</th>
          </tr>
        </thead>
        <tbody>
          {differences.map(({ phase, key, label, signed, now }) => (
            <tr key={`${phase} ${key}`}>
              <th scope="row">{label}</th>
              <td>{phase}</td>
              <td>{signed}</td>
              <td>{now}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </Part>
  );
}
