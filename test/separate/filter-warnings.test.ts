import { describe, expect, test } from 'vitest';
import type { Channel, Prefilter } from '../../src/recording/channel';
import { filterWarnings, firstOrderHighPassDb } from '../../src/separate/filter-warnings';

function channel(prefilter: Partial<Prefilter> | 'unknown', rateHz = 250): Channel {
  return {
    index: 0,
    label: 'EGG 1',
    rateHz,
    sampleCount: 1000,
    unit: { kind: 'voltage', text: 'uV', microvoltsPerUnit: 1 },
    stepUv: 0.1,
    railsUv: null,
    transducer: '',
    prefilter:
      prefilter === 'unknown'
        ? { kind: 'unknown', text: '' }
        : { kind: 'stated', text: '', highPassHz: null, lowPassHz: null, ...prefilter },
  };
}
const texts = (channels: readonly Channel[]) =>
  filterWarnings(channels).warnings.map(({ text }) => text);

describe('the tilt of a first-order high-pass at 0.05 Hz (CV-56)', () => {
  test.each([
    [1, -10],
    [3, -3.01],
    [9, -0.46],
  ])('at %d cpm is %d dB', (cpm, db) => {
    expect(Math.abs(firstOrderHighPassDb(0.05, cpm) - db)).toBeLessThan(0.01);
  });
});

describe('filters a file states', () => {
  test('0.01 Hz to 40 Hz at 250 Hz: nothing to say', () => {
    expect(filterWarnings([channel({ highPassHz: 0.01, lowPassHz: 40 })])).toEqual({
      warnings: [],
      withholdStomach: null,
      withholdHeart: null,
    });
  });

  test('a high-pass of 0.05 Hz: the band is tilted, by how much', () => {
    const found = filterWarnings([channel({ highPassHz: 0.05 })]);
    expect(found.withholdStomach).toBeNull();
    expect(found.warnings).toHaveLength(1);
    expect(found.warnings[0]).toMatchObject({ about: 'stomach' });
    expect(found.warnings[0].text).toMatch(
      /0\.05 Hz.*-10\.0 dB at 1 cpm, -3\.0 dB at 3 cpm, -0\.5 dB at 9 cpm/,
    );
  });

  test('a high-pass of 0.3 Hz: stomach figures are withheld', () => {
    expect(filterWarnings([channel({ highPassHz: 0.29 })]).withholdStomach).toBeNull();
    expect(filterWarnings([channel({ highPassHz: 0.3 })]).withholdStomach).toMatch(/0\.3 Hz/);
  });

  test('a low-pass under 5 Hz, or under 50 samples a second: no heartbeat can be read', () => {
    const words = /^no heartbeat can be read in this recording/;
    expect(filterWarnings([channel({ lowPassHz: 4.9 })]).withholdHeart).toMatch(words);
    expect(filterWarnings([channel({}, 49)]).withholdHeart).toMatch(words);
    expect(filterWarnings([channel({ lowPassHz: 5 }, 50)]).withholdHeart).toBeNull();
  });

  test('under 4 samples a second: an aliased heartbeat can look like a slow wave', () => {
    expect(texts([channel({}, 2)]).join()).toMatch(/can look like a slow wave/);
    expect(texts([channel({}, 4)]).join()).not.toMatch(/can look like a slow wave/);
  });

  test('unknown: it is said', () => {
    const found = filterWarnings([channel('unknown')]);
    expect(found.warnings.map(({ about }) => about)).toEqual(['stomach', 'heart']);
    for (const { text } of found.warnings)
      expect(text).toMatch(/EGG 1: the filters of the recording are unknown/);
    expect(found.withholdHeart).toBeNull();
  });

  test('a low-pass alone: that the high-pass is unknown is said of the stomach', () => {
    const found = filterWarnings([channel({ lowPassHz: 35 })]);
    expect(found.warnings).toHaveLength(1);
    expect(found.warnings[0].about).toBe('stomach');
    expect(found.warnings[0].text).toMatch(/EGG 1: the file states no high-pass.*unknown/);
  });

  test('of a difference the channel that states no high-pass is named, beside what the other states', () => {
    const pair = [channel({ lowPassHz: 35 }), { ...channel({ highPassHz: 0.1 }), label: 'EGG 2' }];
    expect(texts(pair)).toEqual([
      expect.stringMatching(/^EGG 1: the file states no high-pass/),
      expect.stringMatching(/^EGG 1 and EGG 2: the file states a high-pass of 0\.1 Hz/),
    ]);
  });

  test('of a difference of two channels the stronger counts', () => {
    const pair = [channel({ highPassHz: 0.01, lowPassHz: 3 }), channel({ highPassHz: 0.5 })];
    const found = filterWarnings(pair);
    expect(found.withholdStomach).toMatch(/0\.5 Hz/);
    expect(found.withholdHeart).toMatch(/3 Hz/);
  });
});
