import { describe, expect, it } from 'vitest';
import { numberFigure, withheld } from '../../src/recording/figure';
import type { PhaseFindings } from '../../src/recording/findings';
import { changesOf, movementFigure, partsOf, withholdOrgan } from '../../workers/findings';

const phase = (name: string, figures: PhaseFindings['figures']): PhaseFindings => ({
  name,
  phase: name,
  fromS: 0,
  toS: 1800,
  keptStomachS: 1800,
  keptHeartS: 1800,
  adequacyStomach: 'enough',
  adequacyHeart: 'enough',
  figures,
});

describe('parts of a study', () => {
  it('a fed hour is shown whole and as its two halves', () => {
    const parts = partsOf([
      { name: 'fasting', fromS: 0, toS: 1800 },
      { name: 'fed', fromS: 2520, toS: 6120 },
    ]);
    expect(parts.map(({ name, fromS, toS }) => [name, fromS, toS])).toEqual([
      ['fasting', 0, 1800],
      ['fed', 2520, 6120],
      ['fed 0-30', 2520, 4320],
      ['fed 30-60', 4320, 6120],
    ]);
  });

  it('a second half that is cut short says how far it goes, and a short rest is no part', () => {
    const names = (toS: number) =>
      partsOf([{ name: 'fed', fromS: 2400, toS }]).map(({ name }) => name);
    expect(names(2400 + 48 * 60)).toEqual(['fed', 'fed 0-30', 'fed 30-48']);
    expect(names(2400 + 35 * 60)).toEqual(['fed', 'fed 0-30']);
    expect(names(2400 + 30 * 60)).toEqual(['fed']);
  });
});

describe('change between fasting and fed', () => {
  it('a power ratio of 4 dB is 2.5 times the power (CV-18)', () => {
    const changes = changesOf([
      phase('fasting', { dp_mean_spectrum_db: numberFigure(47.1) }),
      phase('fed', { dp_mean_spectrum_db: numberFigure(51.1) }),
    ]);
    const power = changes.find(({ key }) => key === 'dp_mean_spectrum_db')?.value;
    expect(power).toMatchObject({ kind: 'number', basis: '× 2.5' });
  });

  it('a figure withheld on one side has no change, and says so', () => {
    const changes = changesOf([
      phase('fasting', { rmssd_ms: withheld('too few') }),
      phase('fed', { rmssd_ms: numberFigure(30) }),
    ]);
    expect(changes.find(({ key }) => key === 'rmssd_ms')?.value.kind).toBe('withheld');
  });

  it('figures that grow with length are never compared', () => {
    const changes = changesOf([
      phase('fasting', { sdnn_whole_ms: numberFigure(50), sd2_ms: numberFigure(70) }),
      phase('fed', { sdnn_whole_ms: numberFigure(60), sd2_ms: numberFigure(80) }),
    ]);
    const wholePhase = ['sdnn_whole_ms', 'sd2_ms'];
    expect(changes.filter(({ key }) => wholePhase.includes(key))).toEqual([]);
  });
});

describe('movement', () => {
  const span = (cause: 'move' | 'rail', fromS: number, toS: number) => ({
    id: fromS,
    fromS,
    toS,
    lead: null,
    target: 'both' as const,
    cause,
    origin: 'drawn' as const,
    note: '',
  });

  it('counts spans of movement once, and the equipment’s not at all', () => {
    const figure = movementFigure(
      [span('move', 0, 60), span('move', 30, 90), span('rail', 100, 500)],
      { name: 'fasting', fromS: 0, toS: 900 },
    );
    expect(figure).toMatchObject({ kind: 'number', value: 10 });
  });
});

it('a filter that spoils the stomach’s band withholds every stomach figure and no other', () => {
  const figures = { df_median_cpm: numberFigure(3), rmssd_ms: numberFigure(30) };
  const kept = withholdOrgan(figures, 'stomach', 'high-pass of 0.5 Hz');
  expect(kept.df_median_cpm).toEqual(withheld('high-pass of 0.5 Hz'));
  expect(kept.rmssd_ms).toEqual(numberFigure(30));
});
