import { describe, expect, it } from 'vitest';
import { openRecording } from '../../src/decode/formats';
import { writeEdfPlus } from '../../src/export/edf-plus';
import { DEMO_SPEC, demoStudy } from '../../src/simulate/demo';
import { simulateStudy } from '../../src/simulate/simulate-study';

const demo = demoStudy();
const file = new Blob(writeEdfPlus(demo));
const { truth } = simulateStudy(DEMO_SPEC);
const minutes = (predicate: (cpm: number) => boolean, from: number, to: number) => {
  const cpm = truth.slowCpm ?? new Float64Array(0);
  const part = cpm.subarray(from * 60 * truth.rateHz, to * 60 * truth.rateHz);
  return part.filter(predicate).length / truth.rateHz / 60;
};

describe('the demo study', () => {
  it('goes through the same writer and reader as any file', async () => {
    const source = await openRecording(file, demo.fileName, null);
    const { recording } = source;
    expect(recording.format).toBe('EDF+C');
    expect(recording.found).toEqual([]);
    expect(recording.durationS).toBe(5400);
    expect(recording.channels.map(({ label, rateHz }) => [label, rateHz])).toEqual([
      ['EGG 1', 250],
      ['EGG 2', 250],
      ['EGG 3', 250],
    ]);
    expect(recording.channels[0].railsUv).toEqual([-3276.7, 3276.7]);
    const first = await source.read(1, 500_000, 500_010);
    first.forEach((uv, i) => {
      expect(uv).toBeCloseTo(demo.signals[1].digital[500_000 + i] / 10, 9);
    });
  });

  it('says that it is invented wherever it names itself', async () => {
    const { recording } = await openRecording(file, demo.fileName, null);
    expect(recording.invented).toBe(true);
    expect(recording.identity).toEqual({
      code: 'INVENTED-01',
      name: 'invented data',
      sex: null,
      birthYear: null,
      recordingText: 'INVENTED-01, Bicadence demo, invented data',
    });
    expect(recording.annotations.map((one) => one.text)).toContain('invented data');
    const phases = ['fasting', 'meal start', 'meal end', 'fed', 'invented data'];
    for (const { text } of recording.annotations)
      expect(phases.includes(text) || text.endsWith('(invented)'), text).toBe(true);
  });

  it('marks fasting, meal and fed', async () => {
    const { annotations } = (await openRecording(file, demo.fileName, null)).recording;
    const at = (text: string) => annotations.find((one) => one.text === text);
    expect(at('fasting')).toMatchObject({ onsetS: 0, durationS: 1800 });
    expect(at('meal start')?.onsetS).toBe(1800);
    expect(at('meal end')?.onsetS).toBe(2400);
    expect(at('fed')).toMatchObject({ onsetS: 2400, durationS: 3000 });
  });

  it('has one episode below and one above the normal band (2 to 4 cpm), each of some minutes', () => {
    expect(minutes((cpm) => cpm < 2, 0, 30)).toBeGreaterThan(4);
    expect(minutes((cpm) => cpm < 2, 0, 90)).toBeLessThan(6);
    expect(minutes((cpm) => cpm >= 4, 40, 90)).toBeGreaterThan(6);
    expect(minutes((cpm) => cpm >= 4, 0, 90)).toBeLessThan(9);
  });

  it('has about 25 early beats of both kinds', () => {
    const early = truth.beats.filter((beat) => beat.beatClass !== 'N');
    expect(early.length).toBeGreaterThanOrEqual(20);
    expect(early.length).toBeLessThanOrEqual(30);
    expect(new Set(early.map((beat) => beat.beatClass))).toEqual(new Set(['V', 'S']));
  });

  it('has a stronger slow wave after the meal', () => {
    const mean = (from: number, to: number) => {
      const part = truth.slowAmplitudeUv[0].subarray(from * 1500, to * 1500);
      return part.reduce((sum, uv) => sum + uv, 0) / part.length;
    };
    expect(mean(50, 60) / mean(2, 20)).toBeGreaterThan(1.3);
  });

  it('touches the rail only where an electrode lifts off', () => {
    for (const { digital, label } of demo.signals) {
      const atRail = digital.filter((step) => Math.abs(step) === 32767).length;
      if (label === 'EGG 3') expect(atRail).toBeGreaterThanOrEqual(9 * 250);
      else expect(atRail).toBe(0);
    }
  });
});
