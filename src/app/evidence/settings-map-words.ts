import type { Settings } from '../../recording/settings';
import { bestCell, type MapScores, type OrganMap } from '../../recording/settings-map';
import { formatClock } from '../../units/time';

/** A cell of a map by its indexes. */
export interface Cell {
  readonly order: number;
  readonly window: number;
}

export const scoreNumber = (snrDb: number): string => {
  const text = snrDb.toFixed(1).replace('-', '−');
  return text === '−0.0' ? '0.0' : text;
};

export const scoreText = (snrDb: number): string => `${scoreNumber(snrDb)} dB`;

export const windowText = (windowMs: number): string =>
  windowMs >= 1000 ? `${(windowMs / 1000).toFixed(1)} s` : `${windowMs} ms`;

/** "order 0.35, window 300 ms". */
export const settingText = (order: number, windowMs: number): string =>
  `order ${Number(order.toFixed(3))}, window ${windowText(windowMs)}`;

export const cellText = (map: OrganMap, { order, window }: Cell): string =>
  settingText(map.orders[order], map.windowsMs[window]);

/** What a cell says of itself. */
export const cellWords = (map: OrganMap, scores: MapScores, cell: Cell): string =>
  `${cellText(map, cell)}: ${scoreText(scores.cells[cell.order][cell.window].snrDb)}`;

/** How far ahead a drawn signal is, where that is worth saying. */
export function aheadText({ organ }: OrganMap, aheadS: number): string {
  const small = organ === 'slow' ? 0.05 : 0.0005;
  if (Math.abs(aheadS) < small) return '';
  const size = Math.abs(aheadS);
  const text = organ === 'slow' ? `${size.toFixed(1)} s` : `${Math.round(1000 * size)} ms`;
  return `, drawn ${text} ${aheadS > 0 ? 'early' : 'late'}`;
}

/** What is known, in what, where. */
export function stretchWords({ target, organ, fromS, toS, noiseUv, noiseToHz }: OrganMap): string {
  const where = `${formatClock(fromS)} to ${formatClock(toS)}`;
  const known =
    target.kind === 'wave'
      ? `Known: a wave of ${Math.round(target.uv)} µV at ${target.cpm.toFixed(2)} cpm, this study’s own median, planted in the reported lead’s own leftover, ${where}.`
      : `Known: the averages of ${target.beats} beats (${Math.round(target.uv)} µV) at their own times; the rest is what else the heart lead holds, ${where}.`;
  const noise = `Noise, where added: white, ${Math.round(noiseUv)} µV (root mean square) up to ${noiseToHz.toFixed(0)} Hz, as strong as the known ${organ === 'slow' ? 'wave' : 'beats'}.`;
  return `${known} ${noise}`;
}

/** Score of the route in use. */
export function inUse(
  map: OrganMap,
  scores: MapScores,
  settings: Settings,
): { readonly name: string; readonly snrDb: number } | null {
  const route = map.organ === 'slow' ? settings.slowRoute : settings.heartRoute;
  if (route === 'fractional')
    return {
      name: `fractional, ${settingText(map.order, map.windowMs)}`,
      snrDb: scores.asSet.snrDb,
    };
  const bar = scores.bars.find((one) => one.route === route);
  return bar ? { name: route, snrDb: bar.snrDb } : null;
}

/** Differences below this are none: the planted wave and the stretch alone move a score by more. */
const NO_DIFFERENCE_DB = 0.5;

/** What the map proposes, and by how much it is better than what is in use; the program changes nothing by itself. */
export function proposalWords(map: OrganMap, scores: MapScores, settings: Settings): string {
  const best = bestCell(scores);
  const words = `Best of this map: ${cellWords(map, scores, best)}`;
  const used = inUse(map, scores, settings);
  if (!used) return `${words}.`;
  const gain = scores.cells[best.order][best.window].snrDb - used.snrDb;
  const rest = `what is in use (${used.name}: ${scoreText(used.snrDb)})`;
  if (gain >= NO_DIFFERENCE_DB) return `${words}, ${scoreText(gain)} better than ${rest}.`;
  if (gain > -NO_DIFFERENCE_DB) return `${words}, no better than ${rest}.`;
  return `${words}, ${scoreText(-gain)} worse than ${rest}: nothing on this map would improve it.`;
}
