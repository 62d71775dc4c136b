import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { createSpoilWatch } from '../../src/trust/spoil-watch';
import { always, cutAt, cuts, numbers, times } from '../properties';
import { abdomen, flat, gap, heave, jump, moving, muscle, QUIET, rail, spoil } from './abdomen';

const MADE = { ...QUIET, lengthS: 900, rateHz: 100 };
const lead = spoil(abdomen(MADE), MADE.rateHz, 3, [
  muscle(100, 8, 60),
  moving(200, 20, 2_000),
  jump(320, 4_000, 20),
  flat(450, 20),
  gap(520, 30),
  rail(600, 15),
  heave(700, 20, 1_500),
]).x;

function watched(blocks: readonly Float64Array[], railsUv: readonly [number, number] | null) {
  const watch = createSpoilWatch({
    lead: '#1',
    rateHz: MADE.rateHz,
    railsUv,
    stepUv: MADE.stepUv,
  });
  for (const block of blocks) watch.push(block);
  return watch.finish();
}

const RAILS = [-16_000, 16_000] as const;
const whole = watched([lead], RAILS);

describe('the watch for spoiled spans', () => {
  it('proposes something of every kind in the lead these properties are asked of', () => {
    const causes = [...new Set(whole.map(({ cause }) => cause))].sort();
    expect(causes).toEqual(['burst', 'flat', 'gap', 'rail', 'step']);
  });

  it('proposes the same spans wherever the stream was cut', () => {
    fc.assert(
      fc.property(cuts, (shares) => {
        expect(watched(cutAt(lead, shares), RAILS)).toEqual(whole);
      }),
      always(20),
    );
  });

  it('proposes the same spans of the lead upside down', () => {
    expect(watched([times(-1, lead)], RAILS)).toEqual(whole);
  });

  it('proposes the same spans whatever the electrodes’ offset, where rails are not known', () => {
    const plain = watched([lead], null);
    fc.assert(
      fc.property(numbers(-300_000, 300_000), (level) => {
        // A whole number of binary steps, so that the sum itself is exact.
        const offset = Math.round(level * 64) / 64;
        const exact = lead.map((value) => Math.round(value * 1024) / 1024);
        expect(watched([exact.map((value) => value + offset)], null)).toEqual(
          watched([exact], null),
        );
      }),
      always(6),
    );
    expect(plain.length).toBeGreaterThan(3);
  });
});
