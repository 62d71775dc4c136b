import type { Phase } from '../../recording/phase';
import { at, INK, label, line, QUIET, RULE, type TimeScale } from './svg';

const HEIGHT = 14;
const LETTER_WIDTH = 6.5;

/** The phases as a row of named boxes at the top of a picture; returns the y below it too. */
export function phasesBar(
  phases: readonly Phase[],
  { x }: TimeScale,
  topY: number,
): { readonly svg: string; readonly bottomY: number } {
  const boxes = phases.map(({ name, fromS, toS }) => {
    const width = x(toS) - x(fromS);
    const fill = name.startsWith('meal') ? RULE : '#ffffff';
    const box = `<rect x="${at(x(fromS))}" y="${at(topY)}" width="${at(width)}" height="${HEIGHT}" fill="${fill}" stroke="${QUIET}" stroke-width="0.5"/>`;
    return width > LETTER_WIDTH * name.length
      ? box + label(x(fromS) + 3, topY + 10.5, name, 'start', INK)
      : box;
  });
  return { svg: boxes.join(''), bottomY: topY + HEIGHT };
}

/** Thin lines down a picture where phases begin and end. */
export function phaseEdges(
  phases: readonly Phase[],
  { fromS, toS, x }: TimeScale,
  topY: number,
  bottomY: number,
): string {
  const edges = new Set(phases.flatMap((phase) => [phase.fromS, phase.toS]));
  return [...edges]
    .filter((time) => time > fromS && time < toS)
    .map((time) => line(x(time), topY, x(time), bottomY, QUIET, 'stroke-width="0.5"'))
    .join('');
}
