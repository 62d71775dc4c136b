import { useEffect } from 'react';

const LONGEST = 110;

/** A text as a CSS string (CSS Syntax Level 3): quotes, backslashes and control characters by their code. */
export function cssString(text: string): string {
  const safe = text.replaceAll(
    /["\\\p{Cc}]/gu,
    (letter) => `\\${(letter.codePointAt(0) ?? 0).toString(16)} `,
  );
  return `"${safe}"`;
}

/** Puts a text at the foot of every printed page while the report is shown; report.css says where. */
export function usePageFoot(text: string | null): void {
  useEffect(() => {
    if (text === null) return;
    const { style } = document.documentElement;
    const short = text.length > LONGEST ? `${text.slice(0, LONGEST - 1)}…` : text;
    style.setProperty('--report-foot', cssString(short));
    return () => {
      style.removeProperty('--report-foot');
    };
  }, [text]);
}
