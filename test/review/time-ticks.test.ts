import { describe, expect, it } from 'vitest';
import { tickStepS, timeTicks, widthText } from '../../src/review/time-ticks';

const texts = (fromS: number, toS: number, px: number, coarsest: 'h:mm' | 'h:mm:ss') =>
  timeTicks({ fromS, toS }, px, 64, coarsest).map((tick) => tick.text);

describe('the time axis', () => {
  it('counts twenty minutes in whole even minutes, as h:mm', () => {
    expect(texts(720, 1920, 870, 'h:mm')).toEqual([
      '0:12',
      '0:14',
      '0:16',
      '0:18',
      '0:20',
      '0:22',
      '0:24',
      '0:26',
      '0:28',
      '0:30',
      '0:32',
    ]);
  });

  it('counts ten seconds in seconds, as h:mm:ss', () => {
    const ticks = texts(1260, 1270, 870, 'h:mm:ss');
    expect(ticks[0]).toBe('0:21:00');
    expect(ticks).toHaveLength(11);
    expect(ticks[10]).toBe('0:21:10');
  });

  it('writes decimals only where the step has them', () => {
    expect(texts(60, 61, 400, 'h:mm:ss')).toContain('0:01:00.2');
    expect(texts(0, 90, 400, 'h:mm')).toEqual([
      '0:00:00',
      '0:00:15',
      '0:00:30',
      '0:00:45',
      '0:01:00',
      '0:01:15',
      '0:01:30',
    ]);
  });

  it('goes past 24 hours without turning over', () => {
    expect(texts(86_000, 94_000, 400, 'h:mm')).toContain('25:00');
  });

  it('never crowds labels, whatever the window', () => {
    for (const windowS of [1, 7, 61, 900, 5400, 86_400, 200_000])
      for (const px of [300, 800, 1700])
        expect((tickStepS(windowS, px, 64) / windowS) * px).toBeGreaterThanOrEqual(
          Math.min(64, (86_400 / windowS) * px),
        );
  });

  it('is empty for an empty window', () => {
    expect(timeTicks({ fromS: 5, toS: 5 }, 800, 64, 'h:mm')).toEqual([]);
  });

  it('says widths in the unit people use', () => {
    expect([widthText(10), widthText(1200), widthText(5400), widthText(86_400)]).toEqual([
      '10 s',
      '20 min',
      '90 min',
      '24 h',
    ]);
  });
});
