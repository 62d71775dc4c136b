import { type CheckLine, checkCount, type SelfCheck } from '../src/recording/self-check';
import { WrongArguments } from './command-line';

const WORD = '--self-check';

/** Whether the self-check is asked for. Throws WrongArguments where anything stands beside it. */
export function isSelfCheck(words: readonly string[]): boolean {
  if (!words.includes(WORD)) return false;
  if (words.length > 1) throw new WrongArguments(`${WORD} goes alone`);
  return true;
}

/** A line a check, then what was left out and why, and the count; ends with a line break. */
export function selfCheckText(check: SelfCheck): string {
  const leftOut = check.leftOut.map(({ ids, why }) => `not run: ${ids.join(', ')}: ${why}`);
  return [...check.lines.map(lineWords), ...leftOut, checkCount(check), ''].join('\n');
}

const lineWords = ({ id, what, source, expected, got, tolerance, passed }: CheckLine): string =>
  `${passed ? 'pass' : 'FAIL'}  ${id}  ${what} | source: ${source} | expected: ${expected} | got: ${got} | ${tolerance}`;
