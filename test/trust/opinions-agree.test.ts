import { describe, expect, test } from 'vitest';
import { withEvidenceMarks } from '../../src/recording/evidence/evidence-marks';
import type { EpochOpinions } from '../../src/recording/evidence/opinions';
import {
  differenceWords,
  opinionsLines,
  samePercent,
} from '../../src/recording/evidence/opinions-words';
import { type Figures, numberFigure, withheld } from '../../src/recording/figure';
import type { Findings, PhaseFindings } from '../../src/recording/findings';
import { agreementOf, partOpinions } from '../../src/trust/opinions-agree';

const epoch = (parts: Partial<EpochOpinions>): EpochOpinions => ({
  phase: 'fasting',
  centreS: 120,
  hannCpm: 3,
  burgCpm: 3,
  burgOrder: 40,
  multitaperCpm: 3,
  crestCpm: 3,
  ...parts,
});

const many = (count: number, parts: Partial<EpochOpinions> = {}) =>
  Array.from({ length: count }, () => epoch(parts));

const part = (figures: Figures = {}, name = 'fasting'): PhaseFindings => ({
  name,
  phase: 'fasting',
  fromS: 0,
  toS: 1800,
  keptStomachS: 1800,
  keptHeartS: 1800,
  adequacyStomach: 'enough',
  adequacyHeart: 'enough',
  figures,
});

const powers = (lf: number, lfWelch: number, hf = 300, hfWelch = 300): Figures => ({
  df_median_cpm: numberFigure(3, '20 epochs', ['larger harmonic in 1 epoch']),
  lf_ms2: numberFigure(lf),
  lf_welch_ms2: numberFigure(lfWelch),
  hf_ms2: numberFigure(hf),
  hf_welch_ms2: numberFigure(hfWelch),
});

describe('agreement on DF', () => {
  test('is within 0.25 cpm, that included, over the epochs with a rhythm', () => {
    const epochs = [
      epoch({ burgCpm: 3.25 }),
      epoch({ burgCpm: 2.74 }),
      epoch({ burgCpm: null }),
      epoch({ hannCpm: null, burgCpm: 5 }),
    ];
    expect(agreementOf(epochs, ({ burgCpm }) => burgCpm)).toEqual({
      same: 1,
      of: 3,
      medianCpm: (3.25 + 2.74) / 2,
    });
  });

  test('is never written as all of the epochs where one is missing', () => {
    expect(samePercent({ same: 299, of: 300, medianCpm: 3 })).toBe(99);
    expect(samePercent({ same: 0, of: 0, medianCpm: null })).toBe(0);
  });

  test('in 18 of 20 epochs is enough, in 17 the figure says so', () => {
    const enough = [...many(18), ...many(2, { burgCpm: 6 })];
    const few = [...many(17), ...many(3, { burgCpm: 6 })];
    expect(partOpinions(part(), enough).disagreements).toEqual([]);
    expect(partOpinions(part(), few).disagreements).toEqual([
      { key: 'df_median_cpm', words: 'Burg agrees in 17 of 20 epochs' },
    ]);
  });

  test('is missed where the drawn wave has other crests than DF', () => {
    const crests = many(20, { crestCpm: 3.4 });
    expect(partOpinions(part(), crests).disagreements.map(({ words }) => words)).toEqual([
      'the drawn wave has 3.40 crests a minute',
    ]);
    expect(partOpinions(part(), many(20, { crestCpm: 3.2 })).disagreements).toEqual([]);
  });

  test('is not spoken of where no epoch has a rhythm', () => {
    const none = partOpinions(part(), many(20, { hannCpm: null, burgCpm: 6 }));
    expect(none).toMatchObject({ hannCpm: null, burg: { same: 0, of: 0 }, disagreements: [] });
    const [line] = opinionsLines({ lead: '#1', epochs: [], parts: [none] });
    expect(line.words).toContain('fasting: no epoch with a rhythm');
  });
});

describe('powers by two methods', () => {
  test('disagree where they differ by over a quarter of their mean', () => {
    expect(partOpinions(part(powers(100, 128)), many(1)).disagreements).toEqual([]);
    expect(partOpinions(part(powers(100, 130)), many(1)).disagreements).toEqual([
      { key: 'lf_ms2', words: 'Welch gives 130 ms²' },
    ]);
    expect(partOpinions(part(powers(100, 70)), many(1)).disagreements.length).toBe(1);
  });

  test('are paired only where both are given', () => {
    const figures = { ...powers(100, 100), hf_ms2: withheld('breathing') };
    expect(partOpinions(part(figures), many(1)).powers).toEqual([
      { key: 'lf_ms2', lombMs2: 100, welchMs2: 100 },
    ]);
  });

  test('are told by what Welch adds', () => {
    expect(differenceWords({ key: 'lf_ms2', lombMs2: 100, welchMs2: 110 })).toBe('+10 %');
    expect(differenceWords({ key: 'lf_ms2', lombMs2: 110, welchMs2: 100 })).toBe('−10 %');
    expect(differenceWords({ key: 'lf_ms2', lombMs2: 0, welchMs2: 0 })).toBe('±0 %');
  });
});

describe('a figure that other methods do not bear out', () => {
  const opinions = partOpinions(part(powers(100, 200)), many(20, { multitaperCpm: 5 }));
  const value = { lead: '#1', epochs: [], parts: [opinions] };
  const findings: Findings = {
    edit: 3,
    phases: [part(powers(100, 200)), part(powers(100, 200), 'fed')],
    changes: [],
    seen: [],
    warnings: [],
  };

  test('bears a mark after its own, in its phase alone', () => {
    const [fasting, fed] = withEvidenceMarks(findings, { opinions: value }).phases;
    expect(fasting.figures.df_median_cpm).toMatchObject({
      marks: ['larger harmonic in 1 epoch', 'multitaper agrees in 0 of 20 epochs'],
    });
    expect(fasting.figures.lf_ms2).toMatchObject({ marks: ['Welch gives 200 ms²'] });
    expect(fed).toEqual(findings.phases[1]);
    expect(withEvidenceMarks(findings, {})).toEqual(findings);
  });

  test('is named in the lines of trust', () => {
    expect(opinionsLines(value)).toEqual([
      {
        name: 'DF by other methods',
        words:
          'epochs within 0.25 cpm of DF. fasting: Burg 100 %, multitaper 0 % of 20, crests 3.00 for DF 3.00',
        mark: 'other methods disagree: fasting',
      },
      {
        name: 'Welch beside Lomb-Scargle',
        words: 'fasting: LF +67 %, HF ±0 %',
        mark: 'other methods disagree: fasting',
      },
    ]);
  });
});
