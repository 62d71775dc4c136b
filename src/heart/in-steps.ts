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
