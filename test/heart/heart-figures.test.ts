import { describe, expect, it } from 'vitest';
import { NO_BREATHING } from '../../src/heart/breathing';
import { heartFigures, withheldHeartFigures } from '../../src/heart/heart-figures';
import { rrSeries } from '../../src/heart/rr-series';
import { timeDomain } from '../../src/heart/variability';
import { type BeatList, NO_BEATS } from '../../src/recording/beat';
import type { FigureValue } from '../../src/recording/figure';
import { FIGURES } from '../../src/recording/figure-catalogue';
import type { BreathingSeries } from '../../src/recording/heart-series';
import { DEFAULT_SETTINGS, type Settings } from '../../src/recording/settings';
import type { Interval } from '../../src/recording/span';
import { beatsAfter, RATE_HZ, steadyBreathing } from './beats';
import { randomIntervals, randomOf, sinusIntervals } from './rhythms';

interface Asked {
  readonly beats: BeatList;
  readonly fromS?: number;
  readonly toS: number;
  readonly blocked?: readonly Interval[];
  readonly breathing?: BreathingSeries;
  readonly settings?: Settings;
  readonly timingSdMs?: number;
}

function figuresOf(asked: Asked) {
  const { beats, fromS = 0, toS, blocked = [], settings = DEFAULT_SETTINGS } = asked;
  return heartFigures({
    rr: rrSeries(beats, RATE_HZ, blocked),
    beats,
    rateHz: RATE_HZ,
    part: { name: 'fasting', fromS, toS },
    blocked,
    settings,
    timingSdMs: asked.timingSdMs ?? 1,
    breathing: asked.breathing ?? steadyBreathing(15, toS),
  });
}

const sinus = (lengthS: number, seed = 1) =>
  sinusIntervals(
    { lengthS, rateBpm: 66, breathingSwing: 0.06, breathsPerMinute: 15, noise: 0.01 },
    randomOf(seed),
  );

const reason = (figure: FigureValue): string =>
  figure.kind === 'withheld' ? figure.reason : `not withheld: ${JSON.stringify(figure)}`;
const number = (figure: FigureValue) => {
  if (figure.kind !== 'number') throw new Error(`no number: ${JSON.stringify(figure)}`);
  return figure;
};

describe('figures of a phase', () => {
  const thirty = figuresOf({ beats: beatsAfter(sinus(1810)), toS: 1800 });

  it('are there for every key of heart and breathing but movement, each a number or a reason', () => {
    const wanted = FIGURES.filter((one) => one.organ !== 'stomach' && one.key !== 'movement_pct');
    expect(Object.keys(thirty.figures).sort()).toEqual(wanted.map((one) => one.key).sort());
    for (const [key, figure] of Object.entries(thirty.figures)) {
      if (figure.kind === 'withheld') expect(figure.reason.length, key).toBeGreaterThan(5);
      else expect(Number.isFinite(number(figure).value), key).toBe(true);
    }
  });

  it('say what they stand on', () => {
    expect(number(thirty.figures.heart_rate_bpm).basis).toMatch(/^19\d\d NN$/);
    expect(number(thirty.figures.rmssd_ms).basis).toMatch(/^\d+ pairs$/);
    expect(number(thirty.figures.sdnn_ms).basis).toBe('6 of 6 segments');
    expect(number(thirty.figures.sdnn_whole_ms).basis).toMatch(/ NN, 30\.0 min$/);
    expect(number(thirty.figures.sd2_ms).basis).toBe(number(thirty.figures.sdnn_whole_ms).basis);
    expect(number(thirty.figures.triangular_index).basis).toMatch(/ NN, 30\.0 min$/);
    expect(number(thirty.figures.heart_kept_min).value).toBe(30);
    expect(thirty.keptS).toBe(1800);
    expect(thirty.adequacy).toBe('enough');
  });

  it('lay six segments of 5 min from the start of the phase and average them', () => {
    expect(thirty.segments.map((one) => [one.fromS, one.toS, one.state])).toEqual(
      [0, 300, 600, 900, 1200, 1500].map((at) => [at, at + 300, 'used']),
    );
    const mean = (values: readonly (number | null)[]) =>
      values.reduce<number>((sum, one) => sum + (one ?? Number.NaN), 0) / values.length;
    const { figures, segments } = thirty;
    expect(number(figures.sdnn_ms).value).toBeCloseTo(mean(segments.map((s) => s.sdnnMs)), 9);
    expect(number(figures.lf_ms2).value).toBeCloseTo(mean(segments.map((s) => s.lfMs2)), 9);
    expect(number(figures.lf_hf_ratio).value).toBeCloseTo(
      number(figures.lf_ms2).value / number(figures.hf_ms2).value,
      9,
    );
  });

  it('find the power that was put in: 0.03 of 909 ms at 0.1 Hz is 372 ms2', () => {
    const put = (0.03 * (60000 / 66)) ** 2 / 2;
    expect(number(thirty.figures.lf_ms2).value / put).toBeGreaterThan(0.85);
    expect(number(thirty.figures.lf_ms2).value / put).toBeLessThan(1.25);
    expect(number(thirty.figures.lf_welch_ms2).value / put).toBeGreaterThan(0.85);
    expect(number(thirty.figures.lf_welch_ms2).value / put).toBeLessThan(1.25);
  });

  it('mark that the stomach lies inside LF', () => {
    expect(number(thirty.figures.lf_ms2).marks).toContain('0.05 Hz of the stomach lies inside LF');
    expect(number(thirty.figures.hf_ms2).marks).toEqual([]);
  });

  it('do not show VLF from segments of 5 min, but from one of 20', () => {
    expect(reason(thirty.figures.vlf_ms2)).toBe(
      'VLF needs segments of 20 min; they are set to 5.0 min',
    );
    const settings = {
      ...DEFAULT_SETTINGS,
      variability: { ...DEFAULT_SETTINGS.variability, segmentS: 1200 },
    };
    const long = figuresOf({ beats: beatsAfter(sinus(1810)), toS: 1800, settings });
    expect(number(long.figures.vlf_ms2).value).toBeGreaterThan(50);
  });

  it('count beats by class in the phase alone', () => {
    const beats = beatsAfter(new Float64Array(100).fill(1000), 0.5, 'NNNVNNNSNNFNQ');
    const { figures } = figuresOf({ beats, fromS: 2, toS: 50 });
    expect(number(figures.beats).value).toBe(48);
    expect(number(figures.ectopic_beats).value).toBe(3);
    expect(number(figures.nn_share_pct).value).toBeCloseTo((100 * 39) / 47, 9);
  });
});

describe('marks of breathing', () => {
  const at = (perMinute: number) =>
    figuresOf({
      beats: beatsAfter(sinus(610)),
      toS: 600,
      breathing: steadyBreathing(perMinute, 600),
    }).figures;

  it('stand beside LF/HF below 9 a minute, beside HF above 24', () => {
    expect(number(at(8.9).lf_hf_ratio).marks).toContain('breathing below 9 a minute');
    expect(number(at(9.1).lf_hf_ratio).marks).not.toContain('breathing below 9 a minute');
    expect(number(at(24.1).hf_ms2).marks).toContain('breathing above 24 a minute');
    expect(number(at(23.9).hf_ms2).marks).toEqual([]);
  });

  it('are told from the windows centred in the phase, derived ones marked', () => {
    const breathing: BreathingSeries = { ...steadyBreathing(14, 600), from: 'derived' };
    breathing.perMinute.fill(Number.NaN, 0, 12);
    const { figures } = figuresOf({ beats: beatsAfter(sinus(610)), toS: 600, breathing });
    expect(number(figures.breathing_bpm)).toMatchObject({
      value: 14,
      basis: '7 of 19 windows',
      marks: ['derived from the heartbeat', 'told in under half of the windows'],
    });
    breathing.perMinute.fill(Number.NaN);
    expect(
      reason(
        figuresOf({ beats: beatsAfter(sinus(610)), toS: 600, breathing }).figures.breathing_bpm,
      ),
    ).toBe('no clear breathing rhythm in this part');
  });
});

describe('figures withheld, with the reason', () => {
  it('LF under 2 min and HF under 1 min', () => {
    const short = figuresOf({ beats: beatsAfter(sinus(100)), toS: 84 }).figures;
    expect(reason(short.lf_ms2)).toBe('LF needs 2 min; 1.4 min are left');
    expect(reason(short.lf_hf_ratio)).toBe('LF needs 2 min; 1.4 min are left');
    expect(number(short.hf_ms2).basis).toBe('1 of 1 segment of 1.4 min');
    const shorter = figuresOf({ beats: beatsAfter(sinus(100)), toS: 54 }).figures;
    expect(reason(shorter.hf_ms2)).toBe('HF needs 1 min; 0.9 min are left');
    expect(number(shorter.rmssd_ms).value).toBeGreaterThan(0);
    expect(reason(shorter.sdnn_ms)).toBe('SDNN needs a segment of 5.0 min; the part has 0.9 min');
  });

  it('a segment under 90 % NN, by beats without worth or by a spoiled stretch', () => {
    const rr = sinus(910);
    const letters = [...rr.keys()].map((i) => (i < 330 && i % 15 === 7 ? 'V' : 'N')).join('');
    const blocked = [{ fromS: 640, toS: 680 }];
    const found = figuresOf({ beats: beatsAfter(rr, 0, letters), toS: 900, blocked });
    expect(found.segments.map((one) => one.state)).toEqual(['too-few-nn', 'used', 'too-few-nn']);
    expect(found.segments[2].nnShare).toBeCloseTo(0.86, 1);
    expect(number(found.figures.lf_ms2).basis).toBe('1 of 3 segments');
    const none = figuresOf({ beats: beatsAfter(rr, 0, letters), toS: 300, blocked: [] });
    expect(reason(none.figures.lf_ms2)).toBe('no segment carries it: 1 of 1 under 90 % NN');
    expect(number(none.figures.heart_rate_bpm).value).toBeGreaterThan(50);
  });

  it('an irregular segment, from every figure of variability but not from the heart rate', () => {
    const wild = randomIntervals({ lengthS: 305, rateBpm: 90, spread: 0.2 }, randomOf(4));
    const calm = sinus(610, 5);
    const beats = beatsAfter(Float64Array.of(...calm.subarray(0, 660), ...wild));
    const startS = calm.subarray(0, 660).reduce((sum, one) => sum + one / 1000, 0);
    const found = figuresOf({ beats, fromS: startS - 600, toS: startS + 300 });
    expect(found.segments.map((one) => one.state)).toEqual(['used', 'used', 'irregular']);
    expect(found.segments[2].lfMs2).toBeNull();
    const calmOnly = figuresOf({ beats, fromS: startS - 600, toS: startS });
    expect(number(found.figures.rmssd_ms).value).toBeCloseTo(
      number(calmOnly.figures.rmssd_ms).value,
      1,
    );
    expect(number(found.figures.rmssd_ms).marks).toEqual(['1 of 3 segments irregular, left out']);
    expect(number(found.figures.heart_rate_bpm).value).toBeGreaterThan(
      number(calmOnly.figures.heart_rate_bpm).value + 3,
    );
    const alone = figuresOf({ beats, fromS: startS + 1, toS: startS + 301 }).figures;
    expect(reason(alone.rmssd_ms)).toBe('the rhythm is irregular in 1 of 1 segment');
    expect(reason(alone.lf_hf_ratio)).toBe('the rhythm is irregular in 1 of 1 segment');
    expect(reason(alone.sdnn_ms)).toBe('the rhythm is irregular in 1 of 1 segment');
    expect(number(alone.heart_rate_bpm).value).toBeGreaterThan(80);
  });

  it('a segment in which more than one beat in ten is early, whatever its class', () => {
    const rr = sinus(310);
    const states = ['S', 'V', 'F'].map((letter) => {
      const letters = [...rr.keys()].map((i) => (i % 9 === 7 ? letter : 'N')).join('');
      return figuresOf({ beats: beatsAfter(rr, 0, letters), toS: 300 }).segments[0].state;
    });
    expect(states).toEqual(['irregular', 'irregular', 'irregular']);
    const few = [...rr.keys()].map((i) => (i % 15 === 7 ? 'V' : 'N')).join('');
    expect(figuresOf({ beats: beatsAfter(rr, 0, few), toS: 300 }).segments[0].state).toBe(
      'too-few-nn',
    );
  });

  it('percentages where over half of the phase is lost', () => {
    const beats = beatsAfter(sinus(1210));
    const blocked = [{ fromS: 500, toS: 1150 }];
    const found = figuresOf({ beats, toS: 1200, blocked });
    expect(found.adequacy).toBe('not-reportable');
    expect(reason(found.figures.pnn50_pct)).toBe('over half of the part is lost: no percentage');
    expect(reason(found.figures.lf_nu_pct)).toBe('over half of the part is lost: no percentage');
    expect(number(found.figures.rmssd_ms).value).toBeGreaterThan(0);
  });

  it('the triangular index under 20 min', () => {
    const found = figuresOf({ beats: beatsAfter(sinus(1210)), toS: 1140 });
    expect(reason(found.figures.triangular_index)).toBe(
      'the triangular index needs 20 min; 19.0 min are left',
    );
  });

  it('everything but counts where there is no beat', () => {
    const { figures } = figuresOf({ beats: NO_BEATS, toS: 600, breathing: NO_BREATHING });
    expect(reason(figures.heart_rate_bpm)).toBe('no two beats in this part');
    expect(reason(figures.lf_ms2)).toBe('no two beats in this part');
    expect(reason(figures.breathing_bpm)).toBe('no breathing lead, and no beats to derive it from');
    expect(number(figures.beats).value).toBe(0);
  });

  it('the floors where the error of the R times is not known', () => {
    const unknown = figuresOf({ beats: beatsAfter(sinus(610)), toS: 600, timingSdMs: Number.NaN });
    expect(reason(unknown.figures.rmssd_floor_ms)).toBe('the error of the R times is not known');
    const known = figuresOf({ beats: beatsAfter(sinus(610)), toS: 600, timingSdMs: 2 });
    expect(number(known.figures.rmssd_floor_ms).value).toBeCloseTo(2 * Math.sqrt(6), 9);
    expect(number(known.figures.hf_floor_ms2).value).toBeGreaterThan(1);
  });

  it('all of them for one reason where no heartbeat can be read', () => {
    const figures = withheldHeartFigures('no heartbeat can be read in this recording');
    expect(Object.keys(figures)).toHaveLength(
      FIGURES.filter((one) => one.organ === 'heart').length,
    );
    for (const figure of Object.values(figures))
      expect(reason(figure)).toBe('no heartbeat can be read in this recording');
  });
});

describe('an edited beat', () => {
  it('changes RMSSD to the value computed by hand', () => {
    const rr = [800, 810, 790, 860, 800, 805];
    const before = figuresOf({ beats: beatsAfter(rr), toS: 10 }).figures;
    expect(number(before.rmssd_ms).value).toBeCloseTo(42.485, 3);
    const merged = [800, 1600, 860, 800, 805];
    const after = figuresOf({ beats: beatsAfter(merged), toS: 10 }).figures;
    const byHand = Math.sqrt((800 ** 2 + 740 ** 2 + 60 ** 2 + 5 ** 2) / 4);
    expect(number(after.rmssd_ms).value).toBeCloseTo(byHand, 6);
  });

  it('gives the same figures when the phase is asked for again or as part of a larger set', () => {
    const beats = beatsAfter(sinus(1810));
    const rr = rrSeries(beats, RATE_HZ, []);
    const ask = (fromS: number, toS: number) =>
      heartFigures({
        rr,
        beats,
        rateHz: RATE_HZ,
        part: { name: 'fed', fromS, toS },
        blocked: [],
        settings: DEFAULT_SETTINGS,
        timingSdMs: 1,
        breathing: NO_BREATHING,
      });
    const whole = ask(0, 1800);
    expect(ask(0, 900).segments).toEqual(whole.segments.slice(0, 3));
    expect(ask(0, 1800)).toEqual(whole);
    const fresh = rrSeries(beats, RATE_HZ, []);
    expect(timeDomain(fresh.rrMs, fresh.nn)).toEqual(timeDomain(rr.rrMs, rr.nn));
  });
});

describe('a segment that is held', () => {
  it('is worked out anew when a beat in it, or only its class, changes', () => {
    const rr = sinus(900);
    const lf = (beats: BeatList) => figuresOf({ beats, toS: 900 }).segments.map((s) => s.lfMs2);
    const before = lf(beatsAfter(rr));
    const moved = Float64Array.from(rr);
    moved[450] += 100;
    moved[451] -= 100;
    const after = lf(beatsAfter(moved));
    expect([after[0], after[2]]).toEqual([before[0], before[2]]);
    expect(after[1]).not.toBe(before[1]);
    const classed = lf(beatsAfter(rr, 0, `${'N'.repeat(450)}V`));
    expect(classed[1]).not.toBe(before[1]);
    const early = lf(beatsAfter(rr, 0, `${'N'.repeat(450)}S`));
    expect(early[1]).not.toBe(before[1]);
    expect(lf(beatsAfter(rr))).toEqual(before);
    const inserted = Float64Array.of(
      ...rr.subarray(0, 10),
      rr[10] / 2,
      rr[10] / 2,
      ...rr.subarray(11),
    );
    expect(lf(beatsAfter(inserted)).slice(1)).toEqual(before.slice(1));
  });
});

describe('speed', () => {
  it('of all phases of an hour, of a day of beats and of an edit in it lets an edit be felt at once', () => {
    const timed = (beats: BeatList, parts: readonly (readonly [number, number])[]) => {
      const breathing = steadyBreathing(15, parts.at(-1)?.[1] ?? 0);
      const begin = process.cpuUsage();
      const rr = rrSeries(beats, RATE_HZ, []);
      for (const [fromS, toS] of parts)
        heartFigures({
          rr,
          beats,
          rateHz: RATE_HZ,
          part: { name: 'fed', fromS, toS },
          blocked: [],
          settings: DEFAULT_SETTINGS,
          timingSdMs: 1,
          breathing,
        });
      return process.cpuUsage(begin).user / 1000;
    };
    const parts = [
      [0, 1200],
      [1200, 1500],
      [1600, 3400],
      [1600, 3600],
    ] as const;
    const hours = [2, 3, 4, 5].map((seed) => timed(beatsAfter(sinus(3610, seed)), parts));
    const intervals = sinus(90000);
    const days = [intervals, intervals.map((one) => one + 1)].map((rr) =>
      timed(beatsAfter(rr), [[0, 90000]]),
    );
    intervals[5000] += 50;
    intervals[5001] -= 50;
    const editMs = timed(beatsAfter(intervals.map((one) => one + 1)), [[0, 90000]]);
    const [hourMs, dayMs] = [Math.min(...hours), Math.min(...days)];
    console.info(
      `heart figures: 1 h ${hourMs.toFixed(1)} ms, ${intervals.length} beats ${dayMs.toFixed(0)} ms, then an edit ${editMs.toFixed(0)} ms of processor time`,
    );
    expect(hourMs).toBeLessThan(120);
    expect(dayMs).toBeLessThan(2000);
    expect(editMs).toBeLessThan(dayMs / 2);
  }, 30000);
});
