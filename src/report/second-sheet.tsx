import type { EventRow } from '../export/report-events';
import type { ReportModel } from '../export/report-model';
import type { SignatureRow } from '../export/report-signatures';
import { CAUTIONS } from '../recording/cautions';
import { Figures } from './findings-table';
import { Facts, Part } from './report-parts';

const TERMS =
  'DF: dominant frequency. DP: its power density. NN: intervals between two normal beats.';

/** The figures to judge by, what the reader makes of them, and who signs. */
export function SecondSheet({ model }: { readonly model: ReportModel }) {
  const compared = model.main.some(({ columns }) => columns.some(({ kind }) => kind === 'change'));
  const title = compared ? 'Before and after the meal' : 'Findings';
  return (
    <>
      <Part title={title}>
        {!compared && (
          <p>Nothing is compared: the study has no fasting phase with a fed phase after it.</p>
        )}
        {model.main.map((table) => (
          <Figures
            key={table.inOrderOf.join()}
            table={table}
            caption={`${title}: main figures`}
            terms={TERMS}
          />
        ))}
      </Part>
      {model.seen.length > 0 && (
        <Part title="Seen in passing">
          <Facts facts={model.seen} />
        </Part>
      )}
      <Events rows={model.events} />
      <Part title="Remarks">
        <p className="report-own">{model.notes === '' ? 'None written.' : model.notes}</p>
      </Part>
      <Part title="Conclusion">
        <p className="report-own">{model.conclusion === '' ? 'None written.' : model.conclusion}</p>
      </Part>
      <Signatures model={model} />
      <footer className="report-cautions">
        <h2>Cautions</h2>
        <p>{CAUTIONS.join(' ')}</p>
      </footer>
    </>
  );
}

/** What happened and what was felt, each in its phase. */
function Events({ rows }: { readonly rows: readonly EventRow[] }) {
  if (rows.length === 0) return null;
  const scored = rows.some(({ score }) => score !== '');
  return (
    <Part title={scored ? 'Events and symptoms' : 'Events'}>
      <table className="report-table report-events">
        <thead>
          <tr>
            <th scope="col">Time</th>
            <th scope="col" className="report-left">
              Phase
            </th>
            <th scope="col" className="report-left">
              {scored ? 'Event, or symptom as the person said it' : 'Event'}
            </th>
            {scored && <th scope="col">Score, 10 is worst</th>}
          </tr>
        </thead>
        <tbody>
          {rows.map(({ time, phase, what, score }) => (
            <tr key={`${time} ${what} ${score}`}>
              <th scope="row">{time}</th>
              <td className="report-left">{phase}</td>
              <td className="report-left report-free">{what}</td>
              {scored && <td>{score === '' ? '–' : score}</td>}
            </tr>
          ))}
        </tbody>
      </table>
    </Part>
  );
}

const MEANING_WORDS: Readonly<Record<SignatureRow['meaning'], string>> = {
  prepared: 'prepared: edited and ready to be read',
  read: 'read: looked at and concluded',
  amended: 'amended: changed after it was signed',
};

function Signatures({ model: { kind, signatures } }: { readonly model: ReportModel }) {
  return (
    <Part title="Signature">
      {kind === 'draft' && (
        <p>
          {signatures.length > 0
            ? 'No signature is in force: this is a draft.'
            : 'Not signed: this is a draft.'}
        </p>
      )}
      {signatures.length > 0 && (
        <table className="report-table report-signatures">
          <thead>
            <tr>
              <th scope="col">Name, typed, not authenticated</th>
              <th scope="col">Time</th>
              <th scope="col">Meaning</th>
            </tr>
          </thead>
          <tbody>
            {signatures.map((one) => (
              <Signature key={`${one.time} ${one.meaning}`} row={one} />
            ))}
          </tbody>
        </table>
      )}
    </Part>
  );
}

function Signature({
  row: { name, time, meaning, reason, current },
}: {
  readonly row: SignatureRow;
}) {
  return (
    <tr className={current ? 'report-current' : undefined}>
      <th scope="row">{name}</th>
      <td>{time}</td>
      <td>
        {MEANING_WORDS[meaning]}
        {reason !== '' && `; reason: ${reason}`}
        {current ? ' (in force)' : ' (former)'}
      </td>
    </tr>
  );
}
