import { describe, expect, it } from 'vitest';
import { openRecording } from '../../src/decode/formats';
import { type SeparatedInput, separatedEdf } from '../../src/export/separated-edf';
import { beatsOf } from '../../src/recording/beat';

const RATE_HZ = 500;
const slowWave = Float64Array.from({ length: 400 }, (_, i) => 120.5 * Math.sin(i / 12));
slowWave.fill(Number.NaN, 100, 120);
const heartbeat = Float32Array.from({ length: 25_000 }, (_, i) => (i % 200 === 0 ? 310 : -5));

const input: SeparatedInput = {
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

const opened = (made: SeparatedInput) =>
  openRecording(new Blob([...separatedEdf(made)]), 'separated.edf', null);

describe('the separated signals as EDF+', () => {
  it('open again with the same wave and heartbeat within half a step, 0 where there was nothing', async () => {
    const source = await opened(input);
    const { channels, durationS } = source.recording;
    expect(channels.map(({ label, rateHz }) => [label, rateHz])).toEqual([
      ['slow #1', 4],
      ['heart #2', 250],
    ]);
    expect(durationS).toBe(100);
    const slow = await source.read(0, 0, 400);
    slowWave.forEach((value, i) => {
      const wanted = Number.isNaN(value) ? 0 : value;
      expect(Math.abs(slow[i] - wanted)).toBeLessThan(0.51 * (121 / 32767));
    });
    const heart = await source.read(1, 0, 25_000);
    expect(heart[200]).toBeCloseTo(310, 1);
    expect(heart[201]).toBeCloseTo(-5, 1);
  });

  it('carry phases, spoiled spans, events, symptoms and beats at their times, and the study by its code alone', async () => {
    const { recording } = await opened(input);
    const told = recording.annotations.map(({ onsetS, durationS, text }) => [
      onsetS,
      durationS,
      text,
    ]);
    expect(told).toContainEqual([0, 60, 'fasting']);
    expect(told).toContainEqual([25, 5, 'spoiled: gap, both, #1']);
    expect(told).toContainEqual([40.5, null, 'event: drank 200 ml']);
    expect(told).toContainEqual([50, null, 'symptom: nausea 6/10']);
    expect(told).toContainEqual([10, null, 'beat N']);
    expect(told).toContainEqual([11.001, null, 'beat V']);
    expect(recording.identity).toMatchObject({ code: 'INV-3', name: null });
    expect(recording.start).toMatchObject({ kind: 'known', local: '2024-05-14T09:00:00' });
  });

  it('lie in longer records where a second does not hold whole samples, and without a signal that fits none', async () => {
    const odd = { ...input, heart: null };
    const [slow] = input.slow;
    const half = { ...slow, rateHz: 0.5, samples: slowWave.slice(0, 50).fill(7) };
    expect((await opened({ ...odd, slow: [half] })).recording.channels[0].rateHz).toBe(0.5);
    const heart = { label: 'heart #2', rateHz: 311.1273, samples: heartbeat, prefilter: '' };
    const left = (await opened({ ...input, heart })).recording.channels;
    expect(left.map(({ label }) => label)).toEqual(['slow #1']);
  });
});
