import { useStore } from 'zustand';
import { EVIDENCE_PARTS, type EvidencePart } from '../recording/evidence/evidence';
import { type EvidenceStore, evidenceFound } from './evidence-store';

interface TrustLinesProps {
  readonly evidence: EvidenceStore;
  /** Number of the last edit. */
  readonly edit: number;
  readonly onOpen: (part: EvidencePart) => void;
}

/** The trust section of Findings: how far to believe the figures above, a line each; every line opens its page. */
export function TrustLines({ evidence, edit, onOpen }: TrustLinesProps) {
  const state = useStore(evidence);
  const lines = state.linesOf?.(evidenceFound(state)) ?? [];
  const busy = EVIDENCE_PARTS.some((part) => state.searches[part]?.kind === 'looking');
  return (
    <section className="trust" aria-labelledby="trust-title">
      <h3 id="trust-title">Trust</h3>
      <p className="small quiet" role="status">
        {busy ? 'being computed' : ''}
      </p>
      <ul className="trust-list">
        {lines.map(({ part, name, words, mark }) => (
          <li
            key={`${part} ${name}`}
            className={state.found[part]?.edit === edit ? undefined : 'stale'}
          >
            <button type="button" className="figure-name" onClick={() => onOpen(part)}>
              {name}
            </button>
            <span>{words}</span>
            {mark === null ? null : <span className="figure-small">{mark}</span>}
          </li>
        ))}
      </ul>
    </section>
  );
}
