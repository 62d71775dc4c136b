import { describe, expect, it } from 'vitest';
import { openRecording } from '../../src/decode/formats';
import { type SeparatedInput, separatedEdf } from '../../src/export/separated-edf';
import { SEPARATED_INPUT, slowWave } from './separated-input';

const opened = (made: SeparatedInput) =>
  openRecording(new Blob([...separatedEdf(made)]), 'separated.edf', null);

describe('the separated signals as EDF+', () => {
  it('open again with the same wave and heartbeat within half a step, 0 where there was nothing', async () => {
    const source = await opened(SEPARATED_INPUT);
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
    const { recording } = await opened(SEPARATED_INPUT);
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
    const odd = { ...SEPARATED_INPUT, heart: null };
    const [slow] = SEPARATED_INPUT.slow;
    const half = { ...slow, rateHz: 0.5, samples: slowWave.slice(0, 50).fill(7) };
    expect((await opened({ ...odd, slow: [half] })).recording.channels[0].rateHz).toBe(0.5);
    const heart = { ...slow, label: 'heart #2', rateHz: 311.1273 };
    const left = (await opened({ ...SEPARATED_INPUT, heart })).recording.channels;
    expect(left.map(({ label }) => label)).toEqual(['slow #1']);
  });
});
