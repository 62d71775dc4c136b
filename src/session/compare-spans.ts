import { type Lead, leadKey, leadName } from '../recording/lead';
import {
  coveredSeconds,
  type Interval,
  type Span,
  spansOf,
  withoutIntervals,
} from '../recording/span';
import type { Seconds } from '../units/time';
import { stretchOf } from './difference';
import type { SessionState } from './document';
import type { PlacedDifference } from './placed-difference';

type Organ = 'stomach' | 'heart';

/** Seconds that two reviews exclude from one organ's figures on one lead. */
export interface SpanAgreement {
  readonly organ: Organ;
  readonly lead: string;
  readonly hereS: Seconds;
  readonly thereS: Seconds;
  readonly bothS: Seconds;
  /** What both exclude over what either does; null where neither excludes anything. */
  readonly pct: number | null;
}

/** A lead that serves an organ in one of the reviews. */
interface Served {
  readonly organ: Organ;
  readonly lead: Lead;
}

/** Every lead that serves an organ in either review, those of this one first. */
function servedIn(states: readonly SessionState[]): readonly Served[] {
  const slow = states.flatMap(({ roles }) => [roles.slow[roles.reported], ...roles.slow]);
  const heart = states.flatMap(({ roles }) => (roles.heart ? [roles.heart] : []));
  const all: readonly Served[] = [
    ...slow.map((lead): Served => ({ organ: 'stomach', lead })),
    ...heart.map((lead): Served => ({ organ: 'heart', lead })),
  ];
  const byName = new Map(all.map((one) => [`${one.organ} ${leadKey(one.lead)}`, one]));
  return [...byName.values()];
}

/** What two reviews exclude: how long by organ and lead, and every stretch that only one of them excludes. */
export function compareSpans(
  here: SessionState,
  there: SessionState,
): {
  readonly agreements: readonly SpanAgreement[];
  readonly differences: readonly PlacedDifference[];
} {
  const channels = here.study.channelLabels.map((label) => ({ label }));
  const { durationS } = here.study;
  const parts = servedIn([here, there]).map(({ organ, lead }) => {
    const of = (state: SessionState) => spansOf(state.spans, leadKey(lead), organ);
    return { organ, lead: leadName(lead, channels), ours: of(here), theirs: of(there) };
  });
  const seconds = (spans: readonly Interval[]) => coveredSeconds(spans, 0, durationS);
  return {
    agreements: parts.map(({ organ, lead, ours, theirs }) => {
      const [hereS, thereS, eitherS] = [ours, theirs, [...ours, ...theirs]].map(seconds);
      const bothS = hereS + thereS - eitherS;
      const pct = eitherS > 0 ? (100 * bothS) / eitherS : null;
      return { organ, lead, hereS, thereS, bothS, pct };
    }),
    differences: together(
      parts.flatMap(({ organ, lead, ours, theirs }) => [
        ...onlyIn(ours, theirs, { organ, lead, only: 'here' }),
        ...onlyIn(theirs, ours, { organ, lead, only: 'there' }),
      ]),
    ),
  };
}

/** A stretch that only one review excludes, for one organ on one lead. */
interface OneSided extends Interval {
  readonly organ: Organ;
  readonly lead: string;
  readonly only: 'here' | 'there';
  readonly causes: string;
}

function onlyIn(
  spans: readonly Span[],
  others: readonly Span[],
  of: Pick<OneSided, 'organ' | 'lead' | 'only'>,
): readonly OneSided[] {
  return withoutIntervals(spans, others).map(({ fromS, toS }) => {
    const over = spans.filter((span) => span.fromS < toS && span.toS > fromS);
    const causes = [...new Set(over.map(({ cause }) => cause))].join(', ');
    return { ...of, fromS, toS, causes };
  });
}

/** One difference a stretch, whatever organs and leads it is excluded for. */
function together(stretches: readonly OneSided[]): readonly PlacedDifference[] {
  const byPlace = new Map<string, OneSided[]>();
  for (const one of stretches) {
    const key = `${one.only} ${one.fromS} ${one.toS} ${one.causes}`;
    byPlace.set(key, [...(byPlace.get(key) ?? []), one]);
  }
  return [...byPlace.values()].map((same): PlacedDifference => {
    const [{ fromS, toS, only, causes }] = same;
    const targets = [...new Set(same.map(({ organ, lead }) => `${organ} (${lead})`))].join(', ');
    const words = `excluded for ${targets}, cause ${causes}`;
    return {
      kind: 'span',
      what: stretchOf({ fromS, toS }),
      here: only === 'here' ? words : 'counts',
      there: only === 'there' ? words : 'counts',
      place: { fromS, toS },
      tick: null,
    };
  });
}
