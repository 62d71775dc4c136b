import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { CAUTIONS } from '../../src/recording/cautions';
import { FIGURES } from '../../src/recording/figure-catalogue';

const readme = readFileSync(new URL('../../README.md', import.meta.url), 'utf8');

describe('the README', () => {
  it.each(FIGURES.map(({ key }) => key))('explains %s', (key) => {
    expect(readme).toContain(`\`${key}\``);
  });

  it('gives every caution the page gives', () => {
    for (const caution of CAUTIONS) expect(readme).toContain(caution);
  });

  it('gives the two commands as people type them', () => {
    expect(readme).toContain('npm ci && npm start');
    expect(readme).toContain('npm ci && npm test');
  });
});
