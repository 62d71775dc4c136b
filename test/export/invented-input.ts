import type { ExportInput } from '../../src/export/export-input';
import { beatsOf } from '../../src/recording/beat';
import type { Channel } from '../../src/recording/channel';
import type { Epoch } from '../../src/recording/rhythm';
import { secondsToTicks } from '../../src/units/ticks';
import { inventedState, RATE_HZ, signature, span } from '../session/invented-session';
import { INVENTED_EVIDENCE } from './invented-evidence';

/** RR intervals in ms of check value CV-23 (field notes, Task Force 1996 definitions). */
export const CV_23_RR_MS = [800, 810, 790, 860, 800, 805];

const channel = (index: number): Channel => ({
  index,
  label: `EGG${index + 1}`,
  rateHz: RATE_HZ,
  sampleCount: RATE_HZ * 150,
  unit: { kind: 'voltage', text: 'uV', microvoltsPerUnit: 1 },
  stepUv: 0.1,
  railsUv: null,
  transducer: '',
  prefilter: { kind: 'unknown', text: '' },
});

export function epoch(parts: Partial<Epoch>): Epoch {
  return {
    lead: '#1~#2',
    phase: 'fasting',
    fromS: 0,
    toS: 120,
    kept: true,
    spoiledFraction: 0.03125,
    dfCpm: 2.949,
    dpDb: 31.26,
    peakShare: 0.5,
    rhythm: 'normo',
    flags: ['filled', 'half'],
    ...parts,
  };
}

/** An invented study of 150 s: beats with the intervals of CV-23 from 10 s on, two epochs, one span in the second minute. */
export function inventedInput(): ExportInput {
  let atS = 10;
  const timesS = [atS];
  for (const rr of CV_23_RR_MS) {
    atS += rr / 1000;
    timesS.push(atS);
  }
  const ticks = timesS.map((time) => secondsToTicks(time, RATE_HZ));
  const state = {
    ...inventedState(),
    phases: [{ name: 'fasting', fromS: 0, toS: 60 }],
    beats: beatsOf(ticks.map((tick) => ({ tick, beatClass: 'N', origin: 'detected' }))),
    spans: [
      { ...span(2, 70, 85), target: 'stomach' as const, note: '=talk, "loud"' },
      { ...span(1, 60, 63), target: 'heart' as const, lead: '#2' },
    ],
  };
  return {
    recording: {
      format: 'EDF',
      fileName: 'Kowalska Anna.edf',
      sizeBytes: 1000,
      identity: { code: 'INV-7', name: 'Anna', sex: null, birthYear: 1980, recordingText: '' },
      start: { kind: 'unknown', raw: '' },
      durationS: 150,
      channels: [channel(0), channel(1)],
      annotations: [],
      found: [],
      gaps: [],
      invented: true,
    },
    state,
    sha256: 'ab'.repeat(32),
    program: 'Bicadence 0.1.0',
    edit: 7,
    evidence: INVENTED_EVIDENCE,
    siteReference: null,
    stomach: [
      {
        lead: '#1~#2',
        epochs: [
          epoch({}),
          epoch({
            fromS: 60,
            toS: 180,
            kept: false,
            dfCpm: null,
            dpDb: null,
            peakShare: null,
            rhythm: null,
            flags: [],
          }),
        ],
        spectrogram: {
          centresS: new Float64Array(0),
          firstCpm: 1,
          stepCpm: 0.1,
          binCount: 0,
          levelDb: new Float32Array(0),
        },
        crestsS: new Float64Array(0),
      },
    ],
    heart: {
      rr: {
        timesS: Float64Array.from(ticks.slice(1), (tick) => tick / (64 * RATE_HZ)),
        rrMs: Float64Array.from(CV_23_RR_MS),
        nn: new Uint8Array(CV_23_RR_MS.length).fill(1),
      },
      segments: [],
    },
    breathing: {
      centresS: Float64Array.of(30, 45, 90),
      perMinute: Float64Array.of(14.26, 20, Number.NaN),
      from: 'lead',
    },
    findings: signature(7).findings,
    openDoubts: [],
  };
}
