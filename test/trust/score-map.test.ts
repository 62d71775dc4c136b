import { describe, expect, test } from 'vitest';
import { atOnce } from '../../src/numeric/in-steps';
import { createRandom } from '../../src/numeric/random';
import { MAP_ORDERS, MAP_WINDOWS_MS, type MapOrgan } from '../../src/recording/settings-map';
import { foldedLead } from '../../src/separate/route-responses';
import { drawnBy, type Mixture, mapOf, mixtureOf, TYPICAL, timeScorer } from './mapped';

/** White noise as strong as the known part, times `share`. */
function withNoise(mixture: Mixture, share: number): Mixture {
  const random = createRandom(3);
  const { target, lead } = mixture;
  const rms = Math.sqrt(target.reduce((sum, one) => sum + one * one, 0) / target.length);
  return { ...mixture, lead: lead.map((value) => value + share * rms * random.gaussian()) };
}

const MIXTURES: Readonly<Record<MapOrgan, Mixture>> = {
  slow: mixtureOf('slow', { ...TYPICAL, rateHz: 100, durationS: 600 }),
  heart: mixtureOf('heart', { ...TYPICAL, rateHz: 500, durationS: 160 }),
};
const CELLS: Readonly<Record<MapOrgan, readonly (readonly [order: number, window: number])[]>> = {
  slow: [0, 3, 8, 13, 20].flatMap((order) => [0, 9, 15, 19].map((w) => [order, w] as const)),
  heart: [0, 4, 8, 13, 20].flatMap((order) => [0, 3, 5, 9].map((w) => [order, w] as const)),
};

describe.each(['slow', 'heart'] as const)('a map of the %s side', (organ) => {
  test.each([0, 1])(
    'has in 20 cells the score of the route run in time, noise %d',
    (share) => {
      const mixture = withNoise(MIXTURES[organ], share);
      const { target, rateHz } = mixture;
      const known =
        organ === 'slow'
          ? target.filter((_, i) => i % (rateHz / 4) === 0)
          : atOnce(foldedLead('heart', target, rateHz)).samples;
      const score = timeScorer(organ, known, organ === 'slow' ? 4 : 250);
      const map = mapOf(organ, mixture);
      expect(CELLS[organ]).toHaveLength(20);
      for (const [order, window] of CELLS[organ]) {
        const run = drawnBy(organ, mixture, MAP_ORDERS[order], MAP_WINDOWS_MS[organ][window]);
        const apart = Math.abs(map[order][window].snrDb - score(run.drawn));
        expect(apart, `order ${order}, window ${window}`).toBeLessThan(0.1);
      }
    },
    60_000,
  );
});

describe('of a wave alone', () => {
  test('the best delay of every cell is the lead of its derivative', () => {
    const { target, rateHz } = MIXTURES.slow;
    const map = mapOf('slow', { lead: target, target, rateHz });
    MAP_ORDERS.forEach((order, a) => {
      if (order <= 0.9) expect(map[a][5].aheadS).toBeCloseTo(order / 4 / 0.05, 0);
    });
  });

  test('a delay between those that are tried costs nothing', () => {
    const { target, rateHz } = MIXTURES.slow;
    const later = target.map((_, i) => target[Math.max(0, i - 13)]);
    const { snrDb, aheadS } = mapOf('slow', { lead: later, target, rateHz })[0][0];
    expect(aheadS).toBeCloseTo(-0.13, 2);
    expect(snrDb).toBeGreaterThan(40);
  });

  test('without derivative and smoothing nothing is lost', () => {
    const { target, rateHz } = MIXTURES.slow;
    expect(mapOf('slow', { lead: target, target, rateHz })[0][0].snrDb).toBeGreaterThan(55);
  });
});

/** Places on the axes. */
const order = (value: number) => MAP_ORDERS.indexOf(value);
const slow = (windowMs: number) => MAP_WINDOWS_MS.slow.indexOf(windowMs);
const best = (scores: readonly { readonly snrDb: number }[]) =>
  Math.max(...scores.map(({ snrDb }) => snrDb));

/** What is said of such settings has no source; whether our maps agree is told in DEVELOPERS.md. */
describe('as common practice has it (no source)', () => {
  const typical = mapOf('slow', MIXTURES.slow);
  const still = mixtureOf('slow', { ...TYPICAL, rateHz: 100, durationS: 600, breathing: null });
  const withoutBreathing = mapOf('slow', still);

  test('a window of a second serves the slow wave as well as any, to 0.3 dB up to order 0.5', () => {
    for (const map of [typical, withoutBreathing])
      for (let a = 0; a <= order(0.5); a += 1)
        expect(best(map[a]) - map[a][slow(1000)].snrDb).toBeLessThan(0.3);
  });

  test('but so do shorter ones: the low-pass before 4 Hz has done their work', () => {
    for (const row of typical)
      expect(Math.abs(row[slow(1000)].snrDb - row[slow(100)].snrDb)).toBeLessThan(0.2);
    const beforeIt = mapOf('slow', MIXTURES.slow, 'heart');
    expect(beforeIt[0][slow(1000)].snrDb - beforeIt[0][slow(100)].snrDb).toBeGreaterThan(2);
    const half = beforeIt[order(0.5)];
    expect(half[slow(1000)].snrDb - half[slow(100)].snrDb).toBeGreaterThan(8);
  });

  test('the order matters little up to a half where no breathing lies beside the wave, and the score falls towards one', () => {
    const column = withoutBreathing.map((row) => row[slow(1000)]);
    const upToHalf = column.slice(0, order(0.5) + 1).map(({ snrDb }) => snrDb);
    expect(Math.max(...upToHalf) - Math.min(...upToHalf)).toBeLessThan(2.5);
    expect(best(column) - column[order(1)].snrDb).toBeGreaterThan(5);
  });

  test('but with breathing beside it each tenth of order costs a decibel, since a derivative lifts breathing', () => {
    const column = typical.map((row) => row[slow(1000)].snrDb);
    expect(column[order(0)] - column[order(0.5)]).toBeGreaterThan(4);
    for (let a = 1; a < column.length; a += 1) expect(column[a]).toBeLessThan(column[a - 1]);
  });

  test('smoothing brings the heartbeat nothing without added noise, and pays with white noise', () => {
    const plain = mapOf('heart', MIXTURES.heart);
    const noisy = mapOf('heart', withNoise(MIXTURES.heart, 1));
    const gains = (map: typeof plain) => map.map((row) => best(row) - row[0].snrDb);
    expect(Math.max(...gains(plain).slice(0, order(0.4) + 1))).toBeLessThan(1);
    expect(gains(noisy)[order(0.4)]).toBeGreaterThan(4);
  });
});
