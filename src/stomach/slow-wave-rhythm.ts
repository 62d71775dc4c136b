import { atOnce } from '../numeric/in-steps';
import type { BreathingSeries } from '../recording/heart-series';
import type { Phase } from '../recording/phase';
import type { Epoch, SlowWaveRhythm } from '../recording/rhythm';
import type { SlowOutput } from '../recording/separated';
import type { Settings } from '../recording/settings';
import { type Interval, joinIntervals } from '../recording/span';
import type { Seconds } from '../units/time';
import { crestTimes } from './crests';
import { breathingOf, crestRateCpm } from './epoch-flags';
import { epochStarts } from './epoch-layout';
import type { EpochInput, EpochPart } from './epoch-rhythm';
import { keptSamples, missingStretches } from './kept-samples';
import { type SharedWindows, sharedWindows } from './shared-windows';
import { runningSpectrogram } from './spectrogram';
import { createStomachMemory, judgedEpoch, type StomachMemory } from './stomach-memory';
import { rowOf, type WindowRow } from './window-row';

export interface SlowWaveRhythmOptions {
  readonly slow: SlowOutput;
  /** Spoiled stretches that act on the stomach's figures of this lead. */
  readonly spoiled: readonly Interval[];
  /** At least one; the whole study where none is marked. */
  readonly phases: readonly Phase[];
  readonly settings: Settings;
  /** Null where nothing is known of the breathing. */
  readonly breathing: BreathingSeries | null;
  /** Kept from call to call, it spares what an edit has not touched; results are the same without. */
  readonly memory?: StomachMemory;
}

/** The judged epochs of one lead with the spectra its phases' figures are made of. */
export interface EpochAnalysis {
  readonly rhythm: Pick<SlowWaveRhythm, 'epochs'>;
  /** One an epoch of rhythm.epochs: power density in uV2/Hz of the recorded lead; null where not kept. */
  readonly epochSpectra: readonly (Float64Array | null)[];
  /** Bin k of a spectrum lies at k * binCpm. */
  readonly binCpm: number;
  /** Stretches of the lead without samples. */
  readonly missing: readonly Interval[];
  /** The breathing its epochs were judged beside; null where nothing is known of it. */
  readonly breathing: BreathingSeries | null;
}

/** The rhythm of one lead with what the panes draw of it. */
export interface StomachAnalysis extends EpochAnalysis {
  readonly rhythm: SlowWaveRhythm;
}

/** Samples missing for so long are a stop of the recorder, which no epoch reaches across; fewer are left out like spoiled ones. */
const STOP_S = 1;

interface Lead {
  readonly memory: StomachMemory;
  readonly options: SlowWaveRhythmOptions;
  readonly windows: SharedWindows;
  readonly halfWindows: SharedWindows;
  readonly crestsS: Float64Array;
  /** Stretches without samples, and those of them that are stops of the recorder. */
  readonly missing: readonly Interval[];
  readonly stops: readonly Interval[];
}

const reachesAcross = (stops: readonly Interval[], fromS: Seconds, toS: Seconds): boolean =>
  stops.some((stop) => stop.fromS < toS && stop.toS > fromS);

/** Windows beside an epoch that have a say in it, and its own. */
const ROW_PLACES = [-4, -3, -2, -1, 0, 1, 2, 3, 4];

function partOf(windows: SharedWindows, first: number): EpochPart {
  const { samples, kept, spoiledFraction } = windows.at(first);
  const { lengthS, rateHz } = windows.options;
  return {
    samples,
    kept,
    rateHz,
    density: windows.densityAt(first),
    binCpm: windows.binCpm,
    lengthS,
    spoiledFraction,
    without:
      spoiledFraction > 0
        ? (frequenciesCpm) => windows.densityWithout(first, frequenciesCpm)
        : null,
  };
}

function halvesOf(lead: Lead, first: number): readonly [EpochPart, EpochPart] | null {
  const { halfWindows, options } = lead;
  const lengthS = options.settings.epoch.lengthS / 2;
  const step = Math.round(lengthS * options.slow.rateHz);
  const half = (from: number): EpochPart | null =>
    halfWindows.at(from).spoiledFraction > options.settings.epoch.maxSpoiled
      ? null
      : partOf(halfWindows, from);
  const [before, after] = [half(first), half(first + step)];
  return before && after ? [before, after] : null;
}

/** An epoch among the windows before and after it that share no sample, where the phase and what is kept allow. */
function rowAt(lead: Lead, phase: Interval, first: number): WindowRow | null {
  const { windows, options } = lead;
  const { rateHz } = options.slow;
  const length = Math.round(options.settings.epoch.lengthS * rateHz);
  const found = ROW_PLACES.flatMap((place) => {
    const from = first + place * length;
    const inside = from >= phase.fromS * rateHz - 1 && from + length <= phase.toS * rateHz + 1;
    if (!inside || from < 0 || from + length > options.slow.forSpectra.length) return [];
    const { spoiledFraction } = windows.at(from);
    const stopped = reachesAcross(lead.stops, from / rateHz, (from + length) / rateHz);
    return stopped || spoiledFraction > options.settings.epoch.maxSpoiled
      ? []
      : [{ place, over: windows.overAt(from) }];
  });
  return rowOf(found, windows);
}

function epochInput(lead: Lead, phase: Interval, first: number, fromS: Seconds): EpochInput {
  const { windows, options, crestsS } = lead;
  const { lengthS } = options.settings.epoch;
  return {
    ...partOf(windows, first),
    crestCpm: crestRateCpm(crestsS, fromS, fromS + lengthS),
    breathing: breathingOf(options.breathing, fromS, fromS + lengthS),
    halves: () => halvesOf(lead, first),
    row: rowAt(lead, phase, first),
  };
}

function analyseEpoch(lead: Lead, phase: Phase, fromS: Seconds) {
  const { slow, settings } = lead.options;
  const { lengthS, maxSpoiled } = settings.epoch;
  const first = Math.max(0, Math.ceil(fromS * slow.rateHz - 1e-6));
  const { spoiledFraction } = lead.windows.at(first);
  const place = {
    lead: slow.lead,
    phase: phase.name,
    fromS,
    toS: fromS + lengthS,
    spoiledFraction,
  };
  const stopped = reachesAcross(lead.stops, fromS, fromS + lengthS);
  if (stopped || spoiledFraction > maxSpoiled || spoiledFraction === 1) {
    const nothing = { dfCpm: null, dpDb: null, peakShare: null, rhythm: null, flags: [] };
    const epoch: Epoch = { ...place, kept: false, ...nothing };
    return { epoch, spectrum: null };
  }
  const input = epochInput(lead, phase, first, fromS);
  const epoch: Epoch = { ...place, kept: true, ...judgedEpoch(lead.memory, input, settings) };
  return { epoch, spectrum: input.density };
}

function windowsOf(
  { slow }: SlowWaveRhythmOptions,
  kept: Uint8Array,
  lengthS: Seconds,
  before: SharedWindows | null,
): SharedWindows {
  const { forSpectra, rateHz, powerResponse } = slow;
  return sharedWindows({ signal: forSpectra, kept, rateHz, lengthS, powerResponse }, before);
}

/** A lead ready to be judged: its windows, those kept from before where nothing of them has changed, and its crests. */
function* leadOf(options: SlowWaveRhythmOptions): Generator<void, Lead> {
  const { slow, spoiled, settings } = options;
  const { lengthS } = settings.epoch;
  const kept = keptSamples(slow.forSpectra, slow.rateHz, spoiled);
  const missing = missingStretches(slow.forSpectra, slow.rateHz);
  const memory = options.memory ?? createStomachMemory();
  memory.windows = windowsOf(options, kept, lengthS, memory.windows);
  memory.halfWindows = windowsOf(options, kept, lengthS / 2, memory.halfWindows);
  yield;
  return {
    memory,
    options,
    windows: memory.windows,
    halfWindows: memory.halfWindows,
    stops: missing.filter(({ fromS, toS }) => toS - fromS >= STOP_S),
    missing,
    crestsS: crestTimes(slow.slowWave, {
      rateHz: slow.rateHz,
      highCpm: settings.rhythmBands.highCpm,
      unclean: joinIntervals([...slow.unclean, ...spoiled]),
    }),
  };
}

/** Epochs of the phases with their spectra, with a rest after each. */
function* epochsOf(lead: Lead): Generator<void, JudgedEpochs> {
  const { slow, phases, settings } = lead.options;
  const endS = slow.forSpectra.length / slow.rateHz;
  const analysed: ReturnType<typeof analyseEpoch>[] = [];
  for (const phase of phases) {
    const within = { fromS: Math.max(0, phase.fromS), toS: Math.min(phase.toS, endS) };
    for (const fromS of epochStarts(within, settings.epoch)) {
      analysed.push(analyseEpoch(lead, phase, fromS));
      yield;
    }
  }
  return {
    epochs: analysed.map(({ epoch }) => epoch),
    epochSpectra: analysed.map(({ spectrum }) => spectrum),
    binCpm: lead.windows.binCpm,
  };
}

/** Epochs with the spectra they were judged by. */
export type JudgedEpochs = Pick<StomachAnalysis, 'epochSpectra' | 'binCpm'> & {
  readonly epochs: readonly Epoch[];
};

/** The epochs alone, as slowWaveRhythm judges them, with a rest after each. */
export function* judgedEpochs(options: SlowWaveRhythmOptions): Generator<void, JudgedEpochs> {
  return yield* epochsOf(yield* leadOf(options));
}

/** All that figures are made of, without what the panes draw, with a rest after each epoch. */
export function* epochsInSteps(options: SlowWaveRhythmOptions): Generator<void, EpochAnalysis> {
  const lead = yield* leadOf(options);
  yield;
  const { epochs, epochSpectra, binCpm } = yield* epochsOf(lead);
  const { missing } = lead;
  return { rhythm: { epochs }, epochSpectra, binCpm, missing, breathing: options.breathing };
}

/**
 * Rhythm of the slow wave of one lead: epochs laid in each phase and judged, the running spectrum
 * of the whole lead, and the crests of the drawn wave. Spoiled and missing samples are left out of
 * spectra, and an epoch in which the recorder stopped is not kept; a phase that reaches past the lead ends with it.
 */
export const slowWaveRhythm = (options: SlowWaveRhythmOptions): StomachAnalysis =>
  atOnce(slowWaveRhythmInSteps(options));

/** slowWaveRhythm with a rest after each epoch. */
export function* slowWaveRhythmInSteps(
  options: SlowWaveRhythmOptions,
): Generator<void, StomachAnalysis> {
  const { slow, settings } = options;
  const lead = yield* leadOf(options);
  yield;
  const { epochs, epochSpectra, binCpm } = yield* epochsOf(lead);
  const { length } = slow.forSpectra;
  const spectrogram = runningSpectrogram(lead.windows, length, slow.rateHz, settings);
  return {
    rhythm: { lead: slow.lead, epochs, spectrogram: yield* spectrogram, crestsS: lead.crestsS },
    epochSpectra,
    binCpm,
    missing: lead.missing,
    breathing: options.breathing,
  };
}
