import type { ReportModel } from '../export/report-model';
import { Adequacy } from './adequacy-table';
import { Facts, Part, Picture } from './report-parts';
import type { ReportPictures } from './report-pictures';

/** Whose study it is, whether it can be believed, and what the rhythm did: what a reader looks at before any figure. */
export function FirstSheet({
  model,
  pictures,
}: {
  readonly model: ReportModel;
  readonly pictures: ReportPictures | null;
}) {
  return (
    <>
      <header>
        <h1>Gastric rhythm and heart-rate variability</h1>
        <Status model={model} />
        <Facts facts={model.identity} inLine />
        <p className="report-small">{model.identityNote}</p>
      </header>
      <Part title="How much could be used">
        <Adequacy table={model.adequacy} />
        <Warnings texts={model.warnings} />
      </Part>
      <Protocol model={model} />
      <RhythmOverTime model={model} pictures={pictures} />
    </>
  );
}

function Status({ model: { status, signatures, differences } }: { readonly model: ReportModel }) {
  const reason = signatures.find(({ current }) => current)?.reason ?? '';
  return (
    <p className="report-status">
      <strong>{status}</strong>
      {reason !== '' && `. Reason: ${reason}`}
      {differences.length > 0 &&
        `. The figures are those signed; this program would give ${differences.length} of them differently, listed at the end.`}
    </p>
  );
}

function Warnings({ texts }: { readonly texts: readonly string[] }) {
  if (texts.length === 0) return null;
  return (
    <ul className="report-warnings">
      {texts.map((text) => (
        <li key={text}>{text}</li>
      ))}
    </ul>
  );
}

function Protocol({ model: { protocol } }: { readonly model: ReportModel }) {
  const { stated, notStated } = protocol;
  return (
    <Part title="Protocol">
      {stated.length > 0 && <Facts facts={stated} inLine />}
      {notStated.length > 0 && <p className="report-small">Not stated: {notStated.join(', ')}.</p>}
    </Part>
  );
}

function RhythmOverTime({
  model: { making },
  pictures,
}: {
  readonly model: ReportModel;
  readonly pictures: ReportPictures | null;
}) {
  if (!pictures)
    return (
      <Part title="Rhythm over time">
        <p>No slow wave was analysed.</p>
      </Part>
    );
  const lead = making.find(({ name }) => name === 'Reported lead')?.words.split(':')[0] ?? '';
  return (
    <Part title="Rhythm over time">
      <Picture
        picture={pictures.spectrogram}
        caption={`Spectrogram, ${lead}. Line: dominant frequency. Dashed: limits of the normal band. Hatched: spoiled.`}
      />
      {pictures.waves ? (
        <Picture
          picture={pictures.waves}
          caption="Slow wave in the minutes that are barred above, all at one scale. Dotted where spoiled: foretold from the minutes beside it, not recorded."
        />
      ) : (
        <p>The slow wave is drawn once the study’s file is at hand.</p>
      )}
      <Picture
        picture={pictures.trend}
        caption="The course over the study; DP: dominant power. Hatched: spoiled."
      />
    </Part>
  );
}
