import { describe, expect, it } from 'vitest';
import { signatureRows, statusWords } from '../../src/export/report-signatures';
import { differencesSinceSigning, reportStatus } from '../../src/export/report-status';
import type { Figures } from '../../src/recording/figure';
import { numberFigure, withheld } from '../../src/recording/figure';
import type { Findings, PhaseFindings } from '../../src/recording/findings';
import type { LogLine, Session, Signature } from '../../src/session/document';
import { signature as invented } from '../session/invented-session';

const findings = (figures: Figures): Findings => ({
  edit: 3,
  phases: [{ name: 'fasting', figures } as unknown as PhaseFindings],
  changes: [],
  seen: [],
  warnings: [],
});
const df = (value: number): Findings => findings({ df_median_cpm: numberFigure(value) });

const signature = (edit: number, meaning: Signature['meaning'], reason = ''): Signature => ({
  ...invented(edit),
  name: 'R. Reader',
  meaning,
  reason,
});

const session = (lines: number, signed: readonly Signature[]): Session =>
  ({ log: new Array<LogLine>(lines), state: { signed } }) as unknown as Session;

const said = (lines: number, signed: readonly Signature[], hidden = false): string =>
  statusWords(reportStatus(session(lines, signed)), lines, hidden);

describe('the report’s status', () => {
  it('unsigned is a draft; read and untouched since is final', () => {
    expect(reportStatus(session(3, [])).kind).toBe('draft');
    expect(reportStatus(session(4, [signature(3, 'read')])).kind).toBe('final');
  });

  it('prepared is not read: a draft that names who prepared it', () => {
    expect(said(4, [signature(3, 'prepared')])).toBe(
      'Draft of edit 4: prepared by R. Reader, not read',
    );
  });

  it('an edit after signing makes it a draft again that names who signed', () => {
    const status = reportStatus(session(5, [signature(3, 'read')]));
    expect(status).toMatchObject({ kind: 'draft', former: [{ name: 'R. Reader' }] });
    expect(said(5, [signature(3, 'read')])).toContain('changed since R. Reader signed it');
    expect(said(5, [signature(3, 'prepared')])).toContain('changed since R. Reader prepared it');
  });

  it('an amendment keeps the former signatures, oldest first, with its reason', () => {
    const status = reportStatus(
      session(6, [signature(3, 'read'), signature(5, 'amended', 'missed beat')]),
    );
    expect(status.kind).toBe('amended');
    const rows = signatureRows(status, false, (text) => text);
    expect(rows.map(({ meaning, reason, current }) => [meaning, reason, current])).toEqual([
      ['read', '', false],
      ['amended', 'missed beat', true],
    ]);
  });

  it('says who signed and when, to the minute in UTC; the day goes where identity is hidden', () => {
    const signed = [{ ...signature(3, 'read'), atUtc: '2026-01-02T03:04:05.000Z' }];
    expect(said(4, signed)).toBe('Final: signed 2026-01-02 03:04 UTC by R. Reader');
    expect(said(4, signed, true)).toBe('Final: signed 2026 (day and time hidden) by R. Reader');
  });
});

describe('figures that a newer program gives differently', () => {
  it('are named with both values', () => {
    expect(differencesSinceSigning(df(3), df(3))).toEqual([]);
    expect(differencesSinceSigning(df(3), df(3.1))).toMatchObject([
      { phase: 'fasting', key: 'df_median_cpm', signed: '3.00', now: '3.10' },
    ]);
  });

  it('show what differs where the rounded values are alike', () => {
    expect(differencesSinceSigning(df(3), df(3.0001))).toMatchObject([
      { signed: '3', now: '3.0001' },
    ]);
    const [one] = differencesSinceSigning(
      findings({ lf_ms2: withheld('under 2 min') }),
      findings({ lf_ms2: withheld('too few NN') }),
    );
    expect([one.signed, one.now]).toEqual(['—, under 2 min', '—, too few NN']);
  });

  it('are told of a figure that is gone', () => {
    expect(differencesSinceSigning(df(3), findings({}))).toMatchObject([
      { signed: '3.00', now: '—' },
    ]);
  });
});
