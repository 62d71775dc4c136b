import './evidence/evidence.css';
import { type ReactNode, useState } from 'react';
import { useStore } from 'zustand';
import type { Evidence, EvidencePart } from '../recording/evidence/evidence';
import type { EvidenceSearch, Found } from '../review/evidence-store';
import { useApp, useSession } from './app-context';
import { Dialog } from './dialog';
import { EVIDENCE_PAGES, evidencePage } from './evidence/evidence-pages';
import { SelfCheckPage } from './evidence/self-check-page';
import { SettingsPage } from './evidence/settings-page';
import type { EvidencePageId } from './evidence-page-id';
import { FailureWords } from './small-dialogs';

/** Order of the pages, the question asked most first. */
const ORDER: readonly EvidencePageId[] = [
  'planted',
  'settings-map',
  'ranges',
  'opinions',
  'leads',
  'together',
  'self-check',
];

/** The self-check alone needs no study. */
const needsStudy = (page: EvidencePageId): boolean => page !== 'self-check';

/** How far each number can be believed, a page a question. */
export function EvidenceDialog({ first }: { readonly first: EvidencePageId }) {
  const { shell } = useApp();
  const [page, setPage] = useState<EvidencePageId>(first);
  const open = useSession(({ session }) => session !== null);
  const pages = open ? ORDER : ORDER.filter((one) => !needsStudy(one));
  return (
    <Dialog
      title={open ? 'Evidence' : EVIDENCE_PAGES[page].title}
      subtitle={EVIDENCE_PAGES[page].about}
      size="large"
      onClose={() => shell.getState().closeDialog()}
    >
      {pages.length > 1 ? (
        <nav className="evidence-nav" aria-label="Pages of the evidence">
          {pages.map((one) => (
            <button
              key={one}
              type="button"
              className="button slight"
              aria-current={one === page ? 'page' : undefined}
              onClick={() => setPage(one)}
            >
              {EVIDENCE_PAGES[one].title}
            </button>
          ))}
        </nav>
      ) : null}
      <section className="evidence-page" aria-label={EVIDENCE_PAGES[page].title}>
        <OnePage page={page} />
      </section>
    </Dialog>
  );
}

function OnePage({ page }: { readonly page: EvidencePageId }) {
  switch (page) {
    case 'settings-map':
      return <SettingsPage />;
    case 'self-check':
      return <SelfCheckPage />;
    default:
      return <PartPage key={page} part={page} />;
  }
}

/** A computed part, grey while it is of an earlier edit; what is missing says why. */
function PartPage<P extends EvidencePart>({ part }: { readonly part: P }) {
  const { evidence } = useApp();
  const found: Found<P> | undefined = useStore(evidence, (state) => state.found[part]);
  const search = useStore(evidence, (state) => state.searches[part]);
  const edit = useSession(({ session }) => session?.log.length ?? 0);
  const stale = found !== undefined && found.edit !== edit;
  return (
    <>
      <Status search={search} found={found !== undefined} stale={stale} />
      {found ? (
        <div className={stale ? 'stale' : undefined}>{pageOf(part, found.value)}</div>
      ) : null}
    </>
  );
}

const pageOf = <P extends EvidencePart>(part: P, value: Evidence[P]): ReactNode =>
  evidencePage(part, value);

interface StatusProps {
  readonly search: EvidenceSearch | undefined;
  readonly found: boolean;
  readonly stale: boolean;
}

function Status({ search, found, stale }: StatusProps) {
  if (search?.kind === 'failed') return <FailureWords failure={search.failure} />;
  const busy =
    search?.kind === 'looking'
      ? `Being computed, ${Math.floor(100 * search.done)} %.`
      : 'It follows once figures and doubts are there.';
  return (
    <p className="small quiet" role="status">
      {found && !stale ? '' : stale ? `Of an earlier edit. ${busy}` : busy}
    </p>
  );
}
