import { useState } from 'react';
import type { Hide } from '../export/report-hiding';
import type { SessionComparison } from '../session/compare-sessions';
import type { SpanAgreement } from '../session/compare-spans';
import type { Difference } from '../session/difference';
import { PLACED_KINDS, type PlacedDifference, type PlacedKind } from '../session/placed-difference';
import { formatClock } from '../units/time';
import { Choice } from './fields';

/** Where anything differs it never reads as full agreement. */
const percentWords = (percent: number | null): string =>
  percent === null ? '—' : `${(percent < 100 ? Math.min(percent, 99.9) : percent).toFixed(1)} %`;

interface AgreementRow {
  readonly what: string;
  readonly here: string;
  readonly there: string;
  readonly both: string;
  readonly percent: number | null;
}

const spanRow = ({ organ, lead, hereS, thereS, bothS, pct }: SpanAgreement): AgreementRow => ({
  what: `seconds excluded for the ${organ}, ${lead}`,
  here: hereS.toFixed(1),
  there: thereS.toFixed(1),
  both: bothS.toFixed(1),
  percent: pct,
});

/** How far the two agree, in counts, seconds and percent. */
export function Agreement({
  comparison: { beats, spans },
}: {
  readonly comparison: SessionComparison;
}) {
  const counts = { here: String(beats.here), there: String(beats.there) };
  const rows: readonly AgreementRow[] = [
    { what: 'beats', ...counts, both: String(beats.both), percent: beats.placePct },
    {
      what: 'beats of the same class',
      here: '',
      there: '',
      both: String(beats.sameClass),
      percent: beats.classPct,
    },
    ...spans.map(spanRow),
  ];
  return (
    <table className="data-table">
      <caption>Agreement</caption>
      <thead>
        <tr>
          <th scope="col">what</th>
          <th scope="col">here</th>
          <th scope="col">there</th>
          <th scope="col">in both</th>
          <th scope="col">agreement</th>
        </tr>
      </thead>
      <tbody>
        {rows.map(({ what, here, there, both, percent }) => (
          <tr key={what}>
            <th scope="row">{what}</th>
            <td>{here}</td>
            <td>{there}</td>
            <td>{both}</td>
            <td>{percentWords(percent)}</td>
          </tr>
        ))}
      </tbody>
      <tfoot>
        <tr>
          <td colSpan={5} className="quiet">
            Beats are the same within 150 ms, one to one, nearest first. Agreement: what both have,
            of all that either has.
          </td>
        </tr>
      </tfoot>
    </table>
  );
}

const KIND_WORDS: Readonly<Record<PlacedKind, string>> = {
  'only-here': 'beat only here',
  'only-there': 'beat only there',
  class: 'beat of another class',
  moved: 'beat at another time',
  span: 'stretch excluded by one only',
};

const SHOWN = 50;
const ALL = 'all';

interface PlacesProps {
  readonly places: readonly PlacedDifference[];
  /** How to get from one to the next. */
  readonly hint: string;
  readonly hide: Hide;
  /** Goes to a difference by its place in the list. */
  readonly onGo: (at: number) => void;
}

/** Every place the two do not agree on, each with a way to it. */
export function Places({ places, hint, hide, onGo }: PlacesProps) {
  const [kind, setKind] = useState<PlacedKind | typeof ALL>(ALL);
  const [most, setMost] = useState(SHOWN);
  if (places.length === 0) return <p>No beat and no excluded stretch differs.</p>;
  const counts = PLACED_KINDS.map(
    (one) => [one, places.filter((p) => p.kind === one).length] as const,
  );
  const options = counts
    .filter(([, count]) => count > 0)
    .map(([one, count]) => [one, `${KIND_WORDS[one]} (${count})`] as const);
  const rows = places
    .map((place, at) => ({ place, at }))
    .filter(({ place }) => kind === ALL || place.kind === kind);
  const left = rows.length - most;
  return (
    <section className="compared-places" aria-label="Places that differ">
      <div className="compared-head">
        <h3>Places that differ</h3>
        <Choice
          label="Show"
          value={kind}
          options={[[ALL, `all (${places.length})`], ...options]}
          onChange={(one) => {
            setKind(one);
            setMost(SHOWN);
          }}
        />
      </div>
      <p className="small quiet">{hint}</p>
      <table className="compared-table">
        <thead>
          <tr>
            <th scope="col">where</th>
            <th scope="col">what</th>
            <th scope="col">here</th>
            <th scope="col">there</th>
          </tr>
        </thead>
        <tbody>
          {rows.slice(0, most).map(({ place, at }) => (
            <PlaceRow key={at} place={place} hide={hide} onGo={() => onGo(at)} />
          ))}
        </tbody>
      </table>
      {left > 0 ? (
        <button type="button" className="button log-more" onClick={() => setMost(most + SHOWN)}>
          Show {Math.min(left, SHOWN)} more of {left}
        </button>
      ) : null}
    </section>
  );
}

interface PlaceRowProps {
  readonly place: PlacedDifference;
  readonly hide: Hide;
  readonly onGo: () => void;
}

function PlaceRow({ place, hide, onGo }: PlaceRowProps) {
  const clock = formatClock(place.place.fromS);
  return (
    <tr>
      <th scope="row">
        <button
          type="button"
          className="go"
          aria-label={`Go to the difference at ${clock}: ${KIND_WORDS[place.kind]}`}
          onClick={onGo}
        >
          {clock}
        </button>
      </th>
      <td>{KIND_WORDS[place.kind]}</td>
      <td>{hide(place.here)}</td>
      <td>{hide(place.there)}</td>
    </tr>
  );
}

interface OtherProps {
  readonly differences: readonly Difference[];
  readonly hide: Hide;
}

/** Leads, phases, settings and words that differ. */
export function OtherDifferences({ differences, hide }: OtherProps) {
  if (differences.length === 0)
    return <p>Leads, settings, phases, events and words are the same.</p>;
  return (
    <table className="compared-table">
      <caption>Leads, settings, phases, events and words</caption>
      <thead>
        <tr>
          <th scope="col">what</th>
          <th scope="col">here</th>
          <th scope="col">there</th>
        </tr>
      </thead>
      <tbody>
        {differences.map(({ what, from, to }) => (
          <tr key={`${what} ${from} ${to}`}>
            <th scope="row">{what}</th>
            <td>{hide(from ?? 'none')}</td>
            <td>{hide(to ?? 'none')}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
