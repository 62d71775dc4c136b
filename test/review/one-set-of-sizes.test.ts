import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { RADII_PX, SPACINGS_PX, TYPE_SIZES } from '../../src/review/theme-tokens';

/** Styles of the screen. The report has its own, in parts of its paper's type size. */
const STYLES = readdirSync('src', { recursive: true, encoding: 'utf8' })
  .filter((file) => file.endsWith('.css') && !file.startsWith('report'))
  .map((file) => join('src', file));

interface Declaration {
  readonly where: string;
  readonly property: string;
  readonly value: string;
}

const DECLARATIONS: readonly Declaration[] = STYLES.flatMap((file) =>
  [
    ...readFileSync(file, 'utf8').matchAll(/^\s*(?<property>-{0,2}[a-z-]+):\s*(?<value>[^;]+);/gm),
  ].map(({ groups }) => ({
    where: file,
    property: groups?.property ?? '',
    value: groups?.value ?? '',
  })),
);

const pixels = (value: string): readonly number[] =>
  [...value.matchAll(/(?<![\w.-])-?(\d+(?:\.\d+)?)px/g)].map(([, px]) => Number(px));

/** Declarations of some properties with a length in pixels that a set does not have. */
const strays = (properties: RegExp, allowed: readonly number[]) =>
  DECLARATIONS.filter(({ property }) => properties.test(property))
    .filter(({ value }) => pixels(value).some((px) => !allowed.includes(px)))
    .map(({ where, property, value }) => `${where}: ${property}: ${value}`);

describe('one set of sizes', () => {
  it('is what every style of the screen chooses from: distances', () => {
    expect(STYLES.length).toBeGreaterThan(8);
    expect(strays(/^(padding|margin|gap|row-gap|column-gap)(-|$)/, SPACINGS_PX)).toEqual([]);
  });

  it('is what every style of the screen chooses from: corners', () => {
    expect(strays(/^border(-\w+)*-radius$/, RADII_PX)).toEqual([]);
  });

  it('is what every style of the screen chooses from: type, by its name', () => {
    const sizes = DECLARATIONS.filter(({ property }) => /^font(-size)?$/.test(property));
    const named = new RegExp(`var\\((${Object.keys(TYPE_SIZES).join('|')})\\)`);
    const odd = sizes.filter(({ value }) => value !== 'inherit' && !named.test(value));
    expect(odd).toEqual([]);
    expect(sizes.flatMap(({ value }) => pixels(value))).toEqual([]);
  });
});
