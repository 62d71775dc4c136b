/** A colour as red, green and blue, each 0 to 255. */
export type Rgb = readonly [red: number, green: number, blue: number];

/** Reads "#rrggbb". Throws RangeError for anything else. */
export function parseHex(hex: string): Rgb {
  const match = /^#([0-9a-f]{2})([0-9a-f]{2})([0-9a-f]{2})$/i.exec(hex);
  if (!match) throw new RangeError(`a colour is written #rrggbb, not ${hex}`);
  return [
    Number.parseInt(match[1], 16),
    Number.parseInt(match[2], 16),
    Number.parseInt(match[3], 16),
  ];
}
