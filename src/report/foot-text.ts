const LONGEST = 110;

/** A text as a CSS string (CSS Syntax Level 3): quotes, backslashes and control characters by their code. */
export function cssString(text: string): string {
  const safe = text.replaceAll(
    /["\\\p{Cc}]/gu,
    (letter) => `\\${(letter.codePointAt(0) ?? 0).toString(16)} `,
  );
  return `"${safe}"`;
}

/** A foot that fits on a line of the printed page. */
export const shortFoot = (text: string): string =>
  text.length > LONGEST ? `${text.slice(0, LONGEST - 1)}…` : text;
