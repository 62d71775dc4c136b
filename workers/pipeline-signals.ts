import { createPyramidBuilder, type MinMaxPyramid } from '../src/numeric/min-max-pyramid';
import { type Lead, leadChannels, leadKey } from '../src/recording/lead';
import type { Recording, SignalSource } from '../src/recording/recording';
import type { HeartOutput } from '../src/recording/separated';
import type { Settings } from '../src/recording/settings';
import type { Interval, Span } from '../src/recording/span';
import type { HeartPart, SeparatedSlow } from '../src/separate/route';
import { loadRoutes, type Routes } from '../src/separate/routes';
import { createSeparation, redrawInSteps, type Separation } from '../src/separate/separation';
import { keptSamples } from '../src/stomach/kept-samples';
import { createSpoilWatch, type SpoilWatch } from '../src/trust/spoil-watch';
import { type BreathingSampler, createBreathingSampler } from './breathing-sampler';
import { type Job, withRests } from './job';
import { type LeadConsumer, type LeadToRead, passOverLeads } from './lead-pass';
import { identity } from './remember';

/** The stomach's usual rhythm, until a recording's own is known. */
const USUAL_CPM = 3;

/** What is kept of one lead once the file has been read: nothing as long as the recording at its own rate but the heartbeat. */
export interface LeadSignals {
  readonly lead: Lead;
  readonly key: string;
  readonly pyramid: MinMaxPyramid;
  readonly proposedSpans: readonly Omit<Span, 'id'>[];
  readonly slow: { readonly madeBy: string; readonly output: SeparatedSlow } | null;
  readonly heart: { readonly madeBy: string; readonly output: HeartOutput } | null;
  /** Samples at a few a second, for the breathing rate; null where the lead is not read for it. */
  readonly breathing: { readonly samples: Float64Array; readonly rateHz: number } | null;
}

export interface WantedLead {
  readonly lead: Lead;
  readonly slow: boolean;
  readonly heart: boolean;
  readonly breathing: boolean;
}

/** What a lead's samples are made of: the first of its channels stands for the rate of both. */
export function leadChannel(recording: Recording, lead: Lead) {
  return recording.channels[leadChannels(lead)[0]];
}

/** Settings that make the slow wave another signal altogether; the band's limits only draw it again. */
const slowMadeBy = ({ slowRoute, fractional }: Settings): string =>
  slowRoute !== 'fractional'
    ? slowRoute
    : JSON.stringify([slowRoute, { ...fractional, undoLead: false, heartWindowMs: 0 }]);

const heartMadeBy = ({ heartRoute, heartBandHz, fractional }: Settings): string =>
  heartRoute === 'band'
    ? JSON.stringify(['band', heartBandHz])
    : JSON.stringify([
        heartRoute,
        heartBandHz,
        { ...fractional, undoLead: false, slowWindowMs: 0 },
      ]);

/** What a slow wave is drawn with. */
export interface SlowWish {
  /** Spoiled stretches that act on the stomach's figures of this lead. */
  readonly spoiled: readonly Interval[];
  readonly dfCpm?: number;
  readonly breathing?: Float64Array | null;
  /** Under route `beat-average`, what the heartbeats leave in the lead. */
  readonly heartPart?: HeartPart | null;
}

/** All that a drawn slow wave depends on beside the parted lead. */
function drawnByOf(
  { slowRoute, slowBandCpm, slowGain, fractional }: Settings,
  { spoiled, dfCpm, breathing, heartPart }: Required<SlowWish>,
): string {
  return JSON.stringify(
    slowRoute === 'fractional'
      ? fractional.undoLead && dfCpm
      : [slowBandCpm, slowGain, identity(breathing), identity(heartPart), spoiled],
  );
}

/** A slow wave under some settings, and what it was drawn from. */
interface Drawn {
  readonly from: SeparatedSlow;
  readonly drawnBy: string;
  readonly output: SeparatedSlow;
}

interface Reading extends LeadToRead {
  readonly finish: () => Generator<void, LeadSignals>;
}

/** The signals of leads, read from the file once and kept until settings make them others. */
export class SignalStore {
  readonly #source: SignalSource;
  readonly #kept = new Map<string, LeadSignals>();
  readonly #drawn = new Map<string, Drawn>();
  #routes: Routes = new Map();

  constructor(source: SignalSource) {
    this.#source = source;
  }

  /** A store that begins with what is kept here; what either is given later is not seen by the other. */
  apart(): SignalStore {
    const other = new SignalStore(this.#source);
    other.#routes = this.#routes;
    for (const [key, kept] of this.#kept) other.#kept.set(key, kept);
    for (const [key, drawn] of this.#drawn) other.#drawn.set(key, drawn);
    return other;
  }

  get(lead: Lead): LeadSignals | null {
    return this.#kept.get(leadKey(lead)) ?? null;
  }

  /** Makes sure that all is there that is wanted, in one pass over the file for all that is missing. */
  async provide(wanted: readonly WantedLead[], settings: Settings, job: Job): Promise<void> {
    const missing = joinWanted(wanted).filter((one) => !this.#has(one, settings));
    if (missing.length === 0) return;
    const { slowRoute, heartRoute } = settings;
    this.#routes = new Map([...this.#routes, ...(await loadRoutes([slowRoute, heartRoute]))]);
    const readings = missing.map((one) => this.#begin(one, settings));
    await passOverLeads(this.#source, readings, job, 'Reading the recording');
    for (const reading of readings) {
      const made = await withRests(reading.finish(), job);
      await job.breathe();
      const before = this.#kept.get(made.key);
      this.#kept.set(made.key, {
        ...made,
        slow: made.slow ?? before?.slow ?? null,
        heart: made.heart ?? before?.heart ?? null,
        breathing: made.breathing ?? before?.breathing ?? null,
      });
    }
  }

  /** The lead at the slow wave's rate, before any band; throws where it was not provided. */
  recorded(lead: Lead): Pick<SeparatedSlow, 'recorded' | 'rateHz' | 'wide'> {
    return this.#parted(lead);
  }

  #parted(lead: Lead): SeparatedSlow {
    const slow = this.get(lead)?.slow;
    if (!slow) throw new Error(`the slow wave of ${leadKey(lead)} was not provided`);
    return slow.output;
  }

  /**
   * The slow wave of a lead under the settings, what is spoiled for the stomach bridged and breathing taken out where a
   * reference is given; throws where it was not provided. Takes a rest now and then.
   */
  *slow(lead: Lead, settings: Settings, wish: SlowWish): Generator<void, SeparatedSlow> {
    const key = leadKey(lead);
    const from = this.#parted(lead);
    const { spoiled, dfCpm = USUAL_CPM, breathing = null, heartPart = null } = wish;
    const drawnBy = drawnByOf(settings, { spoiled, dfCpm, breathing, heartPart });
    const before = this.#drawn.get(key);
    if (before?.from === from && before.drawnBy === drawnBy) return before.output;
    const kept = keptSamples(from.recorded, from.rateHz, spoiled);
    const drawing = { dfCpm, kept, breathing, heartPart };
    const output = yield* redrawInSteps(from, settings, drawing, this.#routes);
    this.#drawn.set(key, { from, drawnBy, output });
    return output;
  }

  /** The slow wave as it was drawn last; null where none was. */
  drawn(lead: Lead): SeparatedSlow | null {
    return this.#drawn.get(leadKey(lead))?.output ?? null;
  }

  heart(lead: Lead): HeartOutput | null {
    return this.get(lead)?.heart?.output ?? null;
  }

  #has({ lead, slow, heart, breathing }: WantedLead, settings: Settings): boolean {
    const kept = this.get(lead);
    if (!kept) return false;
    return (
      (!slow || kept.slow?.madeBy === slowMadeBy(settings)) &&
      (!heart || kept.heart?.madeBy === heartMadeBy(settings)) &&
      (!breathing || kept.breathing !== null)
    );
  }

  #begin(wanted: WantedLead, settings: Settings): Reading {
    const { lead } = wanted;
    const key = leadKey(lead);
    const channel = leadChannel(this.#source.recording, lead);
    const { rateHz, sampleCount } = channel;
    const pyramid = createPyramidBuilder(rateHz);
    const potential = channel.unit.kind === 'voltage';
    const watch: SpoilWatch | null = potential
      ? createSpoilWatch({
          lead: key,
          rateHz,
          railsUv: lead.kind === 'channel' ? channel.railsUv : null,
          stepUv: channel.stepUv,
        })
      : null;
    const separation: Separation | null =
      wanted.slow || wanted.heart
        ? createSeparation({
            lead: key,
            rateHz,
            sampleCount,
            settings,
            routes: this.#routes,
            wants: wanted,
          })
        : null;
    const breathing: BreathingSampler | null = wanted.breathing
      ? createBreathingSampler(rateHz)
      : null;
    const all: readonly (LeadConsumer | null)[] = [pyramid, watch, separation, breathing];
    return {
      lead,
      consumers: all.filter((one) => one !== null),
      *finish() {
        const parted = separation?.finish();
        yield;
        const columns = pyramid.finish();
        yield;
        const proposedSpans = watch ? yield* watch.finishInSteps() : [];
        yield;
        return {
          lead,
          key,
          pyramid: columns,
          proposedSpans,
          slow: parted?.slow ? { madeBy: slowMadeBy(settings), output: parted.slow } : null,
          heart: parted?.heart ? { madeBy: heartMadeBy(settings), output: parted.heart } : null,
          breathing: breathing?.finish() ?? null,
        };
      },
    };
  }
}

/** One wish a lead, with all that is wanted of it. */
function joinWanted(wanted: readonly WantedLead[]): readonly WantedLead[] {
  const byKey = new Map<string, WantedLead>();
  for (const one of wanted) {
    const key = leadKey(one.lead);
    const before = byKey.get(key);
    byKey.set(key, {
      lead: one.lead,
      slow: one.slow || (before?.slow ?? false),
      heart: one.heart || (before?.heart ?? false),
      breathing: one.breathing || (before?.breathing ?? false),
    });
  }
  return [...byKey.values()];
}
