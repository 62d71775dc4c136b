import { NO_BEATS } from '../recording/beat';
import type { Hertz } from '../units/rate';
import { type BeatAgreement, compareBeats, type TimedBeats } from './compare-beats';
import { compareSpans, type SpanAgreement } from './compare-spans';
import type { Difference } from './difference';
import type { ReplacedField, SessionState, StudyIdentity } from './document';
import { setField } from './edits';
import { fieldDifferences } from './field-differences';
import type { PlacedDifference } from './placed-difference';
import { sameValue } from './same-value';

/** What two reviews of one study have in common and what not. */
export interface SessionComparison {
  readonly beats: BeatAgreement;
  readonly spans: readonly SpanAgreement[];
  /** By time. */
  readonly places: readonly PlacedDifference[];
  /** Leads, phases, settings, events, words: `from` is here, `to` is there. */
  readonly others: readonly Difference[];
}

/** Why a session cannot be compared with the open one, a sentence for the person; null where it can. */
export function otherStudy(here: StudyIdentity, there: StudyIdentity): string | null {
  const known = here.sha256 !== null && there.sha256 !== null;
  if (known ? here.sha256 !== there.sha256 : here.quickKey !== there.quickKey)
    return `That session is of another recording (${there.code}), not of the open one.`;
  const read = ({ durationS, channelLabels }: StudyIdentity) => ({ durationS, channelLabels });
  if (!sameValue(read(here), read(there)))
    return 'That session is of the same file read in another way: its length or its channels differ.';
  return null;
}

/** Fields that are compared in words, in the order they are told. */
const FIELDS: readonly ReplacedField[] = [
  'roles',
  'leadChoice',
  'settings',
  'phases',
  'events',
  'symptoms',
  'protocol',
  'notes',
  'conclusion',
];

/**
 * Two reviews of one study side by side. `rateOf` gives the rate of a review's heart lead; null where it has none, whose beats
 * are then left out.
 */
export function compareSessions(
  here: SessionState,
  there: SessionState,
  rateOf: (state: SessionState) => Hertz | null,
): SessionComparison {
  const timed = (state: SessionState): TimedBeats => {
    const rateHz = rateOf(state);
    return rateHz === null ? { beats: NO_BEATS, rateHz: 1 } : { beats: state.beats, rateHz };
  };
  const beats = compareBeats(timed(here), timed(there));
  const spans = compareSpans(here, there);
  const places = [...beats.differences, ...spans.differences].sort(
    (a, b) => a.place.fromS - b.place.fromS || a.place.toS - b.place.toS,
  );
  return {
    beats: beats.agreement,
    spans: spans.agreements,
    places,
    others: fieldsDiffer(here, there, here.study.channelLabels),
  };
}

/** Events and symptoms have ids of their own in each session: here they are known by what they say. */
function knownByContent<T extends { readonly id: number }>(
  rows: readonly T[],
  all: readonly T[],
): readonly T[] {
  const content = (row: T) => JSON.stringify({ ...row, id: 0 });
  const known = all.map(content);
  return rows.map((row) => ({ ...row, id: known.indexOf(content(row)) }));
}

function fieldsDiffer(
  here: SessionState,
  there: SessionState,
  labels: readonly string[],
): readonly Difference[] {
  const events = [...here.events, ...there.events];
  const symptoms = [...here.symptoms, ...there.symptoms];
  const [ours, theirs] = [here, there].map((state) => ({
    ...state,
    events: knownByContent(state.events, events),
    symptoms: knownByContent(state.symptoms, symptoms),
  }));
  return FIELDS.flatMap((field) => setField(ours, field, theirs[field], '').changes).flatMap(
    (change) => (change.kind === 'field' ? fieldDifferences(change, labels) : []),
  );
}
