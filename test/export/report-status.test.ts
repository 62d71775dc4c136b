import { describe, expect, it } from 'vitest';
import { differencesSinceSigning, reportStatus } from '../../src/export/report-status';
import { numberFigure } from '../../src/recording/figure';
import type { Findings, PhaseFindings } from '../../src/recording/findings';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import type { LogLine, Session, Signature } from '../../src/session/document';

const findings = (df: number): Findings => ({
  edit: 3,
  phases: [
    { name: 'fasting', figures: { df_median_cpm: numberFigure(df) } } as unknown as PhaseFindings,
  ],
  changes: [],
  seen: [],
  warnings: [],
});

const signature = (edit: number, meaning: Signature['meaning'], reason = ''): Signature => ({
  meaning,
  name: 'R. Reader',
  atUtc: '2026-01-02T03:04:05.000Z',
  edit,
  program: 'Bicadence 0.1.0',
  sha256: null,
  reason,
  settings: DEFAULT_SETTINGS,
  findings: findings(3),
  notes: '',
  conclusion: '',
});

const session = (lines: number, signed: readonly Signature[]): Session =>
  ({ log: new Array<LogLine>(lines), state: { signed } }) as unknown as Session;

describe('the report’s status', () => {
  it('unsigned is a draft; signed and untouched since is final', () => {
    expect(reportStatus(session(3, [])).kind).toBe('draft');
    expect(reportStatus(session(4, [signature(3, 'read')])).kind).toBe('final');
  });

  it('an edit after signing makes it a draft again that names who signed', () => {
    const status = reportStatus(session(5, [signature(3, 'read')]));
    expect(status).toMatchObject({ kind: 'draft' });
    expect(status.kind === 'draft' && status.why).toContain('R. Reader');
  });

  it('an amendment keeps the former signature', () => {
    const status = reportStatus(
      session(6, [signature(3, 'read'), signature(5, 'amended', 'missed beat')]),
    );
    expect(status.kind === 'amended' && status.former).toHaveLength(1);
  });

  it('figures that a newer program gives differently are named', () => {
    expect(differencesSinceSigning(findings(3), findings(3))).toEqual([]);
    expect(differencesSinceSigning(findings(3), findings(3.1))).toEqual([
      { phase: 'fasting', key: 'df_median_cpm' },
    ]);
  });
});
