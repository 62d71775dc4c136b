import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import type { FigureValue } from '../../src/recording/figure';
import { FIGURES } from '../../src/recording/figure-catalogue';
import type { BreathingSeries } from '../../src/recording/heart-series';
import type { Epoch, Rhythm } from '../../src/recording/rhythm';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import type { Interval } from '../../src/recording/span';
import { stomachCoverage } from '../../src/stomach/coverage';
import { densityDb } from '../../src/stomach/dominant-peak';
import { instabilityPercent, stomachFigures } from '../../src/stomach/figures';
import { meanSpectrum } from '../../src/stomach/mean-spectrum';
import type { StomachAnalysis } from '../../src/stomach/slow-wave-rhythm';
import { leadOf, noise, RATE_HZ, rhythmOfLead, wave } from './leads';

const { arithmetic } = JSON.parse(
  readFileSync(new URL('../reference/stomach-epochs.json', import.meta.url), 'utf8'),
);
const BIN_CPM = 0.5;

/** A density with one peak of a given height at a given frequency over a floor of 1. */
function peaked(cpm: number, height: number): Float64Array {
  const density = new Float64Array(32).fill(1);
  const bin = Math.round(cpm / BIN_CPM);
  density[bin - 1] = density[bin + 1] = height / 4;
  density[bin] = height;
  return density;
}

interface Made {
  readonly rhythm: Rhythm;
  readonly dfCpm?: number;
  readonly density?: number;
}

/** An analysis whose epochs are as given, one a minute from 0 on. */
function analysisOf(made: readonly Made[]): StomachAnalysis {
  const epochs = made.map(
    ({ rhythm, dfCpm = 3, density = 8e5 }, i): Epoch => ({
      lead: '#1',
      phase: 'fasting',
      fromS: 60 * i,
      toS: 60 * i + 240,
      kept: true,
      spoiledFraction: 0,
      dfCpm,
      dpDb: densityDb(density),
      peakShare: 0.9,
      rhythm,
      flags: [],
    }),
  );
  const spectrogram = {
    centresS: new Float64Array(0),
    firstCpm: 1,
    stepCpm: 1,
    binCount: 0,
    levelDb: new Float32Array(0),
  };
  return {
    rhythm: { lead: '#1', epochs, spectrogram, crestsS: new Float64Array(0) },
    epochSpectra: made.map(({ dfCpm = 3, density = 8e5 }) => peaked(dfCpm, density)),
    binCpm: BIN_CPM,
    missing: [],
    breathing: null,
  };
}

const figuresOf = (
  made: readonly Made[],
  spoiled: readonly Interval[] = [],
  toS = 60 * (made.length + 3),
) =>
  stomachFigures({
    analysis: analysisOf(made),
    phase: { name: 'fasting', fromS: 0, toS },
    spoiled,
    settings: DEFAULT_SETTINGS,
  });

function numberOf(figure: FigureValue): number {
  if (figure.kind !== 'number') throw new Error(`no number but ${JSON.stringify(figure)}`);
  return figure.value;
}

const times = (count: number, rhythm: Rhythm): Made[] => Array(count).fill({ rhythm });

describe('percent of time', () => {
  const { figures, adequacy } = figuresOf([
    ...times(20, 'normo'),
    ...times(2, 'brady'),
    ...times(1, 'tachy'),
    ...times(2, 'none'),
    ...times(1, 'mixed'),
    ...times(1, 'undecided'),
  ]);

  test('20 of 27 epochs are 74 % (CV-17), with the count beside it', () => {
    const figure = figures.time_normo_pct;
    expect(numberOf(figure)).toBeCloseTo(arithmetic.percent_20_of_27, 12);
    expect(numberOf(figure).toFixed(0)).toBe('74');
    expect(figure).toMatchObject({ basis: '20 of 27 epochs' });
    expect(adequacy).toBe('enough');
  });

  test('of the six outcomes add up to 100', () => {
    const keys = ['normo', 'brady', 'tachy', 'none', 'mixed', 'undecided'];
    const sum = keys.reduce((total, key) => total + numberOf(figures[`time_${key}_pct`]), 0);
    expect(sum).toBeCloseTo(100, 9);
  });

  test('under 15 clean minutes is a count: 5 of 7 epochs of 10 min', () => {
    const { figures: few } = figuresOf([...times(5, 'normo'), ...times(2, 'none')]);
    expect(few.time_normo_pct).toEqual({
      kind: 'count',
      count: 5,
      of: 7,
      what: 'epochs',
      marks: [],
    });
  });

  test('under 10 clean minutes is withheld with the reason', () => {
    const { figures: none, adequacy: left } = figuresOf(times(6, 'normo'));
    expect(none.time_normo_pct).toEqual({
      kind: 'withheld',
      reason: '9.0 clean minutes (under 10)',
    });
    expect(left).toBe('not-reportable');
  });
});

describe('DF and DP of a phase', () => {
  const made = arithmetic.df.map((dfCpm: number, i: number) => ({
    rhythm: 'normo' as const,
    dfCpm,
    density: arithmetic.density[i],
  }));
  const { figures } = figuresOf([...made, { rhythm: 'none', dfCpm: 8, density: 10 }]);

  test('median, mean, SD and instability are numpy’s, over the epochs with a rhythm (CV-20)', () => {
    expect(numberOf(figures.df_median_cpm)).toBeCloseTo(arithmetic.df_median, 12);
    expect(numberOf(figures.df_mean_cpm)).toBeCloseTo(arithmetic.df_mean, 12);
    expect(numberOf(figures.df_sd_cpm)).toBeCloseTo(arithmetic.df_sd, 12);
    expect(numberOf(figures.df_instability_pct)).toBeCloseTo(arithmetic.df_instability_pct, 10);
    expect(numberOf(figures.df_instability_pct)).toBeCloseTo(4.714, 3);
    expect(figures.df_median_cpm).toMatchObject({ basis: '6 epochs' });
  });

  test('instability of DP is of linear power, never of dB', () => {
    expect(numberOf(figures.dp_instability_pct)).toBeCloseTo(arithmetic.dp_instability_pct, 9);
    expect(numberOf(figures.dp_median_epoch_db)).toBeCloseTo(arithmetic.dp_median_db, 9);
  });

  test('instability needs two epochs with a rhythm', () => {
    const { figures: one } = figuresOf([...times(1, 'normo'), ...times(9, 'none')]);
    expect(one.df_instability_pct.kind).toBe('withheld');
    expect(instabilityPercent([3, 3])).toBe(0);
  });
});

describe('the reason for no DF', () => {
  const reasonOf = (made: readonly Made[]) => figuresOf(made).figures.df_median_cpm;

  test('says that nothing is decidable where breathing may be behind every peak', () => {
    expect(reasonOf(times(20, 'undecided'))).toEqual({
      kind: 'withheld',
      reason: 'every kept epoch is not decidable (may be breathing or drift)',
    });
  });

  test('counts what the epochs are where they differ', () => {
    expect(
      reasonOf([...times(12, 'none'), ...times(3, 'mixed'), ...times(5, 'undecided')]),
    ).toEqual({
      kind: 'withheld',
      reason:
        'no kept epoch has a rhythm of one band: 12 without rhythm, 3 mixed, 5 not decidable (may be breathing or drift)',
    });
  });

  test('is that nothing is kept where nothing is', () => {
    expect(reasonOf([])).toEqual({ kind: 'withheld', reason: 'no epoch is kept' });
  });
});

describe('tachygastria where breathing is not known', () => {
  const DOUBT = expect.stringContaining('cannot be told from tachygastria');
  const series = (perMinute: number): BreathingSeries => ({
    centresS: Float64Array.from({ length: 30 }, (_, i) => 60 * i + 30),
    perMinute: new Float64Array(30).fill(perMinute),
    from: 'derived',
  });
  const tachyOf = (made: readonly Made[], breathing: BreathingSeries | null) =>
    stomachFigures({
      analysis: { ...analysisOf(made), breathing },
      phase: { name: 'fasting', fromS: 0, toS: 1800 },
      spoiled: [],
      settings: DEFAULT_SETTINGS,
    }).figures.time_tachy_pct;
  const some = [...times(20, 'normo'), ...times(7, 'tachy')];

  test('may be slow breathing, and the figure says so', () => {
    expect(tachyOf(some, null)).toMatchObject({ marks: [DOUBT] });
    expect(tachyOf(some, series(Number.NaN))).toMatchObject({ marks: [DOUBT] });
  });

  test('is not doubted for that where the breathing is known or there is none of it', () => {
    expect(tachyOf(some, series(15))).toMatchObject({ marks: [] });
    expect(tachyOf(times(27, 'normo'), null)).toMatchObject({ marks: [] });
  });
});

describe('the mean spectrum', () => {
  test('averages power and then takes decibels: 1 and 100 give 17.033 dB (CV-19)', () => {
    const mean = meanSpectrum(
      [peaked(3, 1), peaked(3, 100)],
      BIN_CPM,
      DEFAULT_SETTINGS.rhythmBands,
    );
    const at3 = mean?.density[6] ?? Number.NaN;
    expect(densityDb(at3)).toBeCloseTo(arithmetic.mean_then_db, 12);
    expect(densityDb(at3)).toBeCloseTo(17.033, 3);
  });

  test('a strong short burst carries it although most epochs say otherwise', () => {
    const { figures } = figuresOf([
      ...times(20, 'normo'),
      ...Array(3).fill({ rhythm: 'tachy', dfCpm: 6, density: 5e7 }),
    ]);
    expect(numberOf(figures.df_mean_spectrum_cpm)).toBeCloseTo(6, 1);
    expect(numberOf(figures.time_normo_pct)).toBeGreaterThan(80);
  });

  test('splits its power in the search band into three shares of 100 %', () => {
    const { figures } = figuresOf(times(20, 'normo'));
    const shares = ['brady', 'normo', 'tachy'].map((key) => numberOf(figures[`share_${key}_pct`]));
    expect(shares.reduce((sum, share) => sum + share, 0)).toBeCloseTo(100, 9);
    expect(shares[1]).toBeGreaterThan(99);
  });
});

describe('the power ratio of two phases', () => {
  test('of 2.4 is 3.802 dB (CV-18), from mean spectra and from median epochs', () => {
    const fasting = figuresOf(times(20, 'normo'));
    const fed = figuresOf(Array(20).fill({ rhythm: 'normo', dfCpm: 3.5, density: 2.4 * 8e5 }));
    const change = (key: string) => numberOf(fed.figures[key]) - numberOf(fasting.figures[key]);
    expect(change('dp_mean_spectrum_db')).toBeCloseTo(arithmetic.db_of_2_4, 9);
    expect(change('dp_median_epoch_db')).toBeCloseTo(3.802, 3);
  });

  test('does not change when the whole study is twice as large (CV-62)', () => {
    const background = noise(RATE_HZ * 2400, 1, 10, 4);
    const study = leadOf(
      40,
      (t) => wave(t < 1200 ? 80 : 130, 3, t) + background[Math.round(t * RATE_HZ)],
    );
    const ratios = [study, study.map((uv) => 2 * uv)].map((signal) => {
      const analysis = rhythmOfLead(signal);
      const [before, after] = [
        [0, 1200],
        [1200, 2400],
      ].map(([fromS, toS]) =>
        numberOf(
          stomachFigures({
            analysis,
            phase: { name: 'part', fromS, toS },
            spoiled: [],
            settings: DEFAULT_SETTINGS,
          }).figures.dp_mean_spectrum_db,
        ),
      );
      return after - before;
    });
    expect(ratios[1]).toBeCloseTo(ratios[0], 9);
    expect(ratios[0]).toBeCloseTo(20 * Math.log10(130 / 80), 0);
  });
});

describe('coverage', () => {
  const phase = { fromS: 0, toS: 1800 };
  const lost = (seconds: number) => stomachCoverage(phase, [{ fromS: 100, toS: 100 + seconds }]);

  test('30 % lost is enough, more is limited and marked, over 50 % carries no percentages', () => {
    expect(lost(540)).toMatchObject({ adequacy: 'enough', marks: [], percentages: 'percent' });
    expect(lost(558)).toMatchObject({
      adequacy: 'limited',
      marks: ['limited: 31 % of the phase is lost'],
    });
    expect(lost(918)).toMatchObject({ adequacy: 'not-reportable', percentages: 'withheld' });
  });

  test('over half lost: no figure in percent, whatever it is a percentage of', () => {
    const inPercent = FIGURES.filter(({ organ, unit }) => organ === 'stomach' && /^%/.test(unit));
    const { figures } = figuresOf(times(57, 'normo'), [{ fromS: 0, toS: 1860 }]);
    for (const { key } of inPercent)
      expect(figures[key], key).toEqual({
        kind: 'withheld',
        reason: '52 % of the phase is lost (over 50 %)',
      });
    expect(inPercent).toHaveLength(11);
    expect(figures.df_median_cpm).toMatchObject({ kind: 'number' });
    const half = figuresOf(times(57, 'normo'), [{ fromS: 0, toS: 1800 }]).figures;
    expect(half.df_instability_pct.kind).toBe('number');
    expect(half.share_normo_pct.kind).toBe('number');
  });

  test('counts overlapping spoiled stretches once', () => {
    const twice = [
      { fromS: 0, toS: 300 },
      { fromS: 200, toS: 400 },
      { fromS: 1700, toS: 2500 },
    ];
    expect(stomachCoverage(phase, twice).keptS).toBe(1800 - 400 - 100);
  });

  test('minutes kept are given with the minutes of the phase', () => {
    const { figures } = figuresOf(times(27, 'normo'), [{ fromS: 0, toS: 90 }]);
    expect(figures.stomach_kept_min).toMatchObject({ value: 28.5, basis: 'of 30.0 min' });
  });
});

describe('a part of a phase', () => {
  test('uses the phase’s epochs that lie wholly inside it', () => {
    const analysis = analysisOf(times(57, 'normo'));
    const part = (fromS: number, toS: number) =>
      stomachFigures({
        analysis,
        phase: { name: 'fed 0-30', fromS, toS },
        spoiled: [],
        settings: DEFAULT_SETTINGS,
      }).figures.df_median_cpm;
    expect(part(0, 1800)).toMatchObject({ basis: '27 epochs' });
    expect(part(1800, 3600)).toMatchObject({ basis: '27 epochs' });
    expect(part(0, 3600)).toMatchObject({ basis: '57 epochs' });
  });
});

test('every stomach figure of the catalogue is given, and no other', () => {
  const keys = FIGURES.filter(({ organ }) => organ === 'stomach').map(({ key }) => key);
  for (const made of [times(30, 'normo'), times(30, 'none'), []])
    expect(Object.keys(figuresOf(made, [], 1980).figures).sort()).toEqual([...keys].sort());
});
