import { describe, expect, test } from 'vitest';
import { DEFAULT_SETTINGS, type HeartRouteName, type Settings } from '../../src/recording/settings';
import { createSeparation, redrawSlowWave } from '../../src/separate/separation';
import { ALL_ROUTES } from './all-routes';

interface Asked {
  readonly rateHz: number;
  readonly settings?: Partial<Settings>;
  readonly block?: number;
  readonly wants?: { readonly slow: boolean; readonly heart: boolean };
}

function separate(signal: Float64Array, asked: Asked) {
  const separation = createSeparation({
    lead: '#1',
    rateHz: asked.rateHz,
    sampleCount: signal.length,
    settings: { ...DEFAULT_SETTINGS, ...asked.settings },
    routes: ALL_ROUTES,
    wants: asked.wants ?? { slow: true, heart: true },
  });
  const block = asked.block ?? 100_000;
  for (let at = 0; at < signal.length; at += block)
    separation.push(signal.subarray(at, at + block));
  return separation.finish();
}

function slowOf(signal: Float64Array, asked: Asked) {
  const { slow } = separate(signal, { wants: { slow: true, heart: false }, ...asked });
  if (!slow) throw new Error('a slow wave was asked for');
  return slow;
}

function heartOf(signal: Float64Array, asked: Asked) {
  const { heart } = separate(signal, { wants: { slow: false, heart: true }, ...asked });
  if (!heart) throw new Error('a heartbeat was asked for');
  return heart;
}

const signalOf = (seconds: number, rateHz: number, uvAt: (t: number) => number) =>
  Float64Array.from({ length: Math.round(seconds * rateHz) }, (_, i) => uvAt(i / rateHz));
const tone = (uv: number, hz: number) => (t: number) => uv * Math.sin(2 * Math.PI * hz * t);

/** Largest value in the middle of a signal, away from its ends. */
const middleSize = (x: ArrayLike<number>, share = 0.25) => {
  let size = 0;
  for (let i = Math.floor(share * x.length); i < (1 - share) * x.length; i += 1)
    size = Math.max(size, Math.abs(x[i]));
  return size;
};
/** The largest of some misses, for i from `from` to below `to`; NaN counts as infinite. */
function worst(from: number, to: number, missAt: (i: number) => number): number {
  let largest = 0;
  for (let i = from; i < to; i++) {
    const miss = missAt(i);
    largest = Number.isNaN(miss) ? Number.POSITIVE_INFINITY : Math.max(largest, miss);
  }
  return largest;
}

const both = (route: HeartRouteName) => ({
  slowRoute: route,
  heartRoute: route,
  slowGain: 'even' as const,
});
const EVEN = { slowGain: 'even' } as const;

/** Everything of a lead is kept, and nothing is known of the breathing. */
const PLAINLY = (slow: { readonly recorded: Float64Array }) => ({
  dfCpm: 3,
  kept: new Uint8Array(slow.recorded.length).fill(1),
  breathing: null,
  heartPart: null,
});

describe('the anti-aliased 4 Hz lead', () => {
  test.each([3.85, 4, 4.15, 7.9, 8.1, 12.05, 16])(
    'keeps nothing of %d Hz, which would fold onto 0-9 cpm: 60 dB down',
    (hz) => {
      const slow = slowOf(signalOf(120, 250, tone(1000, hz)), { rateHz: 250 });
      expect(middleSize(slow.recorded)).toBeLessThan(1);
    },
  );

  test('keeps nothing of a heartbeat from 48 a minute on: 60 dB down at 0.8 Hz', () => {
    const slow = slowOf(signalOf(120, 250, tone(1000, 0.8)), { rateHz: 250 });
    expect(middleSize(slow.recorded)).toBeLessThan(1);
  });

  test.each([0.0167, 0.05, 0.15, 0.25])('is flat within 0.1 %% at %d Hz', (hz) => {
    const slow = slowOf(signalOf(240, 250, tone(1000, hz)), { rateHz: 250 });
    expect(worst(240, 720, (i) => Math.abs(slow.recorded[i] - tone(1000, hz)(i / 4)))).toBeLessThan(
      1.001,
    );
  });

  test.each([
    [360, 4],
    [250, 4],
    [1000, 4],
    [512.5, 4],
    [9.7, 4],
    [4, 4],
    [3, 3],
    [1, 1],
  ])('of a lead of %d Hz has %d Hz and no delay', (rateHz, slowRateHz) => {
    const slow = slowOf(signalOf(400, rateHz, tone(100, 0.05)), { rateHz });
    expect(slow.rateHz).toBe(slowRateHz);
    expect(slow.recorded.length).toBe(400 * slowRateHz);
    for (let i = 100 * slowRateHz; i < 300 * slowRateHz; i++) {
      expect(Math.abs(slow.recorded[i] - tone(100, 0.05)(i / slowRateHz))).toBeLessThan(0.1);
      expect(Math.abs(slow.slowWave[i] - tone(100, 0.05)(i / slowRateHz))).toBeLessThan(0.7);
    }
  });
});

describe('route band', () => {
  test('leaves the slow wave and takes breathing, drift and offset away', () => {
    const lead = signalOf(
      900,
      50,
      (t) => 5000 + t + tone(100, 0.05)(t) + tone(200, 0.25)(t) + tone(500, 0.2 / 60)(t),
    );
    const { slowWave } = slowOf(lead, { rateHz: 50 });
    expect(worst(1200, 2400, (i) => Math.abs(slowWave[i] - tone(100, 0.05)(i / 4)))).toBeLessThan(
      2,
    );
  });

  test('has its edges 6 dB down at the band of the settings', () => {
    for (const cpm of [0.8, 10]) {
      const { slowWave } = slowOf(signalOf(3000, 10, tone(100, cpm / 60)), {
        rateHz: 10,
        settings: EVEN,
      });
      expect(middleSize(slowWave)).toBeGreaterThan(48);
      expect(middleSize(slowWave)).toBeLessThan(52);
    }
  });

  test('ends are filled without zeros, and beyond the shaded stretch they are right', () => {
    const long = signalOf(1500, 20, (t) => 3000 + tone(100, 0.05)(t) + tone(300, 0.004)(t));
    const whole = slowOf(long, { rateHz: 20 });
    const cut = slowOf(long.slice(0, 900 * 20), { rateHz: 20 });
    const shaded = cut.unclean.at(-1)?.fromS ?? 0;
    expect(shaded).toBeGreaterThan(820);
    const miss = (from: number, to: number) =>
      Math.max(
        ...cut.slowWave
          .subarray(from * 4, to * 4)
          .map((uv, i) => Math.abs(uv - whole.slowWave[from * 4 + i])),
      );
    expect(miss(300, shaded)).toBeLessThan(4);
    expect(miss(shaded, 900)).toBeLessThan(300);
  });

  test('passes a QRS-like band to the heartbeat and keeps slow wave, T drift and mains out', () => {
    for (const [hz, least, most] of [
      [0.05, 0, 0.1],
      [0.2, 0, 0.15],
      [1, 99, 101],
      [12, 99, 101],
      [30, 99, 101],
      [50, 0, 0.2],
    ]) {
      const { heartbeat } = heartOf(signalOf(120, 250, tone(100, hz)), { rateHz: 250 });
      expect(middleSize(heartbeat)).toBeGreaterThanOrEqual(least);
      expect(middleSize(heartbeat)).toBeLessThan(most);
    }
  });

  test.each([
    [200, 200, 1],
    [250, 250, 1],
    [360, 360, 1],
    [499, 499, 1],
    [500, 250, 2],
    [1000, 250, 4],
    [2048, 256, 8],
  ])('of %d Hz gives a heartbeat of %d Hz', (rateHz, heartHz, decimation) => {
    const lead = signalOf(30, rateHz, tone(100, 10));
    const heart = heartOf(lead, { rateHz });
    expect(heart).toMatchObject({ rateHz: heartHz, decimation });
    expect(heart.heartbeat.length).toBe(Math.ceil(lead.length / decimation));
    expect(
      worst(10 * heartHz, 20 * heartHz, (i) =>
        Math.abs(heart.heartbeat[i] - tone(100, 10)(i / heartHz)),
      ),
    ).toBeLessThan(0.5);
  });

  test('of a slow rate keeps what lies below half of it, or gives no heartbeat at all', () => {
    const heart = heartOf(signalOf(60, 50, tone(100, 9.3)), { rateHz: 50 });
    expect(middleSize(heart.heartbeat)).toBeGreaterThan(99);
    expect(separate(signalOf(600, 1, tone(100, 0.05)), { rateHz: 1 }).heart).toBeNull();
  });
});

describe.each(['band', 'fractional'] as const)('route %s', (route) => {
  const RATE_HZ = 500;
  const lead = signalOf(
    300,
    RATE_HZ,
    (t) => 700 + tone(100, 0.05)(t) + 200 * Math.exp(-0.5 * (((t % 0.8) - 0.4) / 0.01) ** 2),
  );
  const settings = both(route);
  const whole = separate(lead, { rateHz: RATE_HZ, settings });

  test('gives the same whatever the size of the blocks', () => {
    const pieces = separate(lead, { rateHz: RATE_HZ, settings, block: 777 });
    expect(pieces.slow?.slowWave).toEqual(whole.slow?.slowWave);
    expect(pieces.heart?.heartbeat).toEqual(whole.heart?.heartbeat);
  });

  test('gives the same one output at a time as both in one pass', () => {
    const heart = heartOf(lead, { rateHz: RATE_HZ, settings });
    const slow = slowOf(lead, { rateHz: RATE_HZ, settings });
    slow.slowWave.forEach((uv, i) => {
      expect(Math.abs(uv - (whole.slow?.slowWave[i] ?? 0))).toBeLessThan(1e-8);
    });
    heart.heartbeat.forEach((uv, i) => {
      expect(Math.abs(uv - (whole.heart?.heartbeat[i] ?? 0))).toBeLessThan(2e-5);
    });
  });

  test('is linear: the lead turned over gives the outputs turned over', () => {
    const turned = separate(
      lead.map((uv) => -uv),
      { rateHz: RATE_HZ, settings },
    );
    expect(turned.slow?.slowWave).toEqual(whole.slow?.slowWave.map((uv) => -uv));
    expect(turned.heart?.heartbeat).toEqual(whole.heart?.heartbeat.map((uv) => -uv));
  });

  test('does not feel an offset', () => {
    const moved = separate(
      lead.map((uv) => uv + 250_000),
      { rateHz: RATE_HZ, settings },
    );
    moved.slow?.slowWave.forEach((uv, i) => {
      expect(Math.abs(uv - (whole.slow?.slowWave[i] ?? 0))).toBeLessThan(1e-5);
    });
  });

  test('keeps a gap a gap, shades what it touches and leaves the rest alone', () => {
    const [from, to] = [150, 153];
    const torn = lead.map((uv, i) => (i >= from * RATE_HZ && i < to * RATE_HZ ? Number.NaN : uv));
    const { slow, heart } = separate(torn, { rateHz: RATE_HZ, settings });
    if (!slow || !heart) throw new Error('both outputs were asked for');
    const missing = (x: ArrayLike<number>, rateHz: number) =>
      Array.from(x).flatMap((value, i) => (Number.isNaN(value) ? [i / rateHz] : []));
    expect(missing(slow.recorded, 4)).toHaveLength(12);
    expect(missing(slow.slowWave, 4)).toEqual(missing(slow.recorded, 4));
    expect(missing(slow.slowWave, 4)[0]).toBe(from);
    expect(missing(heart.heartbeat, 250)).toHaveLength(750);
    expect(slow.unclean.some(({ fromS, toS }) => fromS < from && toS > to)).toBe(true);
    const end = heart.unclean.find(({ toS }) => toS > to)?.toS ?? 0;
    const at = Math.ceil((end + 5) * 250);
    expect(
      worst(at, at + 2000, (i) => Math.abs(heart.heartbeat[i] - (whole.heart?.heartbeat[i] ?? 0))),
    ).toBeLessThan(0.5);
  });

  test('makes no jump of an offset of 50 mV, at the ends or beside a gap', () => {
    const torn = lead.map((uv, i) =>
      i >= 100 * RATE_HZ && i < 130.2 * RATE_HZ ? Number.NaN : uv + 50_000,
    );
    const { slow, heart } = separate(torn, { rateHz: RATE_HZ, settings });
    const largest = (x: ArrayLike<number>) =>
      worst(0, x.length, (i) => (Number.isNaN(x[i]) ? 0 : Math.abs(x[i])));
    expect(largest(slow?.slowWave ?? [])).toBeLessThan(250);
    expect(largest(heart?.heartbeat ?? [])).toBeLessThan(600);
  });

  test('of a lead without a single sample gives nothing but gaps', () => {
    const { slow, heart } = separate(new Float64Array(60 * RATE_HZ).fill(Number.NaN), {
      rateHz: RATE_HZ,
      settings,
    });
    expect(slow?.slowWave.every(Number.isNaN)).toBe(true);
    expect(heart?.heartbeat.every(Number.isNaN)).toBe(true);
  });
});

describe('routes of their own for slow wave and heartbeat', () => {
  test('give what each gives alone', () => {
    const lead = signalOf(200, 250, (t) => tone(100, 0.05)(t) + tone(100, 8)(t));
    const mixed = separate(lead, {
      rateHz: 250,
      settings: { ...both('band'), heartRoute: 'fractional' },
    });
    const band = separate(lead, { rateHz: 250, settings: both('band') });
    expect(mixed.slow?.slowWave).toEqual(band.slow?.slowWave);
    expect(mixed.heart?.notes[0]).toMatch(/^Heartbeat by Savitzky-Golay/);
    expect(mixed.slow?.recorded).toEqual(band.slow?.recorded);
  });
});

describe('route fractional', () => {
  const RATE_HZ = 250;
  const lead = signalOf(400, RATE_HZ, tone(100, 0.05));
  const settings = both('fractional');
  const slow = slowOf(lead, { rateHz: RATE_HZ, settings });

  test('shows a 3 cpm wave in uV, 2.5 s early for order 0.5', () => {
    expect(slow.leadSAt(0.05)).toBeCloseTo(2.5, 1);
    const leadS = slow.leadSAt(0.05);
    expect(
      worst(600, 1200, (i) => Math.abs(slow.slowWave[i] - tone(100, 0.05)(i / 4 + leadS))),
    ).toBeLessThan(0.3);
  });

  test('tilts by 6 dB per octave and order: the response says by how much', () => {
    const power = slow.powerResponse ?? (() => Number.NaN);
    expect(power(0.05)).toBeCloseTo(1, 9);
    expect(power(0.1) / power(0.05)).toBeCloseTo(2, 1);
  });

  test('shifted back by its lead lies on the recorded wave', () => {
    const undoing = {
      ...DEFAULT_SETTINGS,
      ...settings,
      fractional: { ...DEFAULT_SETTINGS.fractional, undoLead: true },
    };
    const undone = redrawSlowWave(slow, undoing, PLAINLY(slow), ALL_ROUTES);
    expect(undone.leadSAt(0.05)).toBeCloseTo(0, 12);
    expect(
      worst(600, 1200, (i) => Math.abs(undone.slowWave[i] - tone(100, 0.05)(i / 4))),
    ).toBeLessThan(0.3);
    const back = redrawSlowWave(
      undone,
      { ...DEFAULT_SETTINGS, ...settings },
      PLAINLY(slow),
      ALL_ROUTES,
    );
    expect(back.slowWave).toEqual(slow.slowWave);
    expect(back.leadSAt(0.05)).toBe(slow.leadSAt(0.05));
  });

  test('states the truncation bound', () => {
    expect(slow.notes.join(' ')).toMatch(/60 s back can change it by at most 13\.0 %/);
  });

  test('refuses to be drawn again by another route', () => {
    expect(() => redrawSlowWave(slow, DEFAULT_SETTINGS, PLAINLY(slow), ALL_ROUTES)).toThrow(
      /route fractional/,
    );
  });
});

test('route band drawn again for a narrower band is what separation gives for it', () => {
  const lead = signalOf(400, 50, (t) => tone(100, 0.05)(t) + tone(100, 0.12)(t));
  const narrow = { ...DEFAULT_SETTINGS, slowBandCpm: [1.5, 5] as const };
  const slow = slowOf(lead, { rateHz: 50 });
  const redrawn = redrawSlowWave(slow, narrow, PLAINLY(slow), ALL_ROUTES);
  expect(redrawn.slowWave).toEqual(slowOf(lead, { rateHz: 50, settings: narrow }).slowWave);
});

test('a lead that is 0 throughout, as an unconnected one may be, is drawn as 0', () => {
  const slow = slowOf(new Float64Array(400 * 50), { rateHz: 50 });
  expect(middleSize(slow.slowWave, 0)).toBe(0);
});

test('route band draws the slow wave once, when it is first asked for', () => {
  const slow = slowOf(signalOf(400, 50, tone(100, 0.05)), { rateHz: 50 });
  slow.recorded.fill(0);
  expect(middleSize(slow.slowWave)).toBe(0);
  expect(slow.slowWave).toBe(slow.slowWave);
});
