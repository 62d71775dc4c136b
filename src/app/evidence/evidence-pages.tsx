import type { ReactNode } from 'react';
import type { Evidence, EvidencePart } from '../../recording/evidence/evidence';
import type { EvidencePageId } from '../evidence-page-id';
import { LeadsPage } from './leads-page';
import { OpinionsPage } from './opinions-page';
import { PlantedPage } from './planted-page';
import { RangesPage } from './ranges-page';
import { TogetherPage } from './together-page';

interface PageHead {
  readonly title: string;
  /** What the page is for, in a sentence above it. */
  readonly about: string;
}

interface PageOf<P extends EvidencePart> extends PageHead {
  readonly page: (value: Evidence[P]) => ReactNode;
}

/** The pages of the parts of the evidence. */
const PART_PAGES: { readonly [P in EvidencePart]: PageOf<P> } = {
  planted: {
    title: 'Planted check',
    about:
      'Known slow waves and heartbeats planted in this recording’s own noise, taken the same way as the study’s own.',
    page: (value) => <PlantedPage value={value} />,
  },
  ranges: {
    title: 'Ranges',
    about:
      'How far each figure could be from the truth: by chance, by open doubts, by other limits.',
    page: (value) => <RangesPage value={value} />,
  },
  opinions: {
    title: 'Second opinions',
    about: 'What other methods make of the same minutes.',
    page: (value) => <OpinionsPage value={value} />,
  },
  leads: {
    title: 'Several leads',
    about: 'What leads that share no electrode say of each other. No claim of propagation.',
    page: (value) => <LeadsPage value={value} />,
  },
  together: {
    title: 'Both rhythms',
    about: 'Stomach and heart over the same minutes. Exploratory: no reference values exist.',
    page: (value) => <TogetherPage value={value} />,
  },
};

/** All pages of the evidence dialog: those of the parts, and those that are no part of it. */
export const EVIDENCE_PAGES: Readonly<Record<EvidencePageId, PageHead>> = {
  ...PART_PAGES,
  'settings-map': {
    title: 'Which settings',
    about:
      'How well route fractional would do on this recording with other settings, beside the other routes. The program changes none by itself.',
  },
  'self-check': {
    title: 'Self-check',
    about:
      'Known values run through the very code that makes the figures, on this machine. It needs no study.',
  },
};

/** The page of a part that is there, drawn; null where it is not. */
export function evidencePage<P extends EvidencePart>(part: P, value: Evidence[P]): ReactNode {
  return PART_PAGES[part].page(value);
}
