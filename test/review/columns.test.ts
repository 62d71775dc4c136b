import { describe, expect, it, vi } from 'vitest';
import { traceColumns } from '../../src/review/column-path';
import { type ColumnSpan, columnsServe, columnsWanted } from '../../src/review/column-windows';
import { ColumnsFeed } from '../../src/review/columns-feed';
import { isIdle } from '../../src/review/idle';
import type { Columns } from '../../workers/analysis-api';

describe('which columns a pane holds', () => {
  const view = { fromS: 1200, toS: 2400 };

  it('asks for three windows, a column a pixel', () => {
    const span = columnsWanted(view, 90_000, 600);
    expect(span.fromS).toBe(0);
    expect(span.toS).toBe(3600);
    expect(span.columns).toBe(1800);
  });

  it('keeps inside the study at both ends', () => {
    const start = columnsWanted({ fromS: 0, toS: 1200 }, 5400, 600);
    expect([start.fromS, start.toS]).toEqual([0, 2400]);
    expect(columnsWanted({ fromS: 4200, toS: 5400 }, 5400, 600).toS).toBeCloseTo(5400, 6);
  });

  it('lays columns on the same places wherever the window begins', () => {
    const width = 1200 / 600;
    const span = columnsWanted({ fromS: 1300.7, toS: 2500.7 }, 90_000, 600);
    expect(span.fromS / width).toBeCloseTo(Math.round(span.fromS / width), 9);
  });

  it('pans on what is held and asks again near the edge', () => {
    const held = columnsWanted({ fromS: 12_000, toS: 13_200 }, 90_000, 600);
    const at = (fromS: number) => columnsServe(held, { fromS, toS: fromS + 1200 }, 90_000, 600);
    expect([at(12_000), at(12_800), at(11_200)]).toEqual([true, true, true]);
    expect([at(13_000), at(11_000)]).toEqual([false, false]);
  });

  it('asks again where zoom leaves the columns too coarse or too fine', () => {
    const held = columnsWanted(view, 90_000, 600);
    expect(columnsServe(held, { fromS: 1500, toS: 2300 }, 90_000, 600)).toBe(false);
    expect(columnsServe(held, { fromS: 1400, toS: 2500 }, 90_000, 600)).toBe(true);
    expect(columnsServe(held, { fromS: 800, toS: 2700 }, 90_000, 600)).toBe(false);
  });
});

describe('the path of a trace', () => {
  const record = (low: number[], high: number[]) => {
    const drawn: string[] = [];
    const sink = {
      moveTo: (x: number, y: number) => void drawn.push(`M${x},${Math.round(y)}`),
      lineTo: (x: number, y: number) => void drawn.push(`L${x},${Math.round(y)}`),
    };
    const times = low.map((_, i) => i);
    const scale = { x0: 0, perS: 1, y0: 100, perUv: 1 };
    traceColumns(sink, times, low, high, 0, low.length, scale);
    return drawn;
  };

  it('is one vertical line a column from high to low', () => {
    expect(record([0, 5], [10, 20])).toEqual(['M0,90', 'L0,100', 'M1,80', 'L1,95']);
  });

  it('reaches over to a column that does not touch the one before', () => {
    expect(record([0, 50], [10, 60])).toEqual(['M0,90', 'L0,100', 'M1,40', 'L1,90']);
    expect(record([50, 0], [60, 10])).toEqual(['M0,40', 'L0,50', 'M1,50', 'L1,100']);
  });

  it('is a plain line through samples', () => {
    expect(record([1, 2, 3], [1, 2, 3])).toEqual(['M0,99', 'L0,99', 'L1,98', 'L2,97']);
  });

  it('breaks at gaps and never bridges them', () => {
    expect(record([1, Number.NaN, 3], [1, Number.NaN, 3])).toEqual([
      'M0,99',
      'L0,99',
      'M2,97',
      'L2,97',
    ]);
  });
});

describe('the feed of columns', () => {
  const answer = (span: ColumnSpan): Columns => ({
    request: { lead: { kind: 'channel', channel: 0 }, signal: 'recorded', ...span },
    timesS: new Float64Array(0),
    low: new Float32Array(0),
    high: new Float32Array(0),
  });
  const settle = async () => {
    for (let i = 0; i < 50 && !isIdle(); i += 1) await new Promise((done) => setTimeout(done, 0));
  };

  it('asks once for a window and pans on the answer', async () => {
    const ask = vi.fn(async (span: ColumnSpan) => answer(span));
    const feed = new ColumnsFeed(ask, () => undefined);
    feed.see({ fromS: 0, toS: 100 }, 10_000, 100);
    feed.see({ fromS: 1, toS: 101 }, 10_000, 100);
    await settle();
    feed.see({ fromS: 20, toS: 120 }, 10_000, 100);
    expect(ask).toHaveBeenCalledTimes(1);
  });

  it('leaves no queue behind a fast pan: only the last window is asked next', async () => {
    const waiting: (() => void)[] = [];
    const ask = vi.fn(
      (span: ColumnSpan) => new Promise<Columns>((done) => waiting.push(() => done(answer(span)))),
    );
    const feed = new ColumnsFeed(ask, () => undefined);
    for (const fromS of [0, 1000, 2000, 3000, 4000])
      feed.see({ fromS, toS: fromS + 100 }, 10_000, 100);
    expect(isIdle()).toBe(false);
    waiting.shift()?.();
    await vi.waitFor(() => expect(waiting).toHaveLength(1));
    waiting.shift()?.();
    await settle();
    expect(ask.mock.calls.map(([span]) => span.fromS)).toEqual([0, 3900]);
    expect(feed.held?.request.fromS).toBe(3900);
  });

  it('does not show what was asked before the signal changed', async () => {
    const waiting: ((columns: Columns | null) => void)[] = [];
    const changed = vi.fn();
    const feed = new ColumnsFeed(() => new Promise((done) => waiting.push(done)), changed);
    feed.see({ fromS: 0, toS: 100 }, 10_000, 100);
    feed.drop();
    waiting.shift()?.(answer({ fromS: 0, toS: 200, columns: 200 }));
    await settle();
    expect(changed).not.toHaveBeenCalled();
    expect(feed.held).toBeNull();
  });

  it('asks again after nothing came, and gives up in the end', async () => {
    const ask = vi.fn(async () => null);
    const feed = new ColumnsFeed(ask, () => undefined);
    feed.see({ fromS: 0, toS: 100 }, 10_000, 100);
    await vi.waitFor(() => expect(isIdle()).toBe(true), { timeout: 5000 });
    expect(ask).toHaveBeenCalledTimes(3);
  });
});
