import { parseHex } from '../../src/review/hex-colour';

/** Relative luminance of an sRGB colour, 0 (black) to 1 (white). Method: WCAG 2.1, definition of relative luminance. */
export function relativeLuminance(hex: string): number {
  const [red, green, blue] = parseHex(hex).map((value) => {
    const part = value / 255;
    return part <= 0.03928 ? part / 12.92 : ((part + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue;
}

/** Contrast ratio of two colours, 1 to 21; order does not matter. Method: WCAG 2.1, definition of contrast ratio. */
export function contrastRatio(one: string, other: string): number {
  const a = relativeLuminance(one);
  const b = relativeLuminance(other);
  return (Math.max(a, b) + 0.05) / (Math.min(a, b) + 0.05);
}
