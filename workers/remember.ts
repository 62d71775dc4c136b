/** Remembers the last result of one step, and gives it again while its inputs are the same. */
export interface Remembered<I, T> {
  readonly of: (inputs: I) => T;
}

/** A step that is computed again only when `key` of its inputs differs from the last one's. */
export function remember<I, T>(
  key: (inputs: I) => string,
  compute: (inputs: I) => T,
): Remembered<I, T> {
  let last: { readonly key: string; readonly result: T } | null = null;
  return {
    of(inputs) {
      const now = key(inputs);
      if (!last || last.key !== now) last = { key: now, result: compute(inputs) };
      return last.result;
    },
  };
}

/** The same for a step that takes a rest now and then; one that was given up leaves what was remembered. */
export function rememberInSteps<I, T>(
  key: (inputs: I) => string,
  compute: (inputs: I) => Generator<void, T>,
): Remembered<I, Generator<void, T>> {
  let last: { readonly key: string; readonly result: T } | null = null;
  return {
    *of(inputs) {
      const now = key(inputs);
      if (last?.key === now) return last.result;
      const result = yield* compute(inputs);
      last = { key: now, result };
      return result;
    },
  };
}

const numbers = new WeakMap<object, number>();
let next = 1;

/** A number for an object that stays with it: two results of a step are the same when their numbers are. */
export function identity(object: object | null): number {
  if (object === null) return 0;
  const known = numbers.get(object);
  if (known !== undefined) return known;
  const given = next;
  next += 1;
  numbers.set(object, given);
  return given;
}

/** Gives the value it was given last as long as the new one is equal to it, so that `identity` stays the same. */
export function lastEqual<T>(equal: (a: T, b: T) => boolean): (value: T) => T {
  let last: { readonly value: T } | null = null;
  return (value) => {
    if (!last || !equal(last.value, value)) last = { value };
    return last.value;
  };
}
