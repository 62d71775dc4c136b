import { writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { type EdfPlusContents, writeEdfPlus } from '../../src/export/edf-plus';
import type { TrueBeat } from '../../src/simulate/beat-times';
import { DEMO_SPEC } from '../../src/simulate/demo';
import { simulateStudy } from '../../src/simulate/simulate-study';
import { type ArtefactSpec, PLAIN_LEAD, type SimulationSpec } from '../../src/simulate/spec';

export const RATE_HZ = 1000;
const MINUTE_S = 60;
const STEP_UV = 0.1;
const RAIL_UV = 3276.7;

/** An invented study of known make: signals for the steps, and the same as a file for whoever opens one. */
export interface InventedStudy {
  readonly minutes: number;
  readonly rateHz: number;
  /** uV, one array a lead. */
  readonly signals: readonly Float64Array[];
  readonly labels: readonly string[];
  readonly beats: readonly TrueBeat[];
}

const LEADS: SimulationSpec['leads'] = [
  { ...PLAIN_LEAD, label: 'EGG 1', slowGain: 1, heartUv: 190, heartAxisDeg: 10, driftUv: 500 },
  { ...PLAIN_LEAD, label: 'EGG 2', slowGain: 0.8, heartUv: 150, heartAxisDeg: 165, driftUv: -300 },
  { ...PLAIN_LEAD, label: 'EGG 3', slowGain: 0.6, heartUv: 120, heartAxisDeg: 60, driftUv: 200 },
  { ...PLAIN_LEAD, label: 'EGG 4', slowGain: 0.4, heartUv: 90, heartAxisDeg: 120, driftUv: -150 },
];

/** Spoiled stretches over and over: one cause every five minutes. */
function artefactsOf(minutes: number): readonly ArtefactSpec[] {
  const kinds = [
    ['talk', 30, 70],
    ['move', 20, 400],
    ['cough', 3, 450],
    ['electrode', 25, 1200],
  ] as const;
  return Array.from({ length: Math.floor(minutes / 5) }, (_, k) => {
    const [cause, seconds, sizeUv] = kinds[k % kinds.length];
    const fromS = (5 * k + 2.5) * MINUTE_S;
    return { cause, fromS, toS: fromS + seconds, leads: null, sizeUv };
  });
}

/** Four abdominal leads at 1 kHz with beats, ectopic beats, breathing, drift, hum, noise and spoiled stretches. */
export function inventedStudy(minutes: number): InventedStudy {
  const { signals, labels, rateHz, truth } = simulateStudy({
    ...DEMO_SPEC,
    seed: 7,
    durationS: minutes * MINUTE_S,
    rateHz: RATE_HZ,
    leads: LEADS,
    artefacts: artefactsOf(minutes),
    digitiser: { stepUv: STEP_UV, railUv: RAIL_UV },
  });
  return { minutes, rateHz, signals, labels, beats: truth.beats };
}

function digital(signal: Float64Array): Int16Array {
  const steps = new Int16Array(signal.length);
  for (let i = 0; i < signal.length; i += 1) steps[i] = Math.round(signal[i] / STEP_UV);
  return steps;
}

function contentsOf({ signals, labels, rateHz, minutes }: InventedStudy): EdfPlusContents {
  const third = (minutes * MINUTE_S) / 3;
  return {
    patient: { code: 'INVENTED-BENCH', sex: null, birthDate: null, name: 'invented data' },
    recordingFields: {
      investigation: null,
      technician: null,
      equipment: 'Bicadence bench',
      additional: ['invented data'],
    },
    start: '2024-05-14T09:00:00',
    recordDurationS: 1,
    recordCount: minutes * MINUTE_S,
    signals: signals.map((signal, i) => ({
      label: labels[i],
      transducer: 'none (invented data)',
      unit: 'uV',
      physicalMin: -RAIL_UV,
      physicalMax: RAIL_UV,
      digitalMin: -32767,
      digitalMax: 32767,
      prefilter: 'HP:DC LP:250Hz',
      samplesPerRecord: rateHz,
      digital: digital(signal),
    })),
    annotations: [
      { onsetS: 0, durationS: third, text: 'fasting' },
      { onsetS: third, durationS: third / 2, text: 'meal' },
      { onsetS: 1.5 * third, durationS: 1.5 * third, text: 'fed' },
    ],
  };
}

/** Writes the study as EDF+ into a folder and gives the path. */
export async function writeStudy(study: InventedStudy, folder: string): Promise<string> {
  const path = join(folder, `invented-${study.minutes}-min.edf`);
  await writeFile(path, Buffer.concat(writeEdfPlus(contentsOf(study))));
  return path;
}
