import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { CSS_NAMES, THEMES, type ThemeTokens } from '../../src/review/theme-tokens';
import { contrastRatio } from './wcag-contrast';

type Token = keyof typeof CSS_NAMES;
const BY_NAME = new Map(Object.entries(CSS_NAMES).map(([token, name]) => [name, token as Token]));

const files = readdirSync('src', { recursive: true, encoding: 'utf8' })
  .filter((file) => file.endsWith('.css'))
  .map((file) => join('src', file));

interface Rule {
  readonly where: string;
  readonly text: Token | null;
  readonly back: Token | null;
  readonly border: Token | null;
}

/** The token that a declaration of a rule uses as it is; mixes and inherited colours are none. */
function tokenOf(body: string, property: string): Token | null {
  const found = new RegExp(`(?:^|[;{\\s])${property}:[^;]*?var\\((--[\\w-]+)\\)\\s*(?:;|$)`).exec(
    body,
  );
  if (!found || found[0].includes('color-mix')) return null;
  return BY_NAME.get(found[1]) ?? null;
}

const RULES: readonly Rule[] = files.flatMap((file) =>
  [...readFileSync(file, 'utf8').matchAll(/([^{}]+)\{([^{}]*)\}/g)].map(([, selector, body]) => ({
    where: `${file}: ${selector.trim().replaceAll(/\s+/g, ' ')}`,
    text: tokenOf(body, 'color'),
    back: tokenOf(body, 'background'),
    border: tokenOf(body, 'border(?:-color)?'),
  })),
);

/** What text stands on where its own rule gives no ground. */
const GROUNDS: readonly Token[] = ['paper', 'panel'];
/** Lines of these carry no meaning: what they part is told by words and room too. */
const THIN: readonly Token[] = ['rule'];
/** Text of these stands on dark or coloured ground that another rule gives. */
const ON_GROUND: readonly Token[] = ['paper', 'panel', 'doubtInk'];

describe.each(['light', 'dark'] as const)('every style sheet in the %s theme', (name) => {
  const theme: ThemeTokens = THEMES[name];
  const ratio = (front: Token, back: Token) => contrastRatio(theme[front], theme[back]);

  it('is read', () => {
    expect(files.length).toBeGreaterThan(5);
    expect(RULES.filter(({ text }) => text !== null).length).toBeGreaterThan(30);
    expect(RULES.filter(({ text, back }) => text && back).length).toBeGreaterThan(5);
  });

  it('lets all text be read on the ground its rule gives, else on paper and panel (4.5:1)', () => {
    const weak = RULES.flatMap(({ where, text, back }) => {
      if (!text || (!back && ON_GROUND.includes(text))) return [];
      const grounds = back ? [back] : GROUNDS;
      return grounds.filter((one) => ratio(text, one) < 4.5).map((one) => `${where} on ${one}`);
    });
    expect(weak).toEqual([]);
  });

  it('lets all frames that mean something be seen on paper and panel (3:1)', () => {
    const weak = RULES.flatMap(({ where, border, back }) => {
      if (!border || THIN.includes(border) || border === back || ON_GROUND.includes(border))
        return [];
      return GROUNDS.filter((one) => ratio(border, one) < 3).map((one) => `${where} on ${one}`);
    });
    expect(weak).toEqual([]);
  });

  it('uses no colour of its own outside print and dimming', () => {
    const own = files
      .filter((file) => !/report/.test(file))
      .flatMap((file) =>
        [...readFileSync(file, 'utf8').matchAll(/#[0-9a-f]{3,8}\b/gi)].map(
          ([hex]) => `${file} ${hex}`,
        ),
      );
    expect(own).toEqual([]);
  });
});
