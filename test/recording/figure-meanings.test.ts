import { expect, test } from 'vitest';
import { FIGURES } from '../../src/recording/figure-catalogue';
import { FIGURE_MEANINGS } from '../../src/recording/figure-meanings';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';

test('every figure of the catalogue opens on a meaning, a source and its settings, and no meaning is left over', () => {
  expect(Object.keys(FIGURE_MEANINGS)).toEqual(FIGURES.map(({ key }) => key));
  for (const { definition, source, settings } of Object.values(FIGURE_MEANINGS)) {
    expect(definition).toMatch(/\w.*\.$/s);
    expect(source).not.toBe('');
    expect(settings(DEFAULT_SETTINGS)).not.toBe('');
  }
});
