import { describe, expect, it } from 'vitest';
import { type Figures, numberFigure, withheld } from '../../src/recording/figure';
import { mostMoved, movedWords } from '../../src/recording/figure-moved';
import type { Findings, PhaseFindings } from '../../src/recording/findings';

const part = (name: string, figures: Figures, phase = name): PhaseFindings => ({
  name,
  phase,
  fromS: 0,
  toS: 1800,
  keptStomachS: 1800,
  keptHeartS: 1800,
  adequacyStomach: 'enough',
  adequacyHeart: 'enough',
  figures,
});
const findings = (...phases: readonly PhaseFindings[]): Findings => ({
  edit: 1,
  phases,
  changes: [],
  seen: [],
  warnings: [],
});
const told = (before: Findings, after: Findings) => {
  const moved = mostMoved(before, after);
  return moved && movedWords(moved);
};

describe('the figure that an edit moved most', () => {
  it('is told with its phase, from what to what, as it is printed', () => {
    const before = findings(
      part('fasting', { rmssd_ms: numberFigure(31.4), heart_rate_bpm: numberFigure(70.2) }),
      part('fed', { rmssd_ms: numberFigure(38.21), heart_rate_bpm: numberFigure(70.2) }),
    );
    const after = findings(
      part('fasting', { rmssd_ms: numberFigure(31.4), heart_rate_bpm: numberFigure(70.2) }),
      part('fed', { rmssd_ms: numberFigure(31.38), heart_rate_bpm: numberFigure(70.6) }),
    );
    expect(told(before, after)).toBe('RMSSD fed 38.2 to 31.4 ms');
  });

  it('is none where all are printed as before', () => {
    const before = findings(part('fed', { rmssd_ms: numberFigure(38.21) }));
    expect(told(before, findings(part('fed', { rmssd_ms: numberFigure(38.19) })))).toBeNull();
  });

  it('is one that comes or goes before one that only changes', () => {
    const before = findings(
      part('fed', { rmssd_ms: numberFigure(38), sdnn_ms: withheld('too few NN') }),
    );
    const after = findings(part('fed', { rmssd_ms: numberFigure(20), sdnn_ms: numberFigure(50) }));
    expect(told(before, after)).toBe('SDNN, 5 min, fed 50.0 ms, withheld before');
    expect(told(after, before)).toBe('SDNN, 5 min, fed 50.0 ms, now withheld: too few NN');
  });

  it('is of a whole phase before a part of one, whose figures move more easily', () => {
    const of = (whole: number, half: number) =>
      findings(
        part('fed', { rmssd_ms: numberFigure(whole) }),
        part('fed 0-30', { rmssd_ms: numberFigure(half) }, 'fed'),
      );
    expect(told(of(38, 38), of(37, 20))).toBe('RMSSD fed 38.0 to 37.0 ms');
    expect(told(of(38, 38), of(38, 20))).toBe('RMSSD fed 0-30 38.0 to 20.0 ms');
  });

  it('measures percentages by the whole, so that 1 to 2 % is no doubling', () => {
    const of = (normo: number, rmssd: number) =>
      findings(part('fed', { time_normo_pct: numberFigure(normo), rmssd_ms: numberFigure(rmssd) }));
    expect(told(of(1, 40), of(2, 38))).toMatch(/^RMSSD/);
  });
});
