import { readFileSync } from 'node:fs';
import { expect, it } from 'vitest';
import { PROGRAM } from '../../src/units/program';

it('the program names the version that package.json has', () => {
  const { version } = JSON.parse(readFileSync('package.json', 'utf8'));
  expect(PROGRAM).toBe(`Bicadence ${version}`);
});
