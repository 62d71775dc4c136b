import { describe, expect, it } from 'vitest';
import { wavesWords } from '../../src/report/picture-words';
import {
  niceBar,
  reachOf,
  type WaveExcerpt,
  wavesPicture,
} from '../../src/report/pictures/waves-picture';

/** A 3 cpm sine of 100 uV over four minutes at 4 Hz, with a jump of 5 mV from 60 to 62 s where asked for. */
function excerpt(name: string, jump = false): WaveExcerpt {
  const timesS = Array.from({ length: 960 }, (_, i) => i / 4);
  const uv = timesS.map((time) =>
    jump && time >= 60 && time < 62 ? 5000 : 100 * Math.sin(0.1 * Math.PI * time),
  );
  return { name, fromS: 0, toS: 240, signal: { timesS, low: uv, high: uv } };
}

describe('the slow wave on paper', () => {
  it('the bar is a round number no taller than half the plot', () => {
    expect([3, 49, 50, 180].map(niceBar)).toEqual([2, 20, 50, 100]);
    expect(wavesPicture([excerpt('fed')], [])).toContain('100 µV');
  });

  it('the reach leaves a steady wave whole', () => {
    const reach = reachOf([excerpt('fasting'), excerpt('fed')], []);
    expect(reach).toBeGreaterThan(100);
    expect(reach).toBeLessThan(130);
  });

  it('neither a spoiled stretch nor one jump flattens the wave', () => {
    expect(reachOf([excerpt('fed', true)], [{ fromS: 59, toS: 63 }])).toBeLessThan(130);
    expect(reachOf([excerpt('fed', true)], [])).toBeLessThan(130);
  });

  it('what is spoiled inside a stretch is hatched there, and only there', () => {
    const clean = wavesPicture([excerpt('fed')], [{ fromS: 500, toS: 600 }]);
    const spoiled = wavesPicture([excerpt('fed')], [{ fromS: 100, toS: 120 }]);
    expect(clean).not.toContain('fill="#ffffff"');
    expect(spoiled).toContain('fill="#ffffff"');
  });

  it('those who do not see it hear which minutes and how tall', () => {
    expect(wavesWords([excerpt('fasting')])).toBe(
      'Slow wave. fasting, 0:00:00 to 0:04:00: between -100 and 100 µV.',
    );
  });
});
