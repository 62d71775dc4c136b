import type { Lead } from '../src/recording/lead';
import { lostOn } from '../src/recording/lost';
import type { Settings } from '../src/recording/settings';
import {
  MAP_ORDERS,
  MAP_WINDOWS_MS,
  type MapBar,
  type MapOrgan,
  type MapScores,
  type NoMap,
  type OrganMap,
} from '../src/recording/settings-map';
import { type Interval, type Span, withoutIntervals } from '../src/recording/span';
import { type FoldedLead, foldedLead, fractionalResponses } from '../src/separate/route-responses';
import { filtered, type ReadyStretch, readyStretch, scoreOf } from '../src/trust/match-score';
import { scoreMapInSteps } from '../src/trust/score-map';
import { stretchProducts } from '../src/trust/stretch-products';
import { inTurns, type Job, withRests } from './job';
import { readLead } from './lead-pass';
import type { DoubtInputs } from './pipeline-doubts';
import { leadChannel } from './pipeline-signals';
import type { Study } from './pipeline-study';

/** Shortest and longest stretch a map is made on. */
const LEAST_S = 240;
const MOST_S: Readonly<Record<MapOrgan, number>> = { slow: 1200, heart: 600 };
/** How far a drawn signal may be ahead of or behind what is known. */
export const MOST_AHEAD_S: Readonly<Record<MapOrgan, number>> = { slow: 5, heart: 0.03 };

/** What a map of one organ is made from. */
export interface MapWork {
  readonly study: Study;
  readonly from: DoubtInputs;
  readonly job: Job;
}

/** A stretch of a lead with what is known of it. */
export interface KnownStretch {
  readonly lead: FoldedLead;
  readonly target: Float64Array;
  /** What is added for the noisy map, its own root mean square said beside it. */
  readonly noise: Float64Array;
}

export const NO_STRETCH = 'No four minutes in a row are free of spoiled stretches.';

export const noMap = (reason: string): NoMap => ({ kind: 'no-map', reason });

/**
 * The middle of the longest stretch of a lead with nothing spoiled or missing, for either organ if there is one and else for
 * the map's own, as long as a map wants at most; null where none is long enough.
 */
export function mapStretch(
  organ: MapOrgan,
  lead: Lead,
  { recording }: Study['source'],
  spans: readonly Span[],
): Interval | null {
  const lostTo = (one: 'stomach' | 'heart') => lostOn(lead, one, spans, recording.gaps);
  const [stomach, heart] = [lostTo('stomach'), lostTo('heart')];
  return (
    longestClean(organ, recording.durationS, [...stomach, ...heart]) ??
    longestClean(organ, recording.durationS, organ === 'slow' ? stomach : heart)
  );
}

function longestClean(
  organ: MapOrgan,
  durationS: number,
  lost: readonly Interval[],
): Interval | null {
  const clean = withoutIntervals([{ fromS: 0, toS: durationS }], lost);
  const lengthOf = ({ fromS, toS }: Interval) => Math.min(MOST_S[organ], toS - fromS);
  const best = clean.reduce<Interval | null>(
    (most, one) => (most === null || lengthOf(one) > lengthOf(most) ? one : most),
    null,
  );
  if (!best || lengthOf(best) < LEAST_S) return null;
  const fromS = (best.fromS + best.toS - lengthOf(best)) / 2;
  return { fromS, toS: fromS + lengthOf(best) };
}

/** The samples of a lead over a stretch, folded; null where one of them is missing. */
export async function foldedStretch(
  { study, job }: MapWork,
  organ: MapOrgan,
  lead: Lead,
  { fromS, toS }: Interval,
): Promise<(FoldedLead & { readonly firstSample: number }) | null> {
  const { rateHz, sampleCount } = leadChannel(study.source.recording, lead);
  const first = Math.max(0, Math.ceil(fromS * rateHz));
  const samples = await readLead(
    study.source,
    lead,
    first,
    Math.min(sampleCount, Math.floor(toS * rateHz)),
  );
  await job.breathe();
  if (!samples.every(Number.isFinite)) return null;
  return { ...(await withRests(foldedLead(organ, samples, rateHz), job)), firstSample: first };
}

interface Scored {
  readonly organ: MapOrgan;
  readonly rateHz: number;
  readonly settings: Settings;
  /** Scores of the routes that have no map, on this very lead. */
  readonly barsOf: (
    stretch: ReadyStretch,
    lead: FoldedLead,
  ) => readonly MapBar[] | Promise<readonly MapBar[]>;
}

/** All scores of an organ on one stretch. */
async function scoresOf(
  { organ, rateHz, settings, barsOf }: Scored,
  target: Float64Array,
  lead: FoldedLead,
  { job, step }: { readonly job: Job; readonly step: string },
): Promise<MapScores> {
  const products = stretchProducts(target, lead.samples, lead.rateHz);
  await job.breathe();
  const stretch = readyStretch(products, MOST_AHEAD_S[organ]);
  await job.breathe();
  const { order, slowWindowMs, heartWindowMs } = settings.fractional;
  const ask = { organ, rateHz, freqsHz: products.freqsHz };
  const factors = fractionalResponses(settings.fractional, ask);
  await job.breathe();
  const { re, im } = factors.derivative(order);
  const gain = factors.smoothing(organ === 'slow' ? slowWindowMs : heartWindowMs);
  const asSet = scoreOf(stretch, filtered(products, re, im), gain);
  await job.breathe();
  const bars = await barsOf(stretch, lead);
  await job.breathe();
  const cells = await inTurns(
    scoreMapInSteps(stretch, factors, MAP_ORDERS, MAP_WINDOWS_MS[organ]),
    job,
    step,
  );
  return { cells, asSet, bars };
}

/** Both maps of an organ, from what is known of its stretch. */
export async function organMap(
  known: KnownStretch,
  scored: Scored,
  about: Pick<OrganMap, 'lead' | 'fromS' | 'toS' | 'target' | 'noiseUv' | 'noiseToHz'>,
  job: Job,
): Promise<OrganMap> {
  const { organ, settings } = scored;
  const { order, memoryS, polynomialOrder, slowWindowMs, heartWindowMs } = settings.fractional;
  const step = organ === 'slow' ? 'Mapping the slow wave' : 'Mapping the heartbeat';
  const { lead, target, noise } = known;
  const recorded = await scoresOf(scored, target, lead, { job, step });
  const added = { ...lead, samples: lead.samples.map((value, i) => value + noise[i]) };
  const noisy = await scoresOf(scored, target, added, { job, step });
  return {
    kind: 'map',
    organ,
    ...about,
    orders: MAP_ORDERS,
    windowsMs: MAP_WINDOWS_MS[organ],
    order,
    windowMs: organ === 'slow' ? slowWindowMs : heartWindowMs,
    memoryS,
    polynomialOrder,
    recorded,
    noisy,
  };
}
