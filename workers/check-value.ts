import { Refusal } from '../src/recording/failure';
import type { CheckLine } from '../src/recording/self-check';
import type { Job } from './job';

type Value = number | string;

/** How far what comes out may be from what is expected; words are compared exactly whatever it is. */
export type Tolerance =
  | { readonly kind: 'exact' }
  | { readonly kind: 'absolute'; readonly by: number }
  | { readonly kind: 'relative'; readonly by: number };

export const EXACT: Tolerance = { kind: 'exact' };
export const within = (by: number): Tolerance => ({ kind: 'absolute', by });
export const withinShare = (by: number): Tolerance => ({ kind: 'relative', by });

/** One value, or a row of them, that the code has to give. */
export interface CheckValue {
  readonly id: string;
  readonly what: string;
  readonly source: string;
  readonly expected: readonly Value[];
  readonly tolerance: Tolerance;
  readonly got: (job: Job) => ArrayLike<Value> | Promise<ArrayLike<Value>>;
}

/** Source of a value that follows from the definition alone. */
export const ARITHMETIC = 'arithmetic from the definition';

/**
 * Runs one check. What throws has failed, with its words as what it got; only a stop goes on to the caller.
 */
export async function runCheck(check: CheckValue, job: Job): Promise<CheckLine> {
  const { id, what, source, expected, tolerance } = check;
  const told = {
    id,
    what,
    source,
    expected: inWords(expected),
    tolerance: toleranceWords(tolerance),
  };
  try {
    const got = Array.from(await check.got(job));
    const passed =
      got.length === expected.length && expected.every((one, i) => agrees(one, got[i], tolerance));
    return { ...told, got: inWords(got), passed };
  } catch (error) {
    if (error instanceof Refusal && error.failure.kind === 'cancelled') throw error;
    const words = error instanceof Error ? error.message : String(error);
    return { ...told, got: `error: ${words}`, passed: false };
  }
}

function agrees(expected: Value, got: Value, tolerance: Tolerance): boolean {
  if (typeof expected === 'string' || typeof got === 'string') return expected === got;
  switch (tolerance.kind) {
    case 'exact':
      return expected === got;
    case 'absolute':
      return Math.abs(got - expected) <= tolerance.by;
    case 'relative':
      return Math.abs(got - expected) <= tolerance.by * Math.abs(expected);
  }
}

const shortest = (value: number): string => (value < 1e-3 ? value.toExponential() : String(value));

function toleranceWords(tolerance: Tolerance): string {
  switch (tolerance.kind) {
    case 'exact':
      return 'exact';
    case 'absolute':
      return `within ${shortest(tolerance.by)}`;
    case 'relative':
      return `within ${shortest(Number((100 * tolerance.by).toPrecision(3)))} %`;
  }
}

const DIGITS = 10;
const inWords = (values: readonly Value[]): string =>
  values
    .map((value) => (typeof value === 'string' ? value : String(Number(value.toPrecision(DIGITS)))))
    .join(', ');
