import { useEffect } from 'react';
import { cssString, shortFoot } from './foot-text';

/** Puts a text at the foot of every printed page while the report is shown; report.css says where. */
export function usePageFoot(text: string | null): void {
  useEffect(() => {
    if (text === null) return;
    const { style } = document.documentElement;
    style.setProperty('--report-foot', cssString(shortFoot(text)));
    return () => {
      style.removeProperty('--report-foot');
    };
  }, [text]);
}
