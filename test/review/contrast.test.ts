import { describe, expect, it } from 'vitest';
import {
  applyTheme,
  CSS_NAMES,
  THEMES,
  type ThemeName,
  type ThemeTokens,
} from '../../src/review/theme-tokens';
import { contrastRatio, relativeLuminance } from './wcag-contrast';

const NAMES: readonly ThemeName[] = ['light', 'dark'];

type Pair = readonly [
  front: keyof Omit<ThemeTokens, 'ramp'>,
  back: keyof Omit<ThemeTokens, 'ramp'>,
];

const TEXT: readonly Pair[] = [
  ...(['ink', 'quiet', 'stomach', 'heart', 'breathing'] as const).flatMap((front): Pair[] => [
    [front, 'paper'],
    [front, 'panel'],
  ]),
  ['ink', 'rule'],
  ['ink', 'stomachSoft'],
  ['stomach', 'stomachSoft'],
  ['ink', 'heartSoft'],
  ['heart', 'heartSoft'],
  ['doubtInk', 'doubt'],
  ['paper', 'ink'],
  ['panel', 'ink'],
];

const SHAPES: readonly Pair[] = (['stomach', 'heart', 'breathing', 'quiet', 'focus'] as const)
  .flatMap((front): Pair[] => [
    [front, 'paper'],
    [front, 'panel'],
  ])
  .concat([
    ['focus', 'stomachSoft'],
    ['focus', 'heartSoft'],
    ['dfLine', 'dfHalo'],
  ]);

describe('the contrast formula', () => {
  it('gives the published ratios of three greys on white (CV-57, WCAG 2.1)', () => {
    expect(contrastRatio('#767676', '#ffffff')).toBeCloseTo(4.54, 2);
    expect(contrastRatio('#777777', '#ffffff')).toBeCloseTo(4.48, 2);
    expect(contrastRatio('#949494', '#ffffff')).toBeCloseTo(3.03, 2);
    expect(contrastRatio('#000000', '#ffffff')).toBe(21);
  });

  it('refuses what is no colour', () => {
    expect(() => relativeLuminance('teal')).toThrow(RangeError);
  });
});

describe.each(NAMES)('the %s theme', (name) => {
  const theme = THEMES[name];

  it.each(TEXT)('lets text in %s be read on %s (4.5:1)', (front, back) => {
    expect(contrastRatio(theme[front], theme[back])).toBeGreaterThanOrEqual(4.5);
  });

  it.each(SHAPES)('lets lines in %s be seen on %s (3:1)', (front, back) => {
    expect(contrastRatio(theme[front], theme[back])).toBeGreaterThanOrEqual(3);
  });

  it('has a spectrogram ramp whose lightness only goes one way, with visible steps', () => {
    const levels = theme.ramp.map(relativeLuminance);
    const away = Math.sign(levels[levels.length - 1] - levels[0]);
    for (let i = 1; i < levels.length; i += 1)
      expect((levels[i] - levels[i - 1]) * away).toBeGreaterThan(0);
    expect(contrastRatio(theme.ramp[0], theme.ramp[theme.ramp.length - 1])).toBeGreaterThan(10);
  });

  it('keeps the DF line or its halo apart from every level of the ramp (3:1)', () => {
    for (const level of theme.ramp) {
      const best = Math.max(contrastRatio(theme.dfLine, level), contrastRatio(theme.dfHalo, level));
      expect(best).toBeGreaterThanOrEqual(3);
    }
  });

  it('reaches the page as custom properties', () => {
    const set = new Map<string, string>();
    const page = {
      documentElement: {
        style: { setProperty: (key: string, value: string) => void set.set(key, value) },
        dataset: {} as Record<string, string>,
      },
    };
    applyTheme(page as unknown as Document, name);
    expect(set.get('--paper')).toBe(theme.paper);
    for (const property of Object.values(CSS_NAMES)) expect(set.get(property)).toMatch(/^#/);
    expect(page.documentElement.dataset.theme).toBe(name);
  });
});
