import { describe, expect, it } from 'vitest';
import { mutatedFile, openMutated } from './mutated-files';

/** Twenty thousand of them are opened by `npm run bench -- broken-files`. */
const COUNT = 900;

describe('files that were damaged or made to harm', () => {
  it('are read or refused in words, and never ask for more than they hold', async () => {
    const outcomes = { read: 0, refused: 0 };
    for (let number = 0; number < COUNT; number += 1) {
      const file = mutatedFile(number);
      try {
        outcomes[await openMutated(file)] += 1;
      } catch (error) {
        throw new Error(`file ${number}: ${error instanceof Error ? error.message : error}`);
      }
    }
    expect(outcomes.read).toBeGreaterThan(COUNT / 10);
    expect(outcomes.refused).toBeGreaterThan(COUNT / 10);
  });
});
