import { BEAT_CLASSES, BEAT_ORIGINS, type BeatList } from '../recording/beat';
import { leadName } from '../recording/lead';
import type { Recording } from '../recording/recording';
import type { RhythmBands, RouteName, Settings } from '../recording/settings';
import { coveredSeconds, type Span } from '../recording/span';
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
): readonly Fact[] {
  const { channels, durationS, format } = recording;
  const free = hide ?? ((text: string) => text);
  const reported = free(leadName(roles.slow[roles.reported], channels));
  const why = leadChoice === '' ? '' : `: ${free(leadChoice)}`;
  const others = roles.slow
    .filter((_, place) => place !== roles.reported)
    .map((lead) => free(leadName(lead, channels)));
  const derived = roles.heart ? 'no lead; derived from the heartbeat' : 'no lead';
  const sha256 = signed?.sha256 ?? study.sha256 ?? 'not computed yet';
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

const countOf = (codes: Uint8Array, code: number): number =>
  codes.reduce((sum, one) => sum + (one === code ? 1 : 0), 0);

function classCounts({ classes }: BeatList): string {
  return BEAT_CLASSES.map((name, code) => `${name} ${countOf(classes, code)}`).join(', ');
}

/** Beats by class, what people put in, and what became of the beats first found. */
export function beatFacts({ start, state }: Session): readonly Fact[] {
  const { beats } = state;
  const before = new Map<number, number>();
  start.beats.ticks.forEach((tick, i) => {
    before.set(tick, start.beats.classes[i]);
  });
  let classed = 0;
  beats.ticks.forEach((tick, i) => {
    const was = before.get(tick);
    if (was !== undefined && was !== beats.classes[i]) classed += 1;
    before.delete(tick);
  });
  const byHand = BEAT_ORIGINS.map((origin, code) => ({
    origin,
    count: countOf(beats.origins, code),
  })).filter(({ origin, count }) => origin !== 'detected' && count > 0);
  const put = byHand.map(({ origin, count }) => `${count} ${origin}`);
  const changed = [
    ...put,
    ...(before.size > 0 ? [`${before.size} of those first found no longer there`] : []),
    ...(classed > 0 ? [`${classed} given another class`] : []),
  ];
  return [
    { name: 'Beats', words: `${beats.ticks.length} (${classCounts(beats)})` },
    { name: 'Beats edited', words: changed.length > 0 ? changed.join('; ') : 'none' },
  ];
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

/** Spoiled spans of one cause: how many, how many minutes of the study, and who set them. */
export interface SpanRow {
  readonly cause: string;
  readonly spans: number;
  readonly minutes: string;
  readonly byHand: number;
  readonly proposed: number;
}

/** Spoiled spans by cause, in alphabetical order; overlaps of one cause count once. */
export function spanRows(spans: readonly Span[], durationS: number): readonly SpanRow[] {
  const causes = [...new Set(spans.map(({ cause }) => cause))].sort();
  return causes.map((cause) => {
    const some = spans.filter((span) => span.cause === cause);
    const byHand = some.filter(({ origin }) => origin === 'drawn').length;
    return {
      cause,
      spans: some.length,
      minutes: (coveredSeconds(some, 0, durationS) / 60).toFixed(1),
      byHand,
      proposed: some.length - byHand,
    };
  });
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

function routeWords(route: RouteName, organ: 'slow' | 'heart', settings: Settings): string {
  const band =
    organ === 'slow'
      ? `${settings.slowBandCpm.join('–')} cpm`
      : `${settings.heartBandHz.join('–')} Hz`;
  if (route !== 'fractional')
    return organ === 'slow' ? `${route}, ${band}, ${drawingWords(settings)}` : `${route}, ${band}`;
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
