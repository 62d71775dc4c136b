import { changedLeft, leftWords, type TimeLeft, timeLeft } from './minutes-left';
import type { PaneStores } from './row-view';
import { draftedSpan } from './span-paint';
import type { Draft, PhaseDraft } from './view-store';

/** What is being moved: an end of a span (or a new span), or a border of a phase. */
export type Moving = Draft | PhaseDraft;

/** Time left in the phases that a move changes, as it would be. Empty without an open session. */
export function leftWhileMoving(stores: PaneStores, moving: Moving): readonly TimeLeft[] {
  const state = stores.session.getState().session?.state;
  if (!state) return [];
  const gaps = stores.analysis.getState().recording?.gaps ?? [];
  const { phases, spans, roles, study } = state;
  const before = { phases, spans, roles, gaps, durationS: study.durationS };
  return changedLeft(timeLeft(before), timeLeft({ ...before, ...moved(before, moving) }));
}

function moved(
  { spans }: { readonly spans: Parameters<typeof timeLeft>[0]['spans'] },
  moving: Moving,
) {
  if ('phases' in moving) return { phases: moving.phases };
  if (moving.spanId !== null) return { spans: spans.map((span) => draftedSpan(span, moving)) };
  const { fromS, toS } = moving;
  const fresh = {
    id: 0,
    lead: null,
    target: 'both',
    cause: 'other',
    origin: 'drawn',
    note: '',
  } as const;
  return { spans: [...spans, { ...fresh, fromS, toS }] };
}

/** The same in one sentence, for those who hear it. */
export const leftInWords = (stores: PaneStores, moving: Moving): string =>
  leftWhileMoving(stores, moving).map(leftWords).join('; ');
