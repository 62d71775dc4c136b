/** Runs a pass and reports its part of the whole. */
export function* scaled<T>(
  pass: Generator<number, T>,
  from: number,
  to: number,
): Generator<number, T> {
  for (;;) {
    const step = pass.next();
    if (step.done) return step.value;
    yield from + (to - from) * step.value;
  }
}

/** Runs a pass that says nothing of its progress; yields `done`, the part of the whole that is done. */
export function* quietly<T>(pass: Generator<void, T>, done: number): Generator<number, T> {
  for (;;) {
    const step = pass.next();
    if (step.done) return step.value;
    yield done;
  }
}

/** What a pass returns, without a rest. */
export function atOnce<T>(pass: Generator<unknown, T>): T {
  for (;;) {
    const step = pass.next();
    if (step.done) return step.value;
  }
}

/** Items made into others between two rests. */
const ITEMS_A_STEP = 1500;

/** An array's map that takes a rest now and then. */
export function* mapInSteps<A, B>(
  items: readonly A[],
  make: (item: A, i: number) => B,
): Generator<void, B[]> {
  const made: B[] = [];
  for (let i = 0; i < items.length; i += 1) {
    made.push(make(items[i], i));
    if (i % ITEMS_A_STEP === ITEMS_A_STEP - 1) yield;
  }
  return made;
}
