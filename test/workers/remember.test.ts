import { describe, expect, it } from 'vitest';
import { atOnce } from '../../src/numeric/in-steps';
import { identity, lastEqual, remember, rememberInSteps } from '../../workers/remember';

describe('a remembered step', () => {
  it('computes again only when its key changes', () => {
    let runs = 0;
    const step = remember(
      (n: number) => String(n),
      (n) => {
        runs += 1;
        return [n];
      },
    );
    const first = step.of(1);
    expect(step.of(1)).toBe(first);
    expect(runs).toBe(1);
    expect(step.of(2)).toEqual([2]);
    expect(runs).toBe(2);
  });

  it('with rests is begun again where it was given up, and not computed twice where it ended', () => {
    let runs = 0;
    const step = rememberInSteps(
      (n: number) => String(n),
      function* (n) {
        yield;
        runs += 1;
        return [n];
      },
    );
    step.of(1).next();
    expect(runs).toBe(0);
    const first = atOnce(step.of(1));
    expect(atOnce(step.of(1))).toBe(first);
    expect(runs).toBe(1);
    step.of(2).next();
    expect(atOnce(step.of(1))).toBe(first);
    expect(atOnce(step.of(2))).toEqual([2]);
  });

  it('objects keep their number; equal ones stand for each other', () => {
    const a = { value: 1 };
    expect(identity(a)).toBe(identity(a));
    expect(identity(a)).not.toBe(identity({ value: 1 }));
    expect(identity(null)).toBe(0);
    const same = lastEqual<{ value: number }>((one, other) => one.value === other.value);
    expect(same(a)).toBe(a);
    expect(same({ value: 1 })).toBe(a);
    expect(same({ value: 2 })).not.toBe(a);
  });
});
