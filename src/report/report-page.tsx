import type { ReactNode } from 'react';
import type { Fact, ReportModel } from '../export/report-model';
import { CAUTIONS } from '../recording/cautions';
import type { FigureDefinition, Organ } from '../recording/figure-catalogue';
import { changeWords, figureWords } from '../recording/figure-words';
import { formatClock } from '../units/time';
import { findingsTable } from './findings-columns';
import type { ReportPictures } from './report-pictures';

const ORGANS: readonly (readonly [Organ, string])[] = [
  ['stomach', 'Stomach'],
  ['heart', 'Heart'],
  ['breathing', 'Breathing and movement'],
];

function Facts({ facts }: { readonly facts: readonly Fact[] }) {
  return (
    <dl className="report-facts">
      {facts.map(({ name, words }) => (
        <div key={name + words}>
          <dt>{name}</dt>
          <dd>{words}</dd>
        </div>
      ))}
    </dl>
  );
}

function Part({ title, children }: { readonly title: string; readonly children: ReactNode }) {
  return (
    <section className="report-part">
      <h2>{title}</h2>
      {children}
    </section>
  );
}

function Picture({ svg, words }: { readonly svg: string; readonly words: string }) {
  const source = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(svg)}`;
  return <img className="report-picture" src={source} alt={words} />;
}

function Status({ model }: { readonly model: ReportModel }) {
  const { status } = model;
  if (status.kind === 'draft')
    return (
      <p className="report-status">
        <strong>Draft</strong> ({status.why})
      </p>
    );
  const { name, atUtc, reason } = status.signature;
  const former = status.kind === 'amended' ? status.former : [];
  return (
    <div className="report-status">
      <p>
        <strong>{status.kind === 'final' ? 'Final' : 'Amended'}</strong>, signed {signedAt(atUtc)}{' '}
        by {name} (name typed, not authenticated)
        {status.kind === 'amended' ? `. Reason: ${reason}` : ''}
      </p>
      {former.map((one) => (
        <p key={one.atUtc}>
          Former: {one.meaning}, {signedAt(one.atUtc)}, {one.name}
          {one.reason === '' ? '' : `; reason: ${one.reason}`}
        </p>
      ))}
      {model.differences.length > 0 && (
        <p>
          The figures are those signed. This program would now give these differently:{' '}
          {model.differences.map(({ phase, key }) => `${key} (${phase})`).join(', ')}.
        </p>
      )}
    </div>
  );
}

const signedAt = (atUtc: string): string => `${atUtc.slice(0, 16).replace('T', ' ')} UTC`;

function Adequacy({ model }: { readonly model: ReportModel }) {
  return (
    <table className="report-table">
      <thead>
        <tr>
          <th scope="col">Phase</th>
          <th scope="col">From–to</th>
          <th scope="col">Minutes</th>
          <th scope="col">Kept, stomach</th>
          <th scope="col">Kept, heart</th>
          <th scope="col">Enough?</th>
        </tr>
      </thead>
      <tbody>
        {model.adequacy.map((row) => (
          <tr key={row.phase}>
            <th scope="row">{row.phase}</th>
            <td>{row.stretch}</td>
            <td>{row.minutes}</td>
            <td>{row.stomach}</td>
            <td>{row.heart}</td>
            <td className="report-words">{row.words}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function FindingsTable({ model }: { readonly model: ReportModel }) {
  const { columns, compared, rows } = findingsTable(model.findings);
  return (
    <table className="report-table report-findings">
      <thead>
        <tr>
          <th scope="col">Figure</th>
          {columns.map((name) => (
            <th scope="col" key={name}>
              {name}
            </th>
          ))}
          {compared !== null && <th scope="col">change, {compared}</th>}
        </tr>
      </thead>
      {ORGANS.map(([organ, title]) => (
        <tbody key={organ}>
          <tr>
            <th scope="colgroup" colSpan={columns.length + 2} className={`report-organ ${organ}`}>
              {title}
            </th>
          </tr>
          {rows
            .filter(({ definition }) => definition.organ === organ)
            .map(({ definition, values, change }) => (
              <tr key={definition.key}>
                <th scope="row">{nameOf(definition)}</th>
                {values.map((value, i) => (
                  <Cell key={columns[i]} words={figureWords(value, definition)} />
                ))}
                {compared !== null && <Cell words={changeWords(change, definition)} />}
              </tr>
            ))}
        </tbody>
      ))}
    </table>
  );
}

const nameOf = ({ label, unit }: FigureDefinition): string =>
  unit === '' ? label : `${label}, ${unit}`;

function Cell({ words }: { readonly words: ReturnType<typeof figureWords> }) {
  return (
    <td>
      {words.large}
      {words.small.length > 0 && <small>{words.small.join('; ')}</small>}
    </td>
  );
}

/** The report as it is printed; light, and readable without colour. */
export function ReportPage({
  model,
  pictures,
}: {
  readonly model: ReportModel;
  readonly pictures: ReportPictures | null;
}) {
  const { status, findings } = model;
  return (
    <article className="report-page" aria-label="Report">
      {status.kind === 'draft' && (
        <p className="report-watermark" aria-hidden="true">
          DRAFT
        </p>
      )}
      <header>
        <h1>Gastric rhythm and heart-rate variability</h1>
        <Status model={model} />
        <Facts facts={model.identity} />
      </header>
      <Part title="How much could be used">
        <Adequacy model={model} />
        {findings.warnings.map(({ text }) => (
          <p key={text}>{text}</p>
        ))}
      </Part>
      <Part title="Protocol">
        <Facts facts={model.protocol} />
        {model.events.length > 0 && <Facts facts={model.events} />}
      </Part>
      {pictures && (
        <Part title="Rhythm over time">
          <Picture
            svg={pictures.spectrogram}
            words="Spectrogram with the dominant frequency as a line"
          />
          {pictures.waves.map(({ name, svg }) => (
            <Picture key={name} svg={svg} words={`Slow wave, four minutes of ${name}`} />
          ))}
          <Picture
            svg={pictures.trend}
            words="Dominant power, heart rate and breathing over the study"
          />
        </Part>
      )}
      <Part title="Findings">
        <FindingsTable model={model} />
        {findings.seen.map(({ fromS, toS, text }) => (
          <p key={`${fromS} ${text}`}>
            {formatClock(fromS)}–{formatClock(toS)}: {text}
          </p>
        ))}
      </Part>
      <Part title="Remarks and conclusion">
        <p className="report-own">{model.notes === '' ? 'No remarks.' : model.notes}</p>
        <p className="report-own">
          {model.conclusion === '' ? 'No conclusion written.' : model.conclusion}
        </p>
      </Part>
      <Part title="How it was made">
        <Facts facts={[...model.study, ...model.beats, ...model.settings]} />
        <h3>Spoiled spans</h3>
        {model.spans.length > 0 ? <Facts facts={model.spans} /> : <p>None.</p>}
      </Part>
      <footer>
        {CAUTIONS.map((text) => (
          <p key={text}>{text}</p>
        ))}
      </footer>
    </article>
  );
}
