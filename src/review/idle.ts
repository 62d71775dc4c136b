let outstanding = 0;

function tell(): void {
  if (typeof document === 'undefined') return;
  document.documentElement.dataset.idle = outstanding === 0 ? 'true' : 'false';
}

/**
 * Says that something is under way whose end will change the page: a request, a draw, a computation. The page's root carries
 * `data-idle="false"` until every begun piece has ended.
 */
export function beginWork(): void {
  outstanding += 1;
  tell();
}

/** Ends one piece begun with beginWork. Throws where none is under way. */
export function endWork(): void {
  if (outstanding === 0) throw new Error('endWork without beginWork');
  outstanding -= 1;
  tell();
}

/** Counts a promise as work until it settles. */
export function asWork<T>(work: Promise<T>): Promise<T> {
  beginWork();
  return work.finally(endWork);
}

/** True while nothing is under way. */
export const isIdle = (): boolean => outstanding === 0;

tell();
