import { type EdfPlusContents, writeEdfPlus } from '../../../src/export/edf-plus';
import type { BeatList } from '../../../src/recording/beat';
import type { Findings } from '../../../src/recording/findings';
import type { HeartSegment, RrSeries } from '../../../src/recording/heart-series';
import type { Epoch } from '../../../src/recording/rhythm';
import { DEFAULT_SETTINGS } from '../../../src/recording/settings';
import type { Span } from '../../../src/recording/span';
import type { SimulatedStudy } from '../../../src/simulate/simulate-study';
import type { SimulationSpec } from '../../../src/simulate/spec';
import { startJob } from '../../../workers/job';
import { createPipeline } from '../../../workers/pipeline';
import { PHASES } from './families';

/** What the program makes of a study that nobody has touched. */
export interface Analysed {
  readonly beats: BeatList;
  readonly spans: readonly Span[];
  readonly epochs: readonly Epoch[];
  readonly segments: readonly HeartSegment[];
  readonly rr: RrSeries;
  readonly timingSdMs: number;
  readonly findings: Findings;
  /** The drawn slow wave at 4 Hz. */
  readonly slowWave: Float64Array;
}

/** The study as an EDF+ file, rounded as its digitiser says. */
export function fileOf({ signals, labels }: SimulatedStudy, spec: SimulationSpec): Blob {
  const { digitiser, durationS, rateHz } = spec;
  if (!digitiser) throw new Error('a study for a file has a digitiser');
  const { stepUv, railUv } = digitiser;
  const most = Math.round(railUv / stepUv);
  const contents: EdfPlusContents = {
    patient: { code: 'INVENTED', sex: null, birthDate: null, name: 'invented data' },
    recordingFields: {
      investigation: null,
      technician: null,
      equipment: 'Bicadence bench',
      additional: ['invented data'],
    },
    start: '2024-05-14T09:00:00',
    recordDurationS: 1,
    recordCount: durationS,
    signals: signals.map((signal, i) => ({
      label: labels[i],
      transducer: 'none (invented data)',
      unit: 'uV',
      physicalMin: -railUv,
      physicalMax: railUv,
      digitalMin: -most,
      digitalMax: most,
      prefilter: 'HP:DC LP:100Hz',
      samplesPerRecord: rateHz,
      digital: Int16Array.from(signal, (value) => Math.round(value / stepUv)),
    })),
    annotations: [],
  };
  return new Blob(writeEdfPlus(contents).map((part) => new Uint8Array(part)));
}

/** Runs the program's own pipeline on a study, from the file's bytes to the findings. */
export async function analysed(study: SimulatedStudy, spec: SimulationSpec): Promise<Analysed> {
  const { job } = startJob(() => undefined);
  const pipeline = createPipeline();
  const { ticket } = await pipeline.open(1, fileOf(study, spec), 'invented.edf', null, job);
  pipeline.accept(ticket);
  const lead = { kind: 'channel', channel: 0 } as const;
  const roles = { slow: [lead], reported: 0, heart: lead, breath: null };
  const given = { roles, phases: PHASES, spans: null, settings: DEFAULT_SETTINGS };
  const proposal = await pipeline.propose(given, job);
  const spans = proposal.spans.map((span, i) => ({ ...span, id: i + 1 }));
  const { beats } = proposal;
  const inputs = { edit: 0, roles, phases: PHASES, settings: DEFAULT_SETTINGS, spans, beats };
  const analysis = await pipeline.analyse(inputs, job);
  const heart = analysis.heart?.value;
  const slow = pipeline.slowWave(lead);
  if (!heart || !slow || !analysis.stomach) throw new Error('the first analysis holds every part');
  return {
    beats,
    spans,
    epochs: analysis.stomach.flatMap(({ epochs }) => epochs),
    segments: heart.segments,
    rr: heart.rr,
    timingSdMs: heart.timingSdMs,
    findings: analysis.findings,
    slowWave: slow.slowWave,
  };
}
