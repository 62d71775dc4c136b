import { bandPassTaps, convolveSame } from '../numeric/fir';
import { atOnce } from '../numeric/in-steps';
import { cascadeKernels, centredKernel } from '../numeric/kernel';
import { nanRuns } from '../numeric/nan-runs';
import type { Settings, SlowGain } from '../recording/settings';
import type { Interval } from '../recording/span';
import { type Cpm, cpmToHz, type Hertz } from '../units/rate';
import { formatClock } from '../units/time';
import { withoutBreathing } from './breathing-out';
import { bridged } from './bridge';
import { fittedGain, gainTaps } from './fitted-gain';
import { maskGaps } from './gaps';
import { FELT_SHARE, startHeart } from './heart-band';
import { type LeadSpectra, leadSpectra } from './lead-spectra';
import type { Drawing, Route, SeparatedSlow } from './route';
import { slowRateHz } from './slow-rate';
import { uncleanStretches } from './unclean';
import { withoutHoles } from './without-holes';

/** Half the transition of an edge over the edge itself; the edge is the -6 dB point. */
const EDGE_WIDTH = 0.5;
/** Harmonics of what stands out are drawn up to here. */
const HARMONICS_TO_CPM = 15;
/** Half the length of the fitted gain's own filter: that of the windows it is read off. */
const GAIN_HALF_S = 120;
/** What the lead is foretold by at both ends, so that a filter has something to run over. */
const MARGIN_S = 180;
const SLOW_ATTENUATION_DB = 44;
/**
 * Taps of the slow wave's zero-phase band-pass (windowed sinc, Kaiser 1974) at the slow rate;
 * `bandCpm` are its -6 dB points (the upper one lowered below half the rate), 44 dB down at half
 * the lower edge. Throws where the lower edge is not below the upper one.
 */
export function slowBandTaps(rateHz: Hertz, bandCpm: readonly [Cpm, Cpm]): Float64Array {
  const low = cpmToHz(bandCpm[0]);
  const high = Math.min(cpmToHz(bandCpm[1]), 0.45 * rateHz);
  if (!(low > 0 && low * (1 + EDGE_WIDTH) < high))
    throw new Error(`no band between ${bandCpm[0]} and ${bandCpm[1]} cpm at ${rateHz} Hz`);
  const width = Math.min(low * EDGE_WIDTH, 0.4 * (high - low));
  const upper = Math.min(width, rateHz / 2 - high);
  return bandPassTaps({
    rateHz,
    lowStopHz: low - width,
    lowPassHz: low + width,
    highPassHz: high - upper,
    highStopHz: high + upper,
    attenuationDb: SLOW_ATTENUATION_DB,
  });
}

/** Samples that are there, 1, and those in gaps, 0. */
export const present = (recorded: Float64Array) =>
  Uint8Array.from(recorded, (value) => (Number.isNaN(value) ? 0 : 1));

/** A lead that a filter can run over, and the spectra of what was there. */
interface Bridged {
  readonly lead: Float64Array;
  /** The same with foretold samples before and after it. */
  readonly whole: Float64Array;
  readonly spectra: LeadSpectra;
  readonly breathingOut: readonly Interval[];
}

const marginOf = (rateHz: Hertz) => Math.round(MARGIN_S * rateHz);

/** The lead with what is spoiled or missing bridged and breathing taken out; null where too little is there to go by. */
function* bridgedLead(
  recorded: Float64Array,
  rateHz: Hertz,
  { kept, breathing }: Pick<Drawing, 'kept' | 'breathing'>,
): Generator<void, Bridged | null> {
  const first = yield* leadSpectra(recorded, kept, rateHz, 'zero');
  if (!first) return null;
  const margin = marginOf(rateHz);
  const whole = yield* bridged(recorded, kept, rateHz, first, margin);
  yield;
  const inside = whole.subarray(margin, margin + recorded.length);
  const { lead, takenOut } = breathing
    ? withoutBreathing(inside, breathing, rateHz)
    : { lead: inside, takenOut: [] };
  whole.set(lead, margin);
  const untouched = takenOut.length === 0 && !kept.includes(0);
  const spectra = untouched ? first : yield* leadSpectra(lead, kept, rateHz, 'bridged');
  return spectra && { lead, whole, spectra, breathingOut: takenOut };
}

/**
 * A bridged lead filtered. Beyond its ends lies what its spectrum foretells; under an even gain, where nothing is fitted to
 * the lead, it is turned about its end values.
 */
function convolveWithin(
  { lead, whole }: Bridged,
  taps: Float64Array,
  gain: SlowGain,
): Float64Array {
  if (gain === 'even') return convolveSame(lead, taps, 'reflect-odd');
  const margin = (whole.length - lead.length) / 2;
  return convolveSame(whole, taps, 'zero').slice(margin, margin + lead.length);
}

/** The lead's filter as taps: the band alone, or the band with the gain fitted to the lead's own spectrum. */
function drawingTaps(
  rateHz: Hertz,
  { slowBandCpm, slowGain }: Settings,
  spectra: LeadSpectra | null,
): Float64Array {
  if (slowGain === 'even' || !spectra) return slowBandTaps(rateHz, slowBandCpm);
  const [low, high] = slowBandCpm;
  const band = centredKernel(slowBandTaps(rateHz, [low, Math.max(high, HARMONICS_TO_CPM)]));
  const gain = gainTaps(fittedGain(spectra, high), spectra.size, Math.round(GAIN_HALF_S * rateHz));
  return cascadeKernels(band, centredKernel(gain)).taps;
}

/** What of a slow wave the drawing makes. */
type Drawn = Pick<SeparatedSlow, 'slowWave' | 'notes'>;

/** All of a slow wave but its drawing. */
export function undrawn(
  lead: string,
  recorded: Float64Array,
  rateHz: Hertz,
  { slowBandCpm }: Settings,
): Omit<SeparatedSlow, keyof Drawn> {
  const bandTaps = slowBandTaps(rateHz, slowBandCpm).length;
  const feltS = (FELT_SHARE * (bandTaps - 1)) / 2 / rateHz;
  const reach = { afterS: feltS, beforeS: feltS };
  return {
    lead,
    route: 'band',
    rateHz,
    recorded,
    forSpectra: recorded,
    powerResponse: null,
    unclean: uncleanStretches(nanRuns(recorded), recorded.length, rateHz, reach),
    leadSAt: () => 0,
    derivativeLeadSAt: () => 0,
    wide: null,
  };
}

/** A slow wave that is drawn once, when it is first asked for. */
export function drawnWhenAsked(
  rest: Omit<SeparatedSlow, keyof Drawn>,
  draw: () => Generator<void, Drawn>,
): SeparatedSlow {
  let drawn: Drawn | null = null;
  const once = () => {
    drawn ??= atOnce(draw());
    return drawn;
  };
  return {
    ...rest,
    get slowWave() {
      return once().slowWave;
    },
    get notes() {
      return once().notes;
    },
  };
}

/** The slow wave of a lead at the slow rate by route `band`, with a rest now and then. */
export function* drawBand(
  recorded: Float64Array,
  rateHz: Hertz,
  settings: Settings,
  drawing: Pick<Drawing, 'kept' | 'breathing'>,
): Generator<void, Drawn> {
  const ready = yield* bridgedLead(recorded, rateHz, drawing);
  yield;
  const taps = drawingTaps(rateHz, settings, ready?.spectra ?? null);
  yield;
  const slowWave = ready
    ? convolveWithin(ready, taps, settings.slowGain)
    : convolveSame(withoutHoles(recorded), taps, 'reflect-odd');
  maskGaps(slowWave, nanRuns(recorded), 1);
  return {
    slowWave,
    notes: [
      drawnWords(settings, Math.round(taps.length / rateHz), ready !== null),
      ...breathingWords(ready?.breathingOut ?? []),
    ],
  };
}

function drawnWords({ slowBandCpm, slowGain }: Settings, lengthS: number, fitted: boolean): string {
  const [low, high] = slowBandCpm;
  const weighed =
    slowGain === 'fitted' && fitted
      ? ", frequencies weighed by how far they stand out of the lead's own background"
      : '';
  return `Slow wave by a zero-phase band-pass of ${low}-${high} cpm${weighed === '' ? ' (-6 dB)' : ''}, ${lengthS} s long${weighed}; spectra are those of the lead before it.`;
}

const breathingWords = (takenOut: readonly Interval[]): readonly string[] =>
  takenOut.length > 0
    ? [
        `Breathing is taken out of the drawn wave in ${takenOut
          .map(({ fromS, toS }) => `${formatClock(fromS)}-${formatClock(toS)}`)
          .join(', ')}.`,
      ]
    : [];

/**
 * Route `band`: slow wave and heartbeat by zero-phase FIR band-passes. Linear, without delay; rhythm
 * figures are computed on the lead before the slow wave's band-pass.
 */
export const bandRoute: Route = {
  start(job) {
    const heart = job.heart ? startHeart(job) : null;
    return {
      push(block) {
        heart?.push(block);
      },
      finish(recorded, facts) {
        const rateHz = slowRateHz(job.rateHz);
        return {
          slow: job.slow
            ? drawnWhenAsked(undrawn(job.lead, recorded, rateHz, job.settings), () =>
                drawBand(recorded, rateHz, job.settings, {
                  kept: present(recorded),
                  breathing: null,
                }),
              )
            : null,
          heart: heart ? heart.finish(facts) : null,
        };
      },
    };
  },
  *redraw(slow, settings, drawing) {
    const { lead, recorded, rateHz } = slow;
    return {
      ...undrawn(lead, recorded, rateHz, settings),
      ...(yield* drawBand(recorded, rateHz, settings, drawing)),
    };
  },
};
