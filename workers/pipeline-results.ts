import { beatHeights } from '../src/heart/beat-heights';
import { breathingFromLead } from '../src/heart/breathing';
import { breathingFromBeatsInSteps } from '../src/heart/breathing-from-beats';
import type { Detection } from '../src/heart/detect';
import { type HeartFigures, heartFiguresInSteps } from '../src/heart/heart-figures';
import { beatTimes, rrSeries } from '../src/heart/rr-series';
import { seenInPassing } from '../src/heart/seen-in-passing';
import { BEAT_CLASSES, type BeatList } from '../src/recording/beat';
import type { SeenInPassing } from '../src/recording/figure';
import type { BreathingSeries, HeartSegment } from '../src/recording/heart-series';
import { leadKey } from '../src/recording/lead';
import { lostOn } from '../src/recording/lost';
import { type Phase, phasesOrWhole } from '../src/recording/phase';
import type { Recording } from '../src/recording/recording';
import type { HeartOutput } from '../src/recording/separated';
import type { Settings } from '../src/recording/settings';
import type { Interval } from '../src/recording/span';
import type { SeparatedSlow } from '../src/separate/route';
import { type StomachAnalysis, slowWaveRhythmInSteps } from '../src/stomach/slow-wave-rhythm';
import { createStomachMemory } from '../src/stomach/stomach-memory';
import { usualCpm } from '../src/stomach/usual-cpm';
import { cpmToHz } from '../src/units/rate';
import { TICKS_PER_SAMPLE } from '../src/units/ticks';
import type { Analysis, HeartResults, ReviewInputs, SeparationFacts } from './analysis-api';
import type { Part } from './findings';
import { type Job, withRests } from './job';
import { findingsInSteps } from './pipeline-findings';
import { identity, lastEqual, type Remembered, remember, rememberInSteps } from './remember';
import { sameBeats, sameBreathing } from './same-series';

/** Everything the figures are computed from. */
export interface ResultInputs {
  readonly inputs: ReviewInputs;
  readonly slow: readonly SeparatedSlow[];
  readonly heart: HeartOutput | null;
  /** The heart lead's own rate, that of the ticks. */
  readonly heartRateHz: number;
  /** Stretches that carry no heartbeat. */
  readonly blocked: readonly Interval[];
  readonly detection: Detection | null;
  readonly breathing: { readonly samples: Float64Array; readonly rateHz: number } | null;
}

/** All results, with a mark a part that changes when the part does. */
export interface Computed {
  readonly edit: number;
  readonly separation: readonly SeparationFacts[];
  readonly stomach: readonly StomachAnalysis[];
  readonly heart: HeartResults | null;
  readonly breathing: BreathingSeries | null;
  /** Heights of the normal beats, which breathing sways; null without a heart lead. */
  readonly heights: BeatHeights | null;
  readonly findings: Analysis['findings'];
  readonly marks: Readonly<Record<'separation' | 'stomach' | 'heart', string>>;
}

export interface Results {
  of(from: ResultInputs, job: Job): Promise<Computed>;
  /** What has changed since the last delivery; the rest is null. */
  deliver(computed: Computed): Analysis;
  /** Median DF of a lead when it was analysed last, 3 cpm where it has no rhythm. */
  usualCpm(lead: string): number;
}

interface StomachInputs {
  readonly slow: SeparatedSlow;
  readonly spoiled: readonly Interval[];
  readonly phases: readonly Phase[];
  readonly settings: Settings;
  readonly breathing: BreathingSeries | null;
}

/** Height of each normal beat in uV, NaN where it cannot be measured. */
export interface BeatHeights {
  readonly timesS: Float64Array;
  readonly heightsUv: Float64Array;
}

/** The heart side before phases: intervals, breathing, what was seen. */
interface HeartSide {
  readonly heights: BeatHeights;
  readonly results: HeartResults;
  readonly breathing: BreathingSeries;
  readonly figuresOf: (part: Part) => Generator<void, HeartFigures>;
  readonly seen: readonly SeenInPassing[];
}

/** The results of one study; a step is computed again only when something it depends on has changed. */
export function createResults(recording: Recording): Results {
  const beatsAsBefore = lastEqual<BeatList>(sameBeats);
  const breathingAsBefore = lastEqual<BreathingSeries>(sameBreathing);
  const leadBreathing = remember(
    (samples: { samples: Float64Array; rateHz: number }) => String(identity(samples.samples)),
    ({ samples, rateHz }) => breathingFromLead(samples, rateHz),
  );
  const heartStep = rememberInSteps(heartKey, (from: HeartInputs) => heartSideOf(from, recording));
  const stomachSteps = new Map<
    string,
    Remembered<StomachInputs, Generator<void, StomachAnalysis>>
  >();
  const usual = new Map<string, number>();
  let delivered: Computed['marks'] = { separation: '', stomach: '', heart: '' };

  function stomachOf(inputs: StomachInputs): Generator<void, StomachAnalysis> {
    const { lead } = inputs.slow;
    const known = stomachSteps.get(lead);
    if (known) return known.of(inputs);
    const memory = createStomachMemory();
    const step = rememberInSteps(stomachKey, (one: StomachInputs) =>
      slowWaveRhythmInSteps({ ...one, memory }),
    );
    stomachSteps.set(lead, step);
    return step.of(inputs);
  }

  return {
    usualCpm: (lead) => usual.get(lead) ?? 3,
    async of(from, job) {
      const { inputs, slow } = from;
      const { settings } = inputs;
      const phases = phasesOrWhole(inputs.phases, recording.durationS);
      const fromLead = from.breathing ? leadBreathing.of(from.breathing) : null;
      const heart = from.heart
        ? await withRests(
            heartStep.of({
              ...from,
              heart: from.heart,
              beats: beatsAsBefore(inputs.beats),
              phases,
              fromLead,
            }),
            job,
          )
        : null;
      const series = heart?.breathing ?? fromLead;
      const breathing = series && breathingAsBefore(series);
      const stomach: StomachAnalysis[] = [];
      for (const one of slow) {
        await job.breathe();
        const spoiled = stomachSpoiled(recording, inputs, one.lead);
        const lead = { slow: one, spoiled, phases, settings, breathing };
        stomach.push(await withRests(stomachOf(lead), job));
        usual.set(one.lead, usualCpm(stomach[stomach.length - 1].rhythm));
        job.progress('Reading the rhythm', stomach.length / slow.length);
      }
      const reading = findingsInSteps({
        recording,
        inputs,
        phases,
        heart,
        stomach,
        spoiled: stomachSpoiled(
          recording,
          inputs,
          leadKey(inputs.roles.slow[inputs.roles.reported]),
        ),
        breathing: fromLead,
      });
      const findings = await withRests(reading, job);
      const rhythms = stomach.map(identity).join();
      return {
        edit: inputs.edit,
        separation: slow.map((one, i) => factsOf(one, stomach[i])),
        stomach,
        heart: heart?.results ?? null,
        breathing,
        heights: heart?.heights ?? null,
        findings,
        marks: {
          separation: slow.map(identity).join() + rhythms,
          stomach: rhythms,
          heart: String(identity(heart)),
        },
      };
    },
    deliver({ edit, separation, stomach, heart, breathing, findings, marks }) {
      const before = delivered;
      delivered = marks;
      return {
        edit,
        separation: marks.separation === before.separation ? null : separation,
        stomach: marks.stomach === before.stomach ? null : stomach.map(({ rhythm }) => rhythm),
        heart: marks.heart === before.heart ? null : { value: heart },
        breathing,
        findings,
      };
    },
  };
}

interface HeartInputs extends ResultInputs {
  readonly heart: HeartOutput;
  readonly beats: BeatList;
  readonly phases: readonly Phase[];
  readonly fromLead: BreathingSeries | null;
}

const heartKey = (from: HeartInputs): string =>
  JSON.stringify([
    identity(from.heart),
    identity(from.beats),
    identity(from.detection),
    identity(from.fromLead),
    from.blocked,
    from.phases,
    from.inputs.settings.variability,
  ]);

function* heartSideOf(from: HeartInputs, recording: Recording): Generator<void, HeartSide> {
  const { heart, beats, blocked, detection, fromLead } = from;
  const { settings } = from.inputs;
  const rateHz = from.heartRateHz;
  const ticksPerSample = TICKS_PER_SAMPLE * heart.decimation;
  const rr = rrSeries(beats, rateHz, blocked);
  const heightsUv = beatHeights(heart.heartbeat, heart.rateHz, beats, ticksPerSample);
  yield;
  const { durationS } = recording;
  const breathing =
    fromLead ?? (yield* breathingFromBeatsInSteps({ rr, beats, rateHz, heightsUv, durationS }));
  const timingSdMs = detection?.timingSdMs ?? Number.NaN;
  const figuresOf = (part: Part) =>
    heartFiguresInSteps({ rr, beats, rateHz, part, blocked, settings, timingSdMs, breathing });
  const segments: HeartSegment[] = [];
  for (const phase of from.phases) {
    segments.push(...(yield* figuresOf({ ...phase, phase: phase.name })).segments);
    yield;
  }
  return {
    results: {
      rr,
      segments,
      heightUv: detection?.heightUv ?? 0,
      noiseUv: detection?.noiseUv ?? 0,
      timingSdMs,
    },
    breathing,
    heights: normalHeights(beats, rateHz, heightsUv),
    figuresOf,
    seen: seenInPassing({ rr, beats, rateHz, blocked, segments }),
  };
}

function normalHeights(beats: BeatList, rateHz: number, heightsUv: Float64Array): BeatHeights {
  const normal = BEAT_CLASSES.indexOf('N');
  const isNormal = (_: number, i: number) => beats.classes[i] === normal;
  return {
    timesS: beatTimes(beats, rateHz).filter(isNormal),
    heightsUv: heightsUv.filter(isNormal),
  };
}

const stomachKey = ({ slow, spoiled, phases, settings, breathing }: StomachInputs): string =>
  JSON.stringify([
    identity(slow),
    identity(breathing),
    spoiled,
    phases,
    settings.epoch,
    settings.rhythmBands,
  ]);

/** Stretches of a lead that carry no slow wave: spoiled for the stomach, or missing. */
function stomachSpoiled(
  recording: Recording,
  { roles, spans }: ReviewInputs,
  key: string,
): readonly Interval[] {
  const lead = roles.slow.find((one) => leadKey(one) === key);
  return lead ? lostOn(lead, 'stomach', spans, recording.gaps) : [];
}

/** What the panes say of a lead's separation; the lead in time is that at its own usual rhythm. */
function factsOf(slow: SeparatedSlow, analysis: StomachAnalysis): SeparationFacts {
  return {
    lead: slow.lead,
    unclean: slow.unclean,
    notes: slow.notes,
    leadS: slow.leadSAt(cpmToHz(usualCpm(analysis.rhythm))),
  };
}
