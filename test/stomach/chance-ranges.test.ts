import { describe, expect, test } from 'vitest';
import { atOnce } from '../../src/numeric/in-steps';
import { createRandom } from '../../src/numeric/random';
import { numberOf } from '../../src/recording/figure';
import type { Epoch, Rhythm } from '../../src/recording/rhythm';
import { BAND_PRESETS, bandsName, DEFAULT_SETTINGS } from '../../src/recording/settings';
import { stomachChanceRanges } from '../../src/stomach/chance-ranges';
import { effectiveLooks } from '../../src/stomach/effective-looks';
import { stomachFigures } from '../../src/stomach/figures';
import { limitsRanges } from '../../src/stomach/limits-ranges';
import type { EpochAnalysis } from '../../src/stomach/slow-wave-rhythm';
import { leadOf, noise, RATE_HZ, rhythmOfLead, slowOf, wave } from './leads';

const settings = DEFAULT_SETTINGS;

/** Epochs every minute with the rhythms of some letters (n, t, b, -), DF drawn about 3 cpm. */
function epochsOf(letters: string): readonly Epoch[] {
  const rhythms: Readonly<Record<string, Rhythm>> = {
    n: 'normo',
    t: 'tachy',
    b: 'brady',
    '-': 'none',
  };
  const random = createRandom(2);
  return Array.from(
    letters,
    (letter, k): Epoch => ({
      lead: '#1',
      phase: 'fasting',
      fromS: 60 * k,
      toS: 60 * k + 240,
      kept: true,
      spoiledFraction: 0,
      dfCpm: 3 + 0.1 * random.gaussian(),
      dpDb: 50 + random.gaussian(),
      peakShare: 0.5,
      rhythm: rhythms[letter],
      flags: [],
    }),
  );
}

/** Ranges of a part of so many epochs, all of one spectrum. */
function rangesOf(epochs: readonly Epoch[]) {
  const analysis: EpochAnalysis = {
    rhythm: { epochs },
    epochSpectra: epochs.map(() => new Float64Array(200).fill(1)),
    binCpm: 0.06,
    missing: [],
    breathing: null,
  };
  const part = { name: 'fasting', fromS: 0, toS: 60 * (epochs.length + 3) };
  const { figures, keptS } = stomachFigures({ analysis, phase: part, spoiled: [], settings });
  const ranges = atOnce(stomachChanceRanges({ analysis, part, figures, keptS, settings }));
  return { figures, ranges };
}

describe('how many looks at the rhythm a part holds', () => {
  const looks = (letters: string) => effectiveLooks(epochsOf(letters), 'normo', 7, 240);

  test('is one every four minutes where epochs that share no sample know nothing of each other', () => {
    expect(looks('n'.repeat(27))).toBe(7);
    // Runs of four with runs of four: unlike the next epoch that shares no sample.
    expect(looks('nnnntttt'.repeat(4))).toBe(7);
  });

  test('is fewer where runs are longer, and one at least', () => {
    const one = looks('nnnnnnnnnntttttttnnnnnnnnnn');
    expect(one).toBeLessThan(7);
    expect(looks('nnnnnnnnnnnnnntttttttttttttt')).toBeLessThan(one);
    expect(looks('n'.repeat(200) + 't'.repeat(200))).toBeGreaterThanOrEqual(7 / 19);
  });

  test('follows the length of the runs as the sum of a chain of two states has it', () => {
    // Mean run of m minutes of either state: neighbours 4 min apart are alike by exp(-8 / m); (1 - r) / (1 + r) of the looks.
    const random = createRandom(9);
    let state = true;
    const letters = Array.from({ length: 20000 }, () => {
      if (random.uniform() < 1 / 12) state = !state;
      return state ? 'n' : 't';
    }).join('');
    const alike = (1 - 2 / 12) ** 4;
    const found = effectiveLooks(epochsOf(letters), 'normo', 5000, 240);
    expect(Math.abs(found / (5000 * ((1 - alike) / (1 + alike))) - 1)).toBeLessThan(0.1);
  });
});

describe('ranges by chance of the stomach’s figures', () => {
  test('of a percentage of time is Wilson’s (Wilson 1927), 0 and 100 % have one too', () => {
    const { ranges } = rangesOf(epochsOf('n'.repeat(25)));
    // All of 7 looks (28 min): 7 / (7 + 1.96^2), Wilson's lower end for a share of 1.
    expect(ranges.time_normo_pct.low).toBeCloseTo((100 * 7) / (7 + 1.96 ** 2), 1);
    expect(ranges.time_normo_pct.high).toBeCloseTo(100, 9);
    expect(ranges.time_tachy_pct.low).toBeCloseTo(0, 9);
  });

  test('of DF holds the DF printed, and is told of epochs with a rhythm alone', () => {
    const { figures, ranges } = rangesOf(epochsOf('nnnnnnnntnnnnnnnnnnnnnnnnnn'));
    const df = numberOf(figures.df_median_cpm);
    expect(ranges.df_median_cpm.low).toBeLessThan(df);
    expect(ranges.df_median_cpm.high).toBeGreaterThan(df);
    expect(rangesOf(epochsOf(`nnnnnnn${'-'.repeat(20)}`)).ranges.df_median_cpm).toBeUndefined();
  });

  test('are told of no figure that is withheld', () => {
    const { figures, ranges } = rangesOf(epochsOf('nnn'));
    expect(figures.time_normo_pct.kind).toBe('withheld');
    expect(ranges).toEqual({});
    const none = rangesOf(epochsOf('-'.repeat(27))).ranges;
    expect(Object.keys(none)).toContain('time_none_pct');
    expect(Object.keys(none)).not.toContain('df_median_cpm');
  });
});

describe('ranges by limits', () => {
  const background = noise(40 * 60 * RATE_HZ, 1, 15, 3);
  const lead = leadOf(40, (t) => wave(60, 2.45, t)).map((uv, i) => uv + background[i]);
  const parts = [{ name: 'whole', fromS: 0, toS: 2400 }];
  const options = {
    slow: slowOf(lead),
    spoiled: [],
    phases: parts,
    settings,
    breathing: null,
  };
  const limits = atOnce(limitsRanges(options, parts, null)).get('whole');

  test('say under which limits a percentage is lowest and highest: a wave of 2.45 cpm is normo under some, brady under others', () => {
    expect(limits?.time_normo_pct).toMatchObject({ low: 0, high: 100 });
    expect(limits?.time_normo_pct.lowBy).toContain('-2.5-');
    expect(limits?.time_normo_pct.highBy).toContain('1-2-4-9 cpm');
    expect(limits?.time_brady_pct).toMatchObject({ low: 0, high: 100 });
  });

  test('are those of figures computed anew under every set of limits and length of epoch', () => {
    const values = [180, 240, 300].flatMap((lengthS) =>
      BAND_PRESETS.map((rhythmBands) => {
        const own = { ...settings, rhythmBands, epoch: { ...settings.epoch, lengthS } };
        const analysis = rhythmOfLead(lead, { settings: own });
        const made = stomachFigures({ analysis, phase: parts[0], spoiled: [], settings: own });
        return numberOf(made.figures.share_normo_pct);
      }),
    );
    expect(limits?.share_normo_pct.low).toBe(Math.min(...values));
    expect(limits?.share_normo_pct.high).toBe(Math.max(...values));
  });

  test('are the same from memory, and hold the setting in force though it is no preset', () => {
    const memory = new Map();
    atOnce(limitsRanges(options, parts, memory));
    expect(atOnce(limitsRanges(options, parts, memory)).get('whole')).toEqual(limits);
    const rhythmBands = { lowCpm: 1, normoLowCpm: 2.46, normoHighCpm: 2.47, highCpm: 9 };
    const odd = { ...options, settings: { ...settings, rhythmBands } };
    const found = atOnce(limitsRanges(odd, parts, null)).get('whole');
    expect(found?.share_normo_pct.lowBy).toContain(bandsName(rhythmBands));
  });
});
