import { BEAT_CLASSES, type BeatList } from '../recording/beat';
import type { DoubtEnding } from '../recording/doubt';
import { leadChannels, leadKey, leadName } from '../recording/lead';
import type { Recording } from '../recording/recording';
import type { RhythmBands, RouteName, Settings } from '../recording/settings';
import { coveredSeconds, type Span, spansOf } from '../recording/span';
import { type BeatTally, beatTally, programsBeats } from '../session/beat-tally';
import type { Session, SessionState, Signature } from '../session/document';
import { formatClock } from '../units/time';
import type { Hide } from './report-hiding';
import type { Fact } from './report-identity';

/** How the figures came about: the file, its leads, the program. */
export function studyFacts(
  recording: Recording,
  { roles, leadChoice, study }: SessionState,
  program: string,
  signed: Signature | null,
  hide: Hide | null,
  noHash: string,
): readonly Fact[] {
  const { channels, durationS, format } = recording;
  const free = hide ?? ((text: string) => text);
  const reported = free(leadName(roles.slow[roles.reported], channels));
  const why = leadChoice === '' ? '' : `: ${free(leadChoice)}`;
  const others = roles.slow
    .filter((_, place) => place !== roles.reported)
    .map((lead) => free(leadName(lead, channels)));
  const derived = roles.heart ? 'no lead; derived from the heartbeat' : 'no lead';
  const sha256 = signed?.sha256 ?? study.sha256 ?? noHash;
  return [
    {
      name: 'Recording',
      words: `${formatClock(durationS)}, ${format}, ${counted(channels.length, 'channel')}`,
    },
    { name: 'Reported lead', words: `${reported}${why}` },
    ...(others.length > 0 ? [{ name: 'Other leads', words: others.join(', ') }] : []),
    { name: 'Heart lead', words: roles.heart ? free(leadName(roles.heart, channels)) : 'none' },
    { name: 'Breathing', words: roles.breath ? free(leadName(roles.breath, channels)) : derived },
    { name: 'Program', words: program },
    ...(hide ? [] : [{ name: 'SHA-256', words: sha256 }]),
  ];
}

/** What became of the places where the program was unsure; `open` is null while they have not been looked for. */
export function doubtFact({ doubts }: SessionState, open: number | null): Fact {
  const ended = (ending: DoubtEnding) => doubts.filter((one) => one.ending === ending).length;
  const still = open === null ? 'not looked for yet' : `${open} open`;
  return {
    name: 'Doubts',
    words: `${still}, ${ended('kept')} kept as they were, ${ended('mended')} mended`,
  };
}

const countOf = (codes: Uint8Array, code: number): number =>
  codes.reduce((sum, one) => sum + (one === code ? 1 : 0), 0);

function classCounts({ classes }: BeatList): string {
  return BEAT_CLASSES.map((name, code) => `${name} ${countOf(classes, code)}`).join(', ');
}

/** Beats by class, what became of those the program found, and what people put in. */
export function beatFacts(session: Session, recording: Recording): readonly Fact[] {
  const { beats, roles } = session.state;
  const rateHz = roles.heart && recording.channels[leadChannels(roles.heart)[0]].rateHz;
  return [
    { name: 'Beats', words: `${beats.ticks.length} (${classCounts(beats)})` },
    {
      name: 'Beats edited',
      words: rateHz ? tallyWords(beatTally(programsBeats(session), beats, rateHz)) : 'none',
    },
  ];
}

/** "of 371 found by the program: 2 removed, 1 moved, 3 given another class (2 N to V, 1 V to N); 4 added, 1 placed". */
function tallyWords(tally: BeatTally): string {
  const { found, removed, moved, classed, added, placed, foundAgain } = tally;
  const given = classed.reduce((sum, { count }) => sum + count, 0);
  const classes = classed.map(({ from, to, count }) => `${count} ${from} to ${to}`).join(', ');
  const said = (parts: readonly (readonly [count: number, words: string])[]) =>
    parts.flatMap(([count, words]) => (count > 0 ? [`${count} ${words}`] : [])).join(', ');
  const ofFound = said([
    [removed, 'removed'],
    [moved, 'moved'],
    [given, `given another class (${classes})`],
  ]);
  const put = said([
    [added, 'added'],
    [placed, 'placed'],
    [foundAgain, 'found by the program when it looked again'],
  ]);
  const words = [ofFound && `of ${found} found by the program: ${ofFound}`, put].filter(Boolean);
  return words.length > 0 ? words.join('; ') : 'none';
}

const counted = (count: number, what: string): string =>
  `${count} ${what}${count === 1 ? '' : 's'}`;

/** What the log holds: how many acts, by whom. Reviewers are not named where identity is hidden. */
export function logFact({ log }: Session, hidden: boolean): Fact {
  if (log.length === 0) return { name: 'Log', words: 'empty: nothing was edited' };
  const acts = (kind: string) => log.filter(({ act }) => act.kind === kind).length;
  const reviewers = [...new Set(log.map(({ reviewer }) => reviewer))];
  const by = hidden
    ? `by ${counted(reviewers.length, 'reviewer')}`
    : reviewers
        .map((name) => `${name} ${log.filter(({ reviewer }) => reviewer === name).length}`)
        .join(', ');
  const counts = [
    counted(acts('edit'), 'edit'),
    ...(acts('undo') > 0 ? [`${acts('undo')} taken back`] : []),
    ...(acts('redo') > 0 ? [`${acts('redo')} done again`] : []),
  ];
  return { name: 'Log', words: `${counted(log.length, 'line')}: ${counts.join(', ')} (${by})` };
}

/** Spoiled spans of one cause: how many, who set them, and the minutes they take from each organ's figures. */
export interface SpanRow {
  readonly cause: string;
  readonly spans: number;
  /** Of the study, whatever it is excluded for. */
  readonly minutes: string;
  /** Out of the stomach's figures on the reported lead, and out of the heart's; null where there is no heart lead. */
  readonly stomachMinutes: string;
  readonly heartMinutes: string | null;
  readonly byHand: number;
  readonly proposed: number;
}

/**
 * Spoiled spans by cause, in alphabetical order, and of all causes together where there are several; what two spans of a row
 * cover both counts once.
 */
export function spanRows({ spans, roles }: SessionState, durationS: number): readonly SpanRow[] {
  const minutesOf = (some: readonly Span[]) => (coveredSeconds(some, 0, durationS) / 60).toFixed(1);
  const reported = leadKey(roles.slow[roles.reported]);
  const heart = roles.heart && leadKey(roles.heart);
  const rowOf = (cause: string, some: readonly Span[]): SpanRow => {
    const byHand = some.filter(({ origin }) => origin === 'drawn').length;
    return {
      cause,
      spans: some.length,
      minutes: minutesOf(some),
      stomachMinutes: minutesOf(spansOf(some, reported, 'stomach')),
      heartMinutes: heart && minutesOf(spansOf(some, heart, 'heart')),
      byHand,
      proposed: some.length - byHand,
    };
  };
  const causes = [...new Set(spans.map(({ cause }) => cause))].sort();
  const rows = causes.map((cause) =>
    rowOf(
      cause,
      spans.filter((span) => span.cause === cause),
    ),
  );
  return rows.length > 1 ? [...rows, rowOf('all causes', spans)] : rows;
}

const percent = (share: number): string => `${Math.round(100 * share)} %`;

/** How the slow wave is drawn inside its band. */
const drawingWords = ({ slowGain, breathingOut }: Settings): string =>
  [
    slowGain === 'fitted'
      ? 'frequencies weighed by how far they stand out of the background'
      : 'all frequencies alike',
    breathingOut === 'never'
      ? 'breathing left in'
      : 'breathing taken out where that measurably helps',
  ].join(', ');

/** How the average heartbeat is made, under the route that takes it out. */
const averageWords = ({ slowRoute, beatAverage }: Settings): string =>
  slowRoute === 'beat-average'
    ? ` (${beatAverage.beforeMs} ms before to ${beatAverage.afterMs} ms after R, ${beatAverage.beats} beats)`
    : '';

function routeWords(route: RouteName, organ: 'slow' | 'heart', settings: Settings): string {
  const band =
    organ === 'slow'
      ? `${settings.slowBandCpm.join('–')} cpm`
      : `${settings.heartBandHz.join('–')} Hz`;
  if (route !== 'fractional')
    return organ === 'slow'
      ? `${route}${averageWords(settings)}, ${band}, ${drawingWords(settings)}`
      : `${route}, ${band}`;
  const { order, memoryS, slowWindowMs, heartWindowMs, polynomialOrder } = settings.fractional;
  const windowMs = organ === 'slow' ? slowWindowMs : heartWindowMs;
  return `fractional, order ${order}, memory ${memoryS} s, window ${windowMs} ms, polynomial ${polynomialOrder}`;
}

const limitWords = ({ lowCpm, normoLowCpm, normoHighCpm, highCpm }: RhythmBands): string =>
  `brady ${lowCpm}–${normoLowCpm}, normo ${normoLowCpm}–${normoHighCpm}, tachy ${normoHighCpm}–${highCpm} cpm`;

/** The settings in force; every figure depends on them. */
export function settingFacts(settings: Settings): readonly Fact[] {
  const { epoch, variability } = settings;
  return [
    { name: 'Slow wave', words: `route ${routeWords(settings.slowRoute, 'slow', settings)}` },
    { name: 'Heartbeat', words: `route ${routeWords(settings.heartRoute, 'heart', settings)}` },
    { name: 'Rhythm limits', words: limitWords(settings.rhythmBands) },
    {
      name: 'Epochs',
      words: `${epoch.lengthS} s every ${epoch.stepS} s; kept up to ${percent(epoch.maxSpoiled)} spoiled; false alarm ${percent(epoch.falseAlarm)}`,
    },
    {
      name: 'Variability',
      words: `segments of ${variability.segmentS} s; LF ${variability.lfHz.join('–')} Hz, HF ${variability.hfHz.join('–')} Hz; at least ${percent(variability.minNnShare)} NN`,
    },
  ];
}
