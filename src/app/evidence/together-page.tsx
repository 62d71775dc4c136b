import './chart.css';
import { rivalRows } from '../../recording/evidence/rival-words';
import type { SharedPhase, TogetherEvidence } from '../../recording/evidence/together';
import {
  depthWords,
  EXPLORATORY,
  modulationVerdict,
  steadyWords,
} from '../../recording/evidence/together-words';
import { written } from './chart-scale';
import { PhaseBins } from './phase-bins';
import { SharedCharts } from './shared-charts';
import { PhaseTable, WindowTable } from './shared-tables';

const BREATHING_FROM = {
  lead: 'Breathing is that of the breathing lead.',
  derived: 'Breathing is derived from the heartbeat.',
  none: 'Breathing is not known.',
} as const;

/** The page of the part `together`: the same minutes of both organs, then RR by the slow wave's phase. */
export function TogetherPage({ value }: { readonly value: TogetherEvidence }) {
  const { heartRead, breathingFrom, windows, phases } = value;
  return (
    <div className="evidence-sheet">
      <p>
        A window is an epoch of the reported lead. HF here is that of windows as long as an epoch,
        which is not the standard 5 min: it does not compare with the HF of Findings.{' '}
        {BREATHING_FROM[breathingFrom]} The stomach’s 0.05 Hz lies inside the heart’s LF band: two
        figures that change together are not yet tied.
      </p>
      {heartRead ? null : <p>No heart lead is read, so the stomach stands alone.</p>}
      <PhaseTable phases={phases} />
      <SharedCharts windows={windows} phases={phases} />
      <details>
        <summary>The windows in numbers</summary>
        <WindowTable windows={windows} />
      </details>
      <section className="evidence-part">
        <h3>Does RR follow the slow wave? ({EXPLORATORY})</h3>
        <p>
          The reported lead is band-passed within 0.5 cpm of DF and its phase taken; NN intervals
          are put into twelve bins of that phase, and a cosine is fitted to their means. The same is
          done with RR moved in a circle by at least 60 s: so much follows the phase by chance. p is
          the share of shifts that go as deep, those under 60 s counted too where that makes it
          larger.
        </p>
        {phases.map((phase) => (
          <Modulation key={phase.name} phase={phase} />
        ))}
      </section>
    </div>
  );
}

function Modulation({ phase }: { readonly phase: SharedPhase }) {
  const { modulation, name } = phase;
  if (modulation.kind === 'withheld')
    return (
      <section className="evidence-part">
        <h4>{name}</h4>
        <p>Not tested: {modulation.reason}.</p>
      </section>
    );
  const steady = steadyWords(modulation);
  return (
    <section className="evidence-part">
      <h4>
        {name}: {modulationVerdict(modulation)}
      </h4>
      <p>
        {depthWords(modulation)}. RR is longest {modulation.longestDeg.toFixed(0)}° after the crest;
        DF {modulation.dfCpm.toFixed(2)} cpm, {modulation.minutes.toFixed(1)} min used.
        {steady === null ? '' : ` Note: ${steady}.`}
      </p>
      <PhaseBins found={modulation} phase={name} />
      <p className="small">
        RR about its mean from the crest on, ms:{' '}
        {modulation.binsMs.map((one) => written(one, 1)).join(', ')}.
      </p>
      <table className="evidence-words">
        <caption>Other explanations</caption>
        <tbody>
          {rivalRows(modulation.rivals).map((row) => (
            <tr key={row.name}>
              <th scope="row">{row.name}</th>
              <td>{row.verdict}</td>
              <td>{row.words}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}
