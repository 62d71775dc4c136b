import type { Annotation } from '../recording/recording';
import { simulateStudy } from './simulate-study';
import { type ArtefactSpec, type LeadSpec, PLAIN_LEAD, type SimulationSpec } from './spec';

const MINUTE = 60;
const points = (...rows: readonly (readonly [minute: number, value: number])[]) =>
  rows.map(([minute, value]) => ({ atS: minute * MINUTE, value }));

const LEADS: readonly LeadSpec[] = [
  {
    ...PLAIN_LEAD,
    label: 'EGG 1',
    slowGain: 1,
    slowDelayS: 0,
    heartUv: 210,
    heartAxisDeg: 10,
    breathingUv: 45,
    driftUv: 640,
  },
  {
    ...PLAIN_LEAD,
    label: 'EGG 2',
    slowGain: 0.75,
    slowDelayS: 1.6,
    heartUv: 150,
    heartAxisDeg: 165,
    breathingUv: 60,
    driftUv: -420,
  },
  {
    ...PLAIN_LEAD,
    label: 'EGG 3',
    slowGain: 0.5,
    slowDelayS: 3.1,
    heartUv: 110,
    heartAxisDeg: 60,
    breathingUv: 55,
    driftUv: 300,
  },
];

const artefact = (
  cause: ArtefactSpec['cause'],
  minute: number,
  seconds: number,
  sizeUv: number,
  leads: readonly number[] | null = null,
): ArtefactSpec => ({
  cause,
  fromS: minute * MINUTE,
  toS: minute * MINUTE + seconds,
  leads,
  sizeUv,
});

const ARTEFACTS: readonly ArtefactSpec[] = [
  artefact('talk', 7.3, 38, 70),
  artefact('cough', 12.1, 2.4, 500),
  artefact('move', 17.6, 24, 420),
  artefact('burst', 27.2, 6, 45),
  artefact('eat', 30.2, 570, 120),
  artefact('move', 40.3, 40, 500),
  artefact('talk', 48.5, 65, 80),
  artefact('electrode', 55.2, 34, 1400, [2]),
  artefact('rail', 55.4, 9, 1, [2]),
  artefact('step', 72.4, 30, 700, [1]),
  artefact('move', 76.1, 18, 380),
  artefact('flat', 83.5, 12, 0, [2]),
  artefact('cough', 86.4, 3.2, 420),
];

/** The invented demo: fasting, a meal, fed; an episode above the normal band in the fed phase, one below while fasting. */
export const DEMO_SPEC: SimulationSpec = {
  seed: 20240514,
  durationS: 90 * MINUTE,
  rateHz: 250,
  leads: LEADS,
  slowWave: {
    frequencyCpm: points(
      [0, 2.85],
      [20.8, 2.85],
      [21, 1.5],
      [25.5, 1.5],
      [25.7, 2.85],
      [40, 2.8],
      [42, 2.65],
      [50, 3.05],
      [60.9, 3.1],
      [61.1, 5.1],
      [68, 5.2],
      [68.2, 3.1],
      [90, 3.15],
    ),
    wanderCpm: 0.1,
    wanderS: 90,
    amplitudeUv: points(
      [0, 120],
      [20.8, 120],
      [21, 95],
      [25.5, 95],
      [25.7, 120],
      [30, 115],
      [42, 150],
      [52, 195],
      [60.8, 200],
      [61.2, 120],
      [68, 120],
      [68.4, 190],
      [90, 175],
    ),
    amplitudeWander: 0.15,
    harmonics: [0.18],
  },
  heart: {
    rateBpm: points([0, 66], [25, 62], [31, 71], [40, 75], [55, 72], [90, 68]),
    respiratoryMs: points([0, 32], [30, 36], [41, 20], [90, 26]),
    lowFrequencyMs: points([0, 18], [30, 18], [41, 24], [90, 22]),
    jitterMs: 5,
    ventricularPerHour: 13,
    supraventricularPerHour: 6,
    tWave: 0.28,
    respiratoryHeight: 0.09,
  },
  breathing: { ratePerMin: points([0, 15], [30, 14], [41, 16.5], [90, 15.5]), wanderPerMin: 0.7 },
  noise: { whiteUv: 0.8, muscleUv: 1.8, backgroundUv: 22, mainsUv: 1.5, mainsHz: 50, driftS: 420 },
  artefacts: ARTEFACTS,
  digitiser: { stepUv: 0.1, railUv: 3276.7 },
};

const event = (minute: number, text: string, seconds: number | null = null): Annotation => ({
  onsetS: minute * MINUTE,
  durationS: seconds,
  text,
});

const ANNOTATIONS: readonly Annotation[] = [
  event(0, 'invented data'),
  event(0, 'fasting', 30 * MINUTE),
  event(7.3, 'talked (invented)', 38),
  event(17.6, 'turned over (invented)'),
  event(30, 'meal start'),
  event(33.5, 'drank 200 ml (invented)'),
  event(40, 'meal end'),
  event(40, 'fed', 50 * MINUTE),
  event(48.5, 'talked (invented)', 65),
  event(55.9, 'electrode 3 pressed on again (invented)'),
  event(76.1, 'moved (invented)'),
];

const STEPS_PER_UV = 10;

/** One lead of the demo as a file of 16-bit samples holds it. */
export interface DemoSignal {
  readonly label: string;
  readonly transducer: string;
  readonly unit: string;
  readonly physicalMin: number;
  readonly physicalMax: number;
  readonly digitalMin: number;
  readonly digitalMax: number;
  readonly prefilter: string;
  readonly samplesPerRecord: number;
  readonly digital: Int16Array;
}

/** The demo study as plain data, ready for the EDF+ writer. */
export interface DemoStudy {
  readonly fileName: string;
  readonly patient: {
    readonly code: string;
    readonly sex: null;
    readonly birthDate: null;
    readonly name: string;
  };
  readonly recordingFields: {
    readonly investigation: string;
    readonly technician: null;
    readonly equipment: string;
    readonly additional: readonly string[];
  };
  readonly start: string;
  readonly recordDurationS: number;
  readonly recordCount: number;
  readonly signals: readonly DemoSignal[];
  readonly annotations: readonly Annotation[];
}

function digital(signal: Float64Array): Int16Array {
  const steps = new Int16Array(signal.length);
  for (let n = 0; n < signal.length; n += 1) steps[n] = Math.round(signal[n] * STEPS_PER_UV);
  return steps;
}

/** Makes the invented demo study: 90 min, three abdominal leads at 250 Hz in steps of 0.1 uV, labelled as invented. */
export function demoStudy(): DemoStudy {
  const { signals, labels } = simulateStudy(DEMO_SPEC);
  return {
    fileName: 'invented-demo.edf',
    patient: { code: 'INVENTED-01', sex: null, birthDate: null, name: 'invented data' },
    recordingFields: {
      investigation: 'INVENTED-01',
      technician: null,
      equipment: 'Bicadence demo',
      additional: ['invented data'],
    },
    start: '2024-05-14T09:00:00',
    recordDurationS: 1,
    recordCount: DEMO_SPEC.durationS,
    signals: signals.map((signal, i) => ({
      label: labels[i],
      transducer: 'none (invented data)',
      unit: 'uV',
      physicalMin: -3276.7,
      physicalMax: 3276.7,
      digitalMin: -32767,
      digitalMax: 32767,
      prefilter: 'HP:DC LP:100Hz',
      samplesPerRecord: DEMO_SPEC.rateHz,
      digital: digital(signal),
    })),
    annotations: ANNOTATIONS,
  };
}
