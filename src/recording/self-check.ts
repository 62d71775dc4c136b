/** One check value as it came out on this machine, in words. */
export interface CheckLine {
  /** "CV-10": the check value's number in the project's list. */
  readonly id: string;
  readonly what: string;
  readonly source: string;
  readonly expected: string;
  readonly got: string;
  /** "exact", "within 0.001", "within 0.5 %". */
  readonly tolerance: string;
  readonly passed: boolean;
}

/** Check values of the list that are not run here, and why. */
export interface CheckLeftOut {
  readonly ids: readonly string[];
  readonly why: string;
}

/** The check values run through the code that makes the figures, on this machine. */
export interface SelfCheck {
  readonly lines: readonly CheckLine[];
  readonly leftOut: readonly CheckLeftOut[];
}

/** How many lines failed. */
export const failedChecks = ({ lines }: Pick<SelfCheck, 'lines'>): number =>
  lines.filter(({ passed }) => !passed).length;

/** The count at the end: "60 checks: 60 passed, 0 failed". */
export function checkCount(check: Pick<SelfCheck, 'lines'>): string {
  const failed = failedChecks(check);
  const all = check.lines.length;
  return `${all} checks: ${all - failed} passed, ${failed} failed`;
}
