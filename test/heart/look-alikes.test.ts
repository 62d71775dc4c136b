import { describe, expect, it } from 'vitest';
import { alikeTo, averageRow, LOOK_BEFORE_S } from '../../src/heart/look-alikes';
import { createRandom } from '../../src/numeric/random';
import type { Doubt } from '../../src/recording/doubt';
import { inventedHeart, nthOf, RATE_HZ } from './invented-doubts';

describe('the look-alikes of a doubted beat', () => {
  const heart = inventedHeart();
  const doubtOf = (index: number): Doubt => {
    const tick = heart.beats.ticks[index];
    const timeS = tick / 64 / RATE_HZ;
    const place = { fromS: timeS, toS: timeS, tick, lead: null };
    return { id: `${tick}`, kind: 'odd-shape', ...place, why: '', mend: null, effect: null };
  };
  const wide = [0, 1, 2].map((n) => doubtOf(nthOf(heart.beats, 'V', n)));
  const narrow = [0, 1, 2].map((n) => doubtOf(nthOf(heart.beats, 'N', 10 * n)));
  const input = { heartbeat: heart.heartbeat, rateHz: RATE_HZ, ticksPerSample: 64 };

  it('are the beats of its shape and none of another', () => {
    const found = alikeTo(input, wide[0], [...narrow, ...wide]);
    expect(found?.others.map(({ doubt }) => doubt.id).sort()).toEqual(
      [wide[1].id, wide[2].id].sort(),
    );
    for (const { likeness } of found?.others ?? []) expect(likeness).toBeGreaterThan(0.95);
  });

  it('are no noise, however steep and tall, and no beat of another size', () => {
    const noisy = { ...input, heartbeat: heart.heartbeat.slice() };
    const places = narrow.map(({ tick }) => Math.round((tick ?? 0) / 64));
    const random = createRandom(4);
    for (let i = -60; i <= 60; i += 1) noisy.heartbeat[places[1] + i] = 200 * random.gaussian();
    for (let i = -60; i <= 60; i += 1) noisy.heartbeat[places[2] + i] *= 0.3;
    expect(alikeTo(noisy, narrow[0], narrow)?.others).toEqual([]);
    expect(alikeTo(input, narrow[0], narrow)?.others).toHaveLength(2);
  });

  it('come with a second of heartbeat, the beat 0.4 s after its start', () => {
    const found = alikeTo(input, narrow[0], narrow);
    const row = found?.asked.heartbeatUv ?? new Float32Array(0);
    expect(row).toHaveLength(RATE_HZ);
    const average = averageRow(heart.detection.averages[0], RATE_HZ);
    for (const one of [row, average]) {
      const crest = one.indexOf(Math.max(...one.filter(Number.isFinite)));
      expect(Math.abs(crest - LOOK_BEFORE_S * RATE_HZ)).toBeLessThanOrEqual(1);
    }
  });

  it('of a missed beat are looked for where it would be put; without a place there are none', () => {
    const [asked, other] = narrow;
    const added = [{ tick: asked.tick ?? 0, beatClass: 'N', origin: 'added' }] as const;
    const mend = { kind: 'beats', words: 'insert beat', removed: [], added } as const;
    const gap: Doubt = { ...asked, kind: 'missed-beat', tick: other.tick, mend };
    const row = alikeTo(input, gap, [])?.asked.heartbeatUv;
    expect(row).toEqual(alikeTo(input, asked, [])?.asked.heartbeatUv);
    expect(alikeTo(input, { ...gap, mend: null }, [])).toBeNull();
  });
});
