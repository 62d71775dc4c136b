import './chart.css';
import './opinions.css';
import {
  type Agreement,
  type EpochOpinions,
  LEAST_AGREEMENT_PCT,
  MOST_POWER_DIFFERENCE_PCT,
  type OpinionsEvidence,
  type PartOpinions,
  SAME_CPM,
} from '../../recording/evidence/opinions';
import { differenceWords, samePercent } from '../../recording/evidence/opinions-words';
import type { Cpm } from '../../units/rate';
import { formatClock } from '../../units/time';
import { DfTracks } from './df-tracks';

interface PageProps {
  readonly value: OpinionsEvidence;
}

const cpm = (value: Cpm | null): string => (value === null ? '—' : value.toFixed(2));

/** The page of the part `opinions`: DF by three methods, crests, and the powers of the heart rate by two. */
export function OpinionsPage({ value }: PageProps) {
  return (
    <>
      <section className="evidence-part">
        <h3>Dominant frequency of the stomach</h3>
        <p className="quiet">
          Each method looks for the strongest rhythm of an epoch by itself. DF of the figures is
          read off Hann spectra and knows the epochs beside it; Burg fits an autoregressive model,
          its order the one of least Akaike criterion; multitaper averages spectra under four
          tapers. Crests are counted on the drawn wave. A harmonic taller than its wave, or a wave
          weaker than the background, is where they part.
        </p>
        {value.epochs.length > 0 ? <DfTracks value={value} /> : <p>No epoch is kept.</p>}
        <AgreementTable value={value} />
        <Epochs value={value} />
      </section>
      <section className="evidence-part">
        <h3>Power of the heart rate</h3>
        <Powers value={value} />
      </section>
    </>
  );
}

function AgreementTable({ value }: PageProps) {
  return (
    <table className="data-table opinions-table">
      <caption>
        Median of what each method finds, and in how many epochs with a rhythm that is DF within{' '}
        {SAME_CPM} cpm. Burg and multitaper are said to disagree under {LEAST_AGREEMENT_PCT} % of
        epochs, crests where their median is further than that from DF.
      </caption>
      <thead>
        <tr>
          <th scope="col">phase</th>
          <th scope="col">DF, cpm</th>
          <th scope="col">Burg</th>
          <th scope="col">multitaper</th>
          <th scope="col">crests a minute</th>
          <th scope="col">in words</th>
        </tr>
      </thead>
      <tbody>
        {value.parts.map((part) => (
          <tr key={part.name}>
            <th scope="row">{part.name}</th>
            <td>{cpm(part.hannCpm)}</td>
            <AgreementCell agreement={part.burg} />
            <AgreementCell agreement={part.multitaper} />
            <AgreementCell agreement={part.crests} />
            <td>{verdictOf(part)}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function AgreementCell({ agreement }: { readonly agreement: Agreement }) {
  const { same, of, medianCpm } = agreement;
  if (of === 0) return <td>—</td>;
  return (
    <td>
      {cpm(medianCpm)}
      <br />
      <span className="small quiet">
        {same} of {of}, {samePercent(agreement)} %
      </span>
    </td>
  );
}

function verdictOf({ hannCpm, disagreements }: PartOpinions): string {
  if (hannCpm === null) return 'no epoch with a rhythm';
  const said = disagreements.filter(({ key }) => key === 'df_median_cpm');
  return said.length > 0 ? said.map(({ words }) => words).join('; ') : 'agree';
}

/** Every kept epoch with what each method finds in it, opened when wanted. */
function Epochs({ value }: PageProps) {
  if (value.epochs.length === 0) return null;
  return (
    <details>
      <summary>Every epoch</summary>
      <table className="data-table">
        <caption className="unseen">Every kept epoch by each method</caption>
        <thead>
          <tr>
            <th scope="col">centre</th>
            <th scope="col">phase</th>
            <th scope="col">DF, cpm</th>
            <th scope="col">Burg (order)</th>
            <th scope="col">multitaper</th>
            <th scope="col">crests a minute</th>
          </tr>
        </thead>
        <tbody>
          {value.epochs.map((epoch) => (
            <EpochRow key={`${epoch.phase} ${epoch.centreS}`} epoch={epoch} />
          ))}
        </tbody>
      </table>
    </details>
  );
}

function EpochRow({ epoch }: { readonly epoch: EpochOpinions }) {
  return (
    <tr>
      <th scope="row">{formatClock(epoch.centreS)}</th>
      <td>{epoch.phase}</td>
      <td>{cpm(epoch.hannCpm)}</td>
      <td>
        {cpm(epoch.burgCpm)} ({epoch.burgOrder})
      </td>
      <td>{cpm(epoch.multitaperCpm)}</td>
      <td>{cpm(epoch.crestCpm)}</td>
    </tr>
  );
}

function Powers({ value }: PageProps) {
  const rows = value.parts.flatMap((part) => part.powers.map((pair) => ({ part, pair })));
  if (rows.length === 0)
    return <p>No phase has LF or HF by both methods: the figures say why they are withheld.</p>;
  return (
    <table className="data-table opinions-table">
      <caption>
        Lomb-Scargle on the beats themselves, as printed, and Welch on intervals resampled at 4 Hz;
        they are said to disagree where they differ by over {MOST_POWER_DIFFERENCE_PCT} %
      </caption>
      <thead>
        <tr>
          <th scope="col">phase</th>
          <th scope="col">band</th>
          <th scope="col">Lomb-Scargle, ms²</th>
          <th scope="col">Welch, ms²</th>
          <th scope="col">Welch is</th>
          <th scope="col">in words</th>
        </tr>
      </thead>
      <tbody>
        {rows.map(({ part, pair }) => (
          <tr key={`${part.name} ${pair.key}`}>
            <th scope="row">{part.name}</th>
            <td>{pair.key === 'lf_ms2' ? 'LF' : 'HF'}</td>
            <td>{pair.lombMs2.toFixed(0)}</td>
            <td>{pair.welchMs2.toFixed(0)}</td>
            <td>{differenceWords(pair)}</td>
            <td>{part.disagreements.some(({ key }) => key === pair.key) ? 'disagree' : 'agree'}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
