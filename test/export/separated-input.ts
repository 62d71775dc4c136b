import type { SeparatedInput } from '../../src/export/separated-edf';
import { beatsOf } from '../../src/recording/beat';

const RATE_HZ = 500;
/** An invented slow wave with a gap of 5 s. */
export const slowWave = Float64Array.from({ length: 400 }, (_, i) => 120.5 * Math.sin(i / 12));
slowWave.fill(Number.NaN, 100, 120);
const heartbeat = Float32Array.from({ length: 25_000 }, (_, i) => (i % 200 === 0 ? 310 : -5));

/** Invented separated signals with one annotation of each kind. */
export const SEPARATED_INPUT: SeparatedInput = {
  code: 'INV-3',
  start: '2024-05-14T09:00:00',
  durationS: 100,
  program: 'Bicadence 0.1.0',
  slow: [{ label: 'slow #1', rateHz: 4, samples: slowWave, prefilter: 'slow wave, route band' }],
  heart: { label: 'heart #2', rateHz: 250, samples: heartbeat, prefilter: 'heartbeat' },
  beats: beatsOf([
    { tick: 64 * 500 * 10, beatClass: 'N', origin: 'detected' },
    { tick: 64 * 500 * 11 + 32, beatClass: 'V', origin: 'detected' },
  ]),
  beatRateHz: RATE_HZ,
  phases: [{ name: 'fasting', fromS: 0, toS: 60 }],
  spans: [
    {
      id: 1,
      fromS: 25,
      toS: 30,
      lead: '#1',
      target: 'both',
      cause: 'gap',
      origin: 'proposed',
      note: '',
    },
  ],
  notes: [
    { kind: 'event', atS: 40.5, text: 'drank 200 ml' },
    { kind: 'symptom', atS: 50, text: 'nausea', score: 6 },
  ],
};
