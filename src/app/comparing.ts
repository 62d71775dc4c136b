import { firstBeatAt } from '../recording/beat';
import { leadChannels } from '../recording/lead';
import type { Recording } from '../recording/recording';
import type { Roles } from '../recording/roles';
import type { Interval } from '../recording/span';
import { goToStretch } from '../review/findings-go';
import type { ViewStore } from '../review/view-store';
import { compareSessions, type SessionComparison } from '../session/compare-sessions';
import type { SessionState } from '../session/document';
import type { PlacedDifference } from '../session/placed-difference';
import type { AppParts } from './app-context';
import type { PageActs } from './command';

/** Rate of the heart lead of some roles; null where there is none or the recording is not at hand. */
export const heartRateOf =
  (recording: Recording | null) =>
  ({ heart }: Roles) =>
    (heart && recording?.channels[leadChannels(heart)[0]]?.rateHz) ?? null;

/** Takes the panes to a place, out of the report where that is open. */
export function showPlace(page: PageActs, view: ViewStore, { fromS, toS }: Interval): void {
  if (page.reportOpen()) page.toggleReport();
  goToStretch(view, fromS, toS);
}

const made = new WeakMap<
  SessionState,
  { readonly of: SessionState; readonly found: SessionComparison }
>();

/** Two states of one study compared; the last comparison of each is kept. */
export function comparisonOf(
  here: SessionState,
  there: SessionState,
  recording: Recording | null,
): SessionComparison {
  const known = made.get(here);
  if (known?.of === there) return known.found;
  const rateOf = heartRateOf(recording);
  const found = compareSessions(here, there, ({ roles }) => rateOf(roles));
  made.set(here, { of: there, found });
  return found;
}

type GoParts = Pick<AppParts, 'shell' | 'session' | 'view' | 'analysis'> & {
  readonly page: PageActs;
};

/** A difference in one line. */
export const placedWords = ({ what, here, there }: PlacedDifference): string =>
  `${what}: here ${here}, there ${there}`;

/** Takes the panes to a difference by its number, and selects the beat that stands there. */
export function goToDifference(
  { shell, session, view, analysis, page }: GoParts,
  at: number,
): void {
  const { compared, tell } = shell.getState();
  const state = session.getState().session?.state;
  if (!compared || !state) return;
  const { places } = comparisonOf(state, compared.session.state, analysis.getState().recording);
  const one = places[at];
  if (!one) {
    tell('The two sessions differ at no place.');
    return;
  }
  shell.setState({ compared: { ...compared, at } });
  showPlace(page, view, one.place);
  const { beats } = state;
  const stands = one.tick !== null && beats.ticks[firstBeatAt(beats, one.tick)] === one.tick;
  view.setState({
    selection:
      stands && one.tick !== null ? { kind: 'beats', ticks: [one.tick] } : { kind: 'none' },
  });
  tell(`Difference ${at + 1} of ${places.length}: ${placedWords(one)}`);
}

/** Goes to the next difference or the one before; after the last comes the first. */
export function stepDifference(parts: GoParts, by: 1 | -1): void {
  const { compared } = parts.shell.getState();
  const state = parts.session.getState().session?.state;
  if (!compared || !state) return;
  const { recording } = parts.analysis.getState();
  const count = comparisonOf(state, compared.session.state, recording).places.length;
  const next = by === 1 ? compared.at + 1 : (compared.at < 0 ? count : compared.at) - 1;
  goToDifference(parts, count === 0 ? 0 : (next + count) % count);
}
