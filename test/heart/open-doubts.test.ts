import { describe, expect, it } from 'vitest';
import { stillOpen } from '../../src/heart/open-doubts';
import { beatsOf } from '../../src/recording/beat';
import type { Doubt, DoubtKind, Mend } from '../../src/recording/doubt';

const RATE_HZ = 250;
const tickOf = (seconds: number) => Math.round(seconds * 64 * RATE_HZ);
const beatAtS = (seconds: number) =>
  ({ tick: tickOf(seconds), beatClass: 'N', origin: 'detected' }) as const;
const beats = beatsOf([1, 2, 3, 4, 5].map(beatAtS));

function doubt(kind: DoubtKind, atS: number, mend: Mend | null = null): Doubt {
  const tick = tickOf(atS);
  const place = { fromS: atS, toS: atS, tick, lead: null };
  return { id: `${kind}-${tick}`, kind, ...place, why: 'Invented.', mend, effect: null };
}
const insertion = (atS: number): Mend => ({
  kind: 'beats',
  words: 'insert beat',
  removed: [],
  added: [{ ...beatAtS(atS), origin: 'added' }],
});

describe('a doubt that was settled', () => {
  it('is not asked again, nor is another reason to doubt the same beat', () => {
    const settled = [{ id: `early-beat-${tickOf(2)}`, ending: 'kept' as const, tick: tickOf(2) }];
    const all = [doubt('early-beat', 2), doubt('odd-shape', 2), doubt('odd-shape', 3)];
    expect(stillOpen(all, settled, beats, RATE_HZ)).toEqual([all[2]]);
  });

  it('of a beat taken away as too many is not turned into a beat that is missing there', () => {
    const settled = [
      { id: `extra-beat-${tickOf(2.5)}`, ending: 'mended' as const, tick: tickOf(2.5) },
    ];
    const [near, far] = [
      doubt('missed-beat', 3, insertion(2.52)),
      doubt('missed-beat', 5, insertion(4.5)),
    ];
    expect(stillOpen([near, far], settled, beats, RATE_HZ)).toEqual([far]);
  });

  it('of a stretch leaves the beats in it open', () => {
    const settled = [{ id: 'span-#1-beats-2', ending: 'kept' as const, tick: null }];
    const all = [doubt('odd-shape', 2)];
    expect(stillOpen(all, settled, beats, RATE_HZ)).toEqual(all);
  });
});
