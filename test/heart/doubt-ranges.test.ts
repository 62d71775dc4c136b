import { describe, expect, it } from 'vitest';
import { NO_BREATHING } from '../../src/heart/breathing';
import type { Decision, Undecided } from '../../src/heart/decisions';
import { heartDoubtRanges } from '../../src/heart/doubt-ranges';
import { heartFigures } from '../../src/heart/heart-figures';
import { rrSeries } from '../../src/heart/rr-series';
import { atOnce } from '../../src/numeric/in-steps';
import { type Beat, type BeatList, beatAt, changeBeats } from '../../src/recording/beat';
import { numberOf } from '../../src/recording/figure';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import type { Interval } from '../../src/recording/span';
import { beatsAfter, RATE_HZ } from './beats';
import { randomOf, sinusIntervals } from './rhythms';

const PART = { name: 'fed', fromS: 30, toS: 930 };
const BASE: readonly Interval[] = [{ fromS: 400, toS: 410 }];
const spec = { rateBpm: 66, breathingSwing: 0.06, breathsPerMinute: 15, noise: 0.01 };
const sinus = beatsAfter(sinusIntervals({ lengthS: 1000, ...spec }, randomOf(3)));

const wrongly = (beat: Beat, beatClass: Beat['beatClass']): Decision => ({
  removed: [beat],
  added: [{ ...beat, beatClass }],
  span: null,
});
const extra = (beat: Beat): Decision => ({ removed: [beat], added: [], span: null });
const missed = (beats: BeatList, after: number): Decision => ({
  removed: [],
  added: [
    {
      tick: Math.round((beats.ticks[after] + beats.ticks[after + 1]) / 2),
      beatClass: 'N',
      origin: 'added',
    },
  ],
  span: null,
});
const excluded = (fromS: number, toS: number): Decision => ({
  removed: [],
  added: [],
  span: { fromS, toS },
});

function undecidedOf(beats: BeatList, decisions: readonly Decision[]): Undecided {
  return {
    beats,
    rateHz: RATE_HZ,
    decisions,
    blockedWhen: (mended) => [...BASE, ...mended.flatMap((k) => decisions[k].span ?? [])],
  };
}

/** Every figure of every way of deciding, by the code that makes the printed ones. */
function everyWay({ beats, decisions, blockedWhen }: Undecided) {
  return Array.from({ length: 2 ** decisions.length }, (_, mask) => {
    const mended = decisions.flatMap((_, k) => (mask & (1 << k) ? [k] : []));
    const changed = changeBeats(
      beats,
      mended.flatMap((k) => decisions[k].removed),
      mended.flatMap((k) => decisions[k].added).sort((a, b) => a.tick - b.tick),
    );
    return figuresOf(changed, blockedWhen(mended));
  });
}

function figuresOf(beats: BeatList, blocked: readonly Interval[]) {
  return heartFigures({
    rr: rrSeries(beats, RATE_HZ, blocked),
    beats,
    rateHz: RATE_HZ,
    part: PART,
    blocked,
    settings: DEFAULT_SETTINGS,
    timingSdMs: 1,
    breathing: NO_BREATHING,
  }).figures;
}

function rangesOf(undecided: Undecided) {
  const { beats, blockedWhen } = undecided;
  const blocked = blockedWhen([]);
  const steps = heartDoubtRanges({
    undecided,
    rr: rrSeries(beats, RATE_HZ, blocked),
    part: PART,
    settings: DEFAULT_SETTINGS,
    figures: figuresOf(beats, blocked),
    timingSdMs: 1,
    breathing: NO_BREATHING,
    known: new Map(),
  });
  return atOnce(steps);
}

const extremes = (ways: ReturnType<typeof everyWay>, key: string) => {
  const values = ways.map((figures) => numberOf(figures[key])).filter((one) => !Number.isNaN(one));
  return { low: Math.min(...values), high: Math.max(...values) };
};

const RATIOS = ['heart_rate_bpm', 'nn_mean_ms', 'rmssd_ms', 'pnn50_pct'];
const OF_SEGMENTS = ['sdnn_ms', 'lf_ms2', 'hf_ms2', 'lf_hf_ratio', 'lf_nu_pct', 'hf_nu_pct'];

function expectExact(undecided: Undecided, keys: readonly string[]) {
  const ranges = rangesOf(undecided);
  const ways = everyWay(undecided);
  for (const key of keys) {
    const { low, high } = extremes(ways, key);
    expect(ranges[key].exact, key).toBe(true);
    expect(Math.abs(ranges[key].low / low - 1), `${key} lowest`).toBeLessThan(1e-9);
    expect(Math.abs(ranges[key].high / high - 1), `${key} highest`).toBeLessThan(1e-9);
    expect(ranges[key].high, key).toBeGreaterThan(ranges[key].low);
  }
  return ranges;
}

describe('what open doubts could do to the heart’s figures, against every one of 2^k ways to decide them', () => {
  it('is exact for doubts far apart', () => {
    const decisions = [
      wrongly(beatAt(sinus, 60), 'V'),
      missed(sinus, 150),
      extra(beatAt(sinus, 300)),
      missed(sinus, 500),
      wrongly(beatAt(sinus, 700), 'S'),
      extra(beatAt(sinus, 800)),
      missed(sinus, 801 + 60),
    ];
    const ranges = expectExact(undecidedOf(sinus, decisions), [...RATIOS, ...OF_SEGMENTS]);
    expect(ranges.rmssd_ms.doubts).toBe(decisions.length);
  });

  it('is exact for the ratios of sums where doubts lie side by side, under a stretch, at the ends and beside a span', () => {
    const decisions = [
      wrongly(beatAt(sinus, 35), 'V'),
      missed(sinus, 200),
      extra(beatAt(sinus, 201)),
      wrongly(beatAt(sinus, 202), 'V'),
      missed(sinus, 203),
      extra(beatAt(sinus, 205)),
      excluded(180.2, 188.7),
      missed(sinus, 430),
      extra(beatAt(sinus, 1018)),
    ];
    expectExact(undecidedOf(sinus, decisions), RATIOS);
  });

  it('holds all that LF, HF and SDNN can be where a doubt reaches two segments, and does not call it exact', () => {
    const border = sinus.ticks.findIndex((tick) => tick / 64 / RATE_HZ > 330);
    const undecided = undecidedOf(sinus, [
      missed(sinus, border - 2),
      extra(beatAt(sinus, border - 40)),
      missed(sinus, border + 50),
    ]);
    const ranges = rangesOf(undecided);
    const ways = everyWay(undecided);
    for (const key of OF_SEGMENTS) {
      const { low, high } = extremes(ways, key);
      expect(ranges[key].exact, key).toBe(false);
      expect(ranges[key].low, key).toBeLessThanOrEqual(low * (1 + 1e-9));
      expect(ranges[key].high, key).toBeGreaterThanOrEqual(high * (1 - 1e-9));
    }
  });

  it('adds up what each of many doubts of a segment does, and holds what they do together', () => {
    const places = [70, 95, 118, 150, 190, 221, 260];
    const undecided = undecidedOf(
      sinus,
      places.map((k) => (k % 2 ? missed(sinus, k) : extra(beatAt(sinus, k)))),
    );
    const ranges = rangesOf(undecided);
    const ways = everyWay(undecided);
    for (const key of ['sdnn_ms', 'lf_ms2', 'hf_ms2']) {
      const { low, high } = extremes(ways, key);
      expect(ranges[key].exact, key).toBe(false);
      expect(ranges[key].low, key).toBeLessThanOrEqual(low * 1.001);
      expect(ranges[key].high, key).toBeGreaterThanOrEqual(high * 0.999);
    }
  });

  it('holds RMSSD where a decision turns a segment irregular and takes all of it out, and does not call it exact', () => {
    const swaying = sinusIntervals({ lengthS: 330, ...spec, breathingSwing: 0.12 }, randomOf(5));
    const calm = sinusIntervals({ lengthS: 700, ...spec, breathingSwing: 0.02 }, randomOf(6));
    const plain = beatsAfter([...swaying, ...calm]);
    const [first, end] = [30, 330].map((s) =>
      plain.ticks.findIndex((tick) => tick / 64 / RATE_HZ > s),
    );
    // A tenth of the intervals end in a V beat: one more and the segment is no normal rhythm with a few.
    const most = Math.floor(0.1 * (end - first - 1));
    const odd = Array.from({ length: most }, (_, k) => beatAt(plain, first + 9 * k + 5));
    const beats = changeBeats(
      plain,
      odd,
      odd.map((beat): Beat => ({ ...beat, beatClass: 'V' })),
    );
    const undecided = undecidedOf(beats, [
      wrongly(beatAt(beats, first + 2), 'V'),
      missed(beats, end + 60),
    ]);
    const ranges = rangesOf(undecided);
    const { low, high } = extremes(everyWay(undecided), 'rmssd_ms');
    const now = numberOf(figuresOf(beats, BASE).rmssd_ms);
    expect(low).toBeLessThan(0.8 * now);
    expect(ranges.rmssd_ms.exact).toBe(false);
    expect(ranges.rmssd_ms.low).toBeLessThanOrEqual(low * (1 + 1e-9));
    expect(ranges.rmssd_ms.high).toBeGreaterThanOrEqual(high * (1 - 1e-9));
  });

  it('is nothing where no doubt is open in the part', () => {
    expect(rangesOf(undecidedOf(sinus, []))).toEqual({});
    const late = sinus.ticks.findIndex((tick) => tick / 64 / RATE_HZ > 960);
    expect(rangesOf(undecidedOf(sinus, [missed(sinus, late)]))).toEqual({});
  });
});
