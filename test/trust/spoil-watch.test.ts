import { describe, expect, it } from 'vitest';
import { createRandom } from '../../src/numeric/random';
import { coveredSeconds } from '../../src/recording/span';
import type { ProposedSpan } from '../../src/trust/proposed-span';
import { createSpoilWatch } from '../../src/trust/spoil-watch';
import {
  type Abdomen,
  abdomen,
  digitised,
  flat,
  gap,
  heave,
  jump,
  moving,
  muscle,
  QUIET,
  rail,
  type Spoiled,
  spoil,
} from './abdomen';

const RAILS = [-16000, 16000] as const;

function watched(
  x: Float64Array,
  rateHz: number,
  stepUv: number,
  block = 10000,
): readonly ProposedSpan[] {
  const watch = createSpoilWatch({ lead: '#1', rateHz, railsUv: RAILS, stepUv });
  for (let from = 0; from < x.length; from += block) watch.push(x.subarray(from, from + block));
  return watch.finish();
}

const told = (spans: readonly ProposedSpan[]): string[] =>
  spans.map((one) => `${one.cause} ${one.target} ${one.fromS.toFixed(1)}-${one.toS.toFixed(1)}`);

const actingOn = (spans: readonly ProposedSpan[], organ: 'stomach' | 'heart') =>
  spans.filter((one) => one.target === 'both' || one.target === organ);

/** Seconds of a spoiled stretch that the proposals for an organ cover, over its length. */
const shareFound = (spans: readonly ProposedSpan[], organ: 'stomach' | 'heart', at: Spoiled) =>
  coveredSeconds(actingOn(spans, organ), at.fromS, at.toS) / (at.toS - at.fromS);

describe('a clean recording', () => {
  const cases: Readonly<Record<string, Partial<Abdomen>>> = {
    'as usual': {},
    'with another seed': { seed: 2 },
    'with R of 1.5 mV': { qrsUv: 1500 },
    'with R of 30 uV': { qrsUv: 30 },
    'with a slow wave of 500 uV that grows 2.5 times after the meal': {
      slowUv: 500,
      fedFactor: 2.5,
    },
    'with a slow wave of 30 uV under breathing of 100 uV': { slowUv: 30, breathUv: 100 },
    'in steps of 5 uV': { stepUv: 5 },
    'quiet, in steps of 1 uV': { muscleUv: 0.3, stepUv: 1, qrsUv: 30 },
    'under muscle of 30 uV': { muscleUv: 30 },
    'whose electrodes settle by 10 mV': { driftUv: 10000 },
    'at 1 kHz': { rateHz: 1000, lengthS: 900 },
    'at 4 Hz': { rateHz: 4, qrsUv: 0 },
    'at 4 Hz in steps of 20 uV': { rateHz: 4, qrsUv: 0, stepUv: 20, muscleUv: 0.1 },
    'at 20 Hz': { rateHz: 20, qrsUv: 0 },
  };

  it.each(Object.entries(cases))('%s has nothing spoiled', (_, change) => {
    const made = { ...QUIET, lengthS: 1800, ...change };
    const spans = watched(digitised(abdomen(made), made.stepUv), made.rateHz, made.stepUv);
    expect(told(spans)).toEqual([]);
  });
});

describe('a spoiled recording', () => {
  const clean = abdomen(QUIET);
  const how = [
    muscle(200, 8, 80),
    muscle(400, 30, 100),
    heave(500, 20, 800),
    heave(600, 12, 1500),
    heave(700, 40, 3000),
    moving(800, 15, 1500),
    moving(900, 60, 3000),
    jump(1100, 5000, 10),
    jump(1300, -3000, 60),
    jump(1600, 2000, Number.POSITIVE_INFINITY),
    jump(1700, 800, 4),
    flat(1800, 3),
    flat(1850, 60),
    gap(2000, 0.5),
    gap(2050, 90),
    rail(2200, 1),
    rail(2300, 45),
    moving(2500, 5, 1000),
    moving(2600, 400, 2000),
    muscle(3200, 200, 60),
  ];
  const { x, spoiled } = spoil(clean, QUIET.rateHz, 9, how);
  const spans = watched(digitised(x, QUIET.stepUv), QUIET.rateHz, QUIET.stepUv);

  it('has nearly every spoiled second found for the heart', () => {
    for (const at of spoiled.filter((one) => one.target !== 'stomach'))
      expect(shareFound(spans, 'heart', at), `${at.cause} at ${at.fromS}`).toBeGreaterThan(0.9);
  });

  it('has bursts found for the heart from their first to their last quarter of a second, and no more', () => {
    const heart = actingOn(spans, 'heart');
    for (const { fromS, toS, target } of spoiled) {
      if (target !== 'heart') continue;
      const meeting = heart.filter((one) => one.fromS < toS && one.toS > fromS);
      // A burst swells and fades within a tenth of its length, so that its very ends do no harm.
      const swellS = 0.1 * (toS - fromS);
      const first = Math.min(...meeting.map((one) => one.fromS));
      const last = Math.max(...meeting.map((one) => one.toS));
      expect(first, `from ${fromS}`).toBeGreaterThan(fromS - 0.3);
      expect(first, `from ${fromS}`).toBeLessThan(fromS + 0.25 + swellS);
      expect(last, `to ${toS}`).toBeLessThan(toS + 0.3);
      expect(last, `to ${toS}`).toBeGreaterThan(toS - 0.25 - swellS);
    }
  });

  it('has every movement, step and empty stretch found for the stomach', () => {
    for (const at of spoiled.filter((one) => one.target === 'both'))
      expect(shareFound(spans, 'stomach', at), `${at.cause} at ${at.fromS}`).toBeGreaterThan(0.95);
    for (const at of spoiled.filter((one) => one.target === 'stomach'))
      expect(shareFound(spans, 'stomach', at), `${at.cause} at ${at.fromS}`).toBeGreaterThan(0.3);
  });

  it('has four fifths or more of all spoiled seconds found for the stomach, nineteen twentieths for the heart', () => {
    for (const [organ, least] of [
      ['stomach', 0.8],
      ['heart', 0.95],
    ] as const) {
      const meant = spoiled.filter((one) => one.target === 'both' || one.target === organ);
      const total = meant.reduce((sum, one) => sum + one.toS - one.fromS, 0);
      const found = meant.reduce(
        (sum, one) => sum + shareFound(spans, organ, one) * (one.toS - one.fromS),
        0,
      );
      console.info(`${organ}: ${Math.round((100 * found) / total)} % of ${total} s found`);
      expect(found / total).toBeGreaterThan(least);
    }
  });

  it('loses under 20 s an hour of what is clean, to each organ', () => {
    for (const organ of ['stomach', 'heart'] as const) {
      const acting = actingOn(spans, organ);
      const isMeant = (one: Spoiled) =>
        one.target === 'both' || one.target === organ || one.cause === 'step';
      const meant = spoiled
        .filter(isMeant)
        .map(({ fromS, toS }) => ({ fromS: fromS - 2, toS: toS + 2 }));
      const lost =
        coveredSeconds(acting, 0, 3600) -
        coveredSeconds(
          acting.flatMap(({ fromS, toS }) =>
            meant.map((m) => ({
              fromS: Math.max(fromS, m.fromS),
              toS: Math.min(toS, m.toS),
            })),
          ),
          0,
          3600,
        );
      console.info(`${organ}: ${lost.toFixed(1)} clean seconds lost`);
      expect(lost).toBeLessThan(20);
    }
  });

  it('has each found under its own cause', () => {
    for (const at of spoiled) {
      const meeting = spans.filter((one) => one.fromS < at.toS - 0.2 && one.toS > at.fromS + 0.2);
      expect(
        meeting.map((one) => one.cause),
        `${at.cause} at ${at.fromS}`,
      ).toContain(at.cause);
    }
    for (const cause of ['flat', 'gap', 'rail'] as const)
      expect(spans.filter((one) => one.cause === cause)).toHaveLength(2);
  });

  it('spares the heart what only the stomach suffers from', () => {
    for (const at of spoiled.filter((one) => one.target === 'stomach' && one.cause === 'burst'))
      expect(shareFound(spans, 'heart', at), `${at.cause} at ${at.fromS}`).toBe(0);
    const settling = spoiled.filter((one) => one.cause === 'step' && one.toS - one.fromS > 20);
    for (const at of settling) expect(shareFound(spans, 'heart', at)).toBeLessThan(0.2);
  });

  it('has the heart spared for a jump itself alone, the stomach until it has settled', () => {
    const around = (fromS: number, toS: number, organ: 'stomach' | 'heart') =>
      coveredSeconds(actingOn(spans, organ), fromS, toS);
    expect(around(1099.9, 1100.1, 'heart')).toBeCloseTo(0.2, 6);
    expect(around(1099, 1102, 'heart')).toBeLessThan(1);
    expect(around(1100, 1130, 'stomach')).toBeGreaterThan(20);
    expect(around(1300, 1480, 'stomach')).toBeGreaterThan(70);
  });

  it('gives the same spans however the samples are cut, shifted by the time of the first', () => {
    const cut = watched(digitised(x, QUIET.stepUv), QUIET.rateHz, QUIET.stepUv, 777);
    expect(cut).toEqual(spans);
    const watch = createSpoilWatch({
      lead: '#1',
      rateHz: QUIET.rateHz,
      railsUv: RAILS,
      stepUv: QUIET.stepUv,
      startS: 100,
    });
    watch.push(digitised(x, QUIET.stepUv));
    expect(watch.finish()[0].fromS).toBeCloseTo(spans[0].fromS + 100, 9);
  });

  it('names the lead, the origin and a reason in each span', () => {
    for (const span of spans) {
      expect(span).toMatchObject({ lead: '#1', origin: 'proposed' });
      expect(span.note.length).toBeGreaterThan(5);
      expect(span.fromS).toBeGreaterThanOrEqual(0);
      expect(span.toS).toBeLessThanOrEqual(3600);
    }
  });

  it('is the same when the lead is turned over', () => {
    const turned = watched(
      digitised(x, QUIET.stepUv).map((value) => -value),
      QUIET.rateHz,
      QUIET.stepUv,
    );
    expect(told(turned)).toEqual(told(spans));
  });
});

describe('a weak heartbeat', () => {
  it('of 30 uV is spoiled by muscle of 15 uV, one of 1 mV is not', () => {
    const burst = (qrsUv: number) => {
      const made = { ...QUIET, lengthS: 900, qrsUv };
      const { x } = spoil(abdomen(made), made.rateHz, 3, [muscle(400, 10, 15)]);
      return told(watched(digitised(x, 0.2), made.rateHz, 0.2));
    };
    expect(burst(30)).toHaveLength(1);
    expect(burst(30)[0]).toMatch(/^burst heart/);
    expect(burst(1000)).toEqual([]);
  });
});

describe('muscle that sets in at once', () => {
  it('is spoiled from its first sample to its last, and at most a beat beside it', () => {
    const made = { ...QUIET, lengthS: 600 };
    const x = abdomen(made);
    const random = createRandom(12);
    for (const fromS of [100, 200.37, 300.71, 400.05])
      for (let i = Math.round(fromS * 250); i < (fromS + 6.3) * 250; i += 1)
        x[i] += 90 * random.gaussian();
    const heart = actingOn(watched(digitised(x, 0.2), 250, 0.2), 'heart');
    expect(heart).toHaveLength(4);
    [100, 200.37, 300.71, 400.05].forEach((fromS, k) => {
      expect(Math.abs(heart[k].fromS - fromS), `${k}`).toBeLessThan(0.41);
      expect(heart[k].fromS, `${k}`).toBeLessThan(fromS + 0.05);
      expect(Math.abs(heart[k].toS - fromS - 6.3), `${k}`).toBeLessThan(0.41);
      expect(heart[k].toS, `${k}`).toBeGreaterThan(fromS + 6.25);
    });
  });
});

describe('beats of another kind', () => {
  const made = { ...QUIET, lengthS: 900, qrsUv: 60, breathUv: 30 };

  /** The lead with bumps of the given heights (uV), 80 ms wide, at times of no pattern. */
  const withBumps = (heightsUv: readonly number[]) => {
    const x = abdomen(made);
    heightsUv.forEach((heightUv, k) => {
      const atS = 40 + 37.3 * k + 5 * Math.sin(7 * k);
      for (let i = Math.floor((atS - 0.3) * 250); i < (atS + 0.3) * 250; i += 1)
        x[i] += heightUv * Math.exp(-(((i / 250 - atS) / 0.04) ** 2));
    });
    return told(actingOn(watched(digitised(x, 0.2), 250, 0.2), 'heart'));
  };

  it('are no spoil, though eight times as high as the usual ones: they come again', () => {
    expect(withBumps(Array.from({ length: 20 }, (_, k) => 480 + 20 * (k % 4)))).toEqual([]);
  });

  it('are told from pops of all heights', () => {
    const heights = Array.from({ length: 8 }, (_, k) => 300 * 1.5 ** k);
    expect(withBumps(heights)).toHaveLength(8);
  });
});

describe('flat lines', () => {
  const made = { ...QUIET, lengthS: 300 };
  const clean = digitised(abdomen(made), made.stepUv);

  it('last over 2 s', () => {
    const held = (lengthS: number) => {
      const { x } = spoil(clean, made.rateHz, 1, [flat(100, lengthS)]);
      return watched(x, made.rateHz, made.stepUv).filter((one) => one.cause === 'flat');
    };
    expect(held(1.9)).toHaveLength(0);
    expect(told(held(2.1))).toEqual(['flat both 99.8-102.3']);
  });

  it('may move by one step, as an open input does', () => {
    const x = Float64Array.from(clean);
    for (let i = 100 * 250; i < 130 * 250; i += 1) x[i] = 40 + (i % 3 === 0 ? 0.2 : 0);
    const found = watched(x, 250, 0.2).filter((one) => one.cause === 'flat');
    expect(found).toHaveLength(1);
    expect(found[0].fromS).toBeCloseTo(100, 0);
    expect(found[0].toS).toBeCloseTo(130, 0);
  });

  it('from beginning to end are one span', () => {
    expect(told(watched(new Float64Array(25000), 250, 0.2))).toEqual(['flat both 0.0-100.0']);
  });
});

describe('an amplifier at its limit', () => {
  const made = { ...QUIET, lengthS: 900, driftUv: 0 };
  const { x, spoiled } = spoil(abdomen(made), made.rateHz, 9, [
    moving(300, 20, 9000),
    moving(600, 10, 9000),
  ]);
  const within = (uv: number) =>
    watched(digitised(x, 0.25, [-uv, uv]), 250, 0.25).filter((one) => one.cause === 'rail');

  it('of 5 mV is a rail though the digitiser reaches 16 mV', () => {
    const rails = within(5000);
    expect(rails.length).toBeGreaterThan(1);
    for (const { fromS, toS, target } of rails) {
      expect(target).toBe('both');
      expect(spoiled.some((one) => fromS > one.fromS - 1 && toS < one.toS + 1)).toBe(true);
    }
  });

  it('is none where the lead does not reach it', () => {
    expect(within(15000)).toEqual([]);
  });
});

describe('a lead with nothing in it', () => {
  it('has no span without samples, one gap where all are missing', () => {
    expect(watched(new Float64Array(0), 250, 0.2)).toEqual([]);
    expect(told(watched(new Float64Array(2500).fill(Number.NaN), 250, 0.2))).toEqual([
      'gap both 0.0-10.0',
    ]);
    expect(watched(Float64Array.of(1, 2), 250, 0.2)).toEqual([]);
  });

  it('of unknown ends and step has no rail and is still watched', () => {
    const made = { ...QUIET, lengthS: 600 };
    const { x } = spoil(abdomen(made), made.rateHz, 5, [moving(300, 20, 2000), flat(400, 5)]);
    const watch = createSpoilWatch({ lead: '#2~#3', rateHz: 250, railsUv: null, stepUv: 0 });
    watch.push(x);
    const causes = watch.finish().map((one) => one.cause);
    expect(causes.includes('burst') || causes.includes('step')).toBe(true);
    expect(causes).toContain('flat');
    expect(causes).not.toContain('rail');
  });
});

describe('speed', () => {
  it('watches a million samples in well under a second of processor time', () => {
    const made = { ...QUIET, lengthS: 600, rateHz: 1000 };
    const x = digitised(abdomen(made), made.stepUv);
    const before = process.cpuUsage();
    watched(x, 1000, made.stepUv);
    watched(x, 1000, made.stepUv);
    const { user } = process.cpuUsage(before);
    console.info(`${(user / 1000 / 1.2).toFixed(0)} ms of processor time a million samples`);
    expect(user / 1.2e6).toBeLessThan(0.6);
  });
});
