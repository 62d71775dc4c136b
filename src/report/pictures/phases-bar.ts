import type { Phase } from '../../recording/phase';
import { at, INK, label, QUIET } from './svg';

const HEIGHT = 14;

/** The phases as a row of named boxes at the top of a picture; returns the y below it too. */
export function phasesBar(
  phases: readonly Phase[],
  x: (seconds: number) => number,
  topY: number,
): { readonly svg: string; readonly bottomY: number } {
  const boxes = phases.map(({ name, fromS, toS }) => {
    const width = x(toS) - x(fromS);
    const fill = name.startsWith('meal') ? '#dad5cb' : '#ffffff';
    const box = `<rect x="${at(x(fromS))}" y="${at(topY)}" width="${at(width)}" height="${HEIGHT}" fill="${fill}" stroke="${QUIET}" stroke-width="0.5"/>`;
    return width > 6 * name.length
      ? box + label(x(fromS) + 3, topY + 10.5, name, 'start', INK)
      : box;
  });
  return { svg: boxes.join(''), bottomY: topY + HEIGHT };
}
