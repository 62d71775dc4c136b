import './chart.css';
import type { LagInEpoch, LeadPair, LeadsEvidence } from '../../recording/evidence/leads';
import {
  coherenceWords,
  couplingWords,
  lagWords,
  pairName,
} from '../../recording/evidence/leads-words';
import { formatClock } from '../../units/time';
import { written } from './chart-scale';
import { LagStrip } from './lag-strip';

type Compared = Extract<LeadPair, { kind: 'compared' }>;

/** The page of the part `leads`: a part a pair, and why the others are not shown. */
export function LeadsPage({ value }: { readonly value: LeadsEvidence }) {
  const { withinCpm, leadCount, pairs } = value;
  if (leadCount < 2)
    return (
      <p>This study has one slow-wave lead. Two or more that share no electrode can be compared.</p>
    );
  const compared = pairs.filter((pair) => pair.kind === 'compared');
  const left = pairs.filter((pair) => pair.kind === 'left-out');
  return (
    <div className="evidence-sheet">
      <p>
        Coupled: the rhythm of both leads is normo and their DF lie within {withinCpm} cpm of each
        other (the usual value, from memory), in percent of the epochs kept on both. The lag is how
        much later the second lead shows the wave, from the phase of the cross-spectrum at DF, where
        coherence stands above that of unrelated noise. It is known only up to whole cycles, and two
        waves of one steady frequency look coherent whatever ties them. Which lead is earlier says
        nothing of a wave that travels.
      </p>
      {compared.map((pair) => (
        <ComparedPair key={`${pair.first} ${pair.second}`} pair={pair} />
      ))}
      {left.length > 0 ? <LeftOut pairs={left} /> : null}
    </div>
  );
}

function ComparedPair({ pair }: { readonly pair: Compared }) {
  const { electrodes, mark, phases } = pair;
  return (
    <section className="evidence-part">
      <h3>{pairName(pair)}</h3>
      <p className="small quiet">{mark ?? electrodes.why}</p>
      <table className="evidence-words">
        <thead>
          <tr>
            <th scope="col">Phase</th>
            <th scope="col">Coupled</th>
            <th scope="col">Which is earlier</th>
            <th scope="col">Coherence at DF</th>
          </tr>
        </thead>
        <tbody>
          {phases.map((phase) => (
            <tr key={phase.name}>
              <th scope="row">{phase.name}</th>
              <td>{couplingWords(phase)}</td>
              <td>{lagWords(pair, phase.lag)}</td>
              <td>{coherenceWords(phase.lag)}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <p className="small">
        Lag of {pair.secondName} behind {pair.firstName}, an epoch a dot with its 95 % range by
        chance. Filled: coupled. Hollow: one DF, outside the normal band. No dot: no DF in common,
        not coherent, or spoiled.
      </p>
      <LagStrip pair={pair} />
      <details>
        <summary>The strip in numbers</summary>
        <LagTable strip={pair.strip} />
      </details>
    </section>
  );
}

const shown = (value: number | null, decimals: number) =>
  value === null ? '—' : written(value, decimals);

function LagTable({ strip }: { readonly strip: readonly LagInEpoch[] }) {
  return (
    <table className="data-table">
      <thead>
        <tr>
          <th scope="col">centre of the epoch</th>
          <th scope="col">coupled</th>
          <th scope="col">DF in common, cpm</th>
          <th scope="col">lag, s</th>
          <th scope="col">95 % by chance</th>
        </tr>
      </thead>
      <tbody>
        {strip.map(({ fromS, toS, coupled, dfCpm, lagS, lowS, highS }) => (
          <tr key={`${fromS}`}>
            <th scope="row">{formatClock((fromS + toS) / 2)}</th>
            <td>{coupled ? 'yes' : 'no'}</td>
            <td>{shown(dfCpm, 2)}</td>
            <td>{shown(lagS, 1)}</td>
            <td>{lowS === null ? '—' : `${shown(lowS, 1)} to ${shown(highS, 1)}`}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

type Left = Extract<LeadPair, { kind: 'left-out' }>;

function LeftOut({ pairs }: { readonly pairs: readonly Left[] }) {
  return (
    <section className="evidence-part">
      <h3>Not shown</h3>
      <table className="evidence-words">
        <tbody>
          {pairs.map((pair) => (
            <tr key={`${pair.first} ${pair.second}`}>
              <th scope="row">{pairName(pair)}</th>
              <td>{pair.why}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}
