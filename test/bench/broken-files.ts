import { mutatedFile, openMutated } from '../decode/mutated-files';
import type { Part } from './measured';

const COUNT = 20_000;

/** Damaged and hostile files of every format: each is read or refused in words, in well under a second. */
export const brokenFiles: Part = async ({ say }) => {
  let read = 0;
  let slowestMs = 0;
  const faults: string[] = [];
  for (let number = 0; number < COUNT; number += 1) {
    const startMs = performance.now();
    try {
      if ((await openMutated(mutatedFile(number))) === 'read') read += 1;
    } catch (error) {
      faults.push(`file ${number}: ${error instanceof Error ? error.message : error}`);
    }
    slowestMs = Math.max(slowestMs, performance.now() - startMs);
  }
  for (const fault of faults.slice(0, 20)) say(fault);
  const line = (what: string, value: number, unit: string, budget: string, note: string) => ({
    part: 'broken files',
    what,
    value,
    unit,
    decimals: 0,
    budget,
    note,
  });
  return [
    line(
      'damaged and hostile files that did worse than being read or refused in words',
      faults.length,
      '',
      '0',
      `of ${COUNT}; ${read} read, the others refused; none asks for over 64 MB`,
    ),
    line('the slowest of them', slowestMs, 'ms', '1000', 'by the clock'),
  ];
};
