import { formatClock } from '../../units/time';

/**
 * Pictures of the printed page are drawn in these units. The page's text is 186 mm wide on A4, 192 mm on Letter, so that one
 * unit is at least 0.73 points and text of 10 units at least 7.3 points.
 */
export const PICTURE_WIDTH = 720;
export const TEXT = 10;
/** Names, units and scales stand left of the plots, as far in as the widest of them. */
export const GUTTER = 84;
/** Half of the widest label of a time axis has room right of the plots. */
const RIGHT = 24;
export const PLOT_END = PICTURE_WIDTH - RIGHT;

/** Colours that read on white paper, also in grey. */
export const INK = '#1b2530';
export const QUIET = '#52606d';
export const RULE = '#c9c3b7';
export const STOMACH = '#0f6b64';
export const HEART = '#9c2350';
export const BREATHING = '#3d5fa8';

export const escapeXml = (text: string): string =>
  text
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;');

/** A coordinate with two decimals at most. */
export const at = (value: number): string => String(Math.round(value * 100) / 100);

/** A plot's stretch of time and where it lies in the picture, from `fromX` to `toX`. */
export interface TimeScale {
  readonly fromS: number;
  readonly toS: number;
  readonly fromX: number;
  readonly toX: number;
  x(seconds: number): number;
}

/** From seconds to the picture's x; over the full width of the plots unless said otherwise. */
export function timeScale(fromS: number, toS: number, fromX = GUTTER, toX = PLOT_END): TimeScale {
  const perSecond = (toX - fromX) / (toS - fromS);
  return { fromS, toS, fromX, toX, x: (seconds) => fromX + (seconds - fromS) * perSecond };
}

/** From a value to the picture's y: `low` at the bottom, `high` at the top. */
export function valueScale(
  low: number,
  high: number,
  topY: number,
  bottomY: number,
): (value: number) => number {
  return (value) => bottomY - ((value - low) / (high - low)) * (bottomY - topY);
}

export type Anchor = 'start' | 'middle' | 'end';

export function label(
  x: number,
  y: number,
  text: string,
  anchor: Anchor = 'start',
  colour = INK,
): string {
  return `<text x="${at(x)}" y="${at(y)}" text-anchor="${anchor}" fill="${colour}">${escapeXml(text)}</text>`;
}

export function line(
  x1: number,
  y1: number,
  x2: number,
  y2: number,
  colour: string,
  more = '',
): string {
  return `<line x1="${at(x1)}" y1="${at(y1)}" x2="${at(x2)}" y2="${at(y2)}" stroke="${colour}" ${more}/>`;
}

/** A path through points; NaN breaks it. */
export function pathThrough(points: readonly (readonly [number, number])[]): string {
  let broken = true;
  return points
    .flatMap(([x, y]) => {
      if (!Number.isFinite(y)) {
        broken = true;
        return [];
      }
      const step = `${broken ? 'M' : 'L'}${at(x)} ${at(y)}`;
      broken = false;
      return [step];
    })
    .join('');
}

const STEPS_S = [10, 30, 60, 300, 600, 900, 1800, 3600, 7200, 14400];
/** Room that a label of the time axis wants. */
const TICK_WIDTH = 56;

/** The time axis under a picture: h:mm where it can, h:mm:ss where the stretch is short. */
export function timeAxis({ fromS, toS, fromX, toX, x }: TimeScale, y: number): string {
  const most = (toX - fromX) / TICK_WIDTH;
  const step = STEPS_S.find((one) => (toS - fromS) / one <= most) ?? 21600;
  const ticks: string[] = [];
  for (let time = Math.ceil(fromS / step) * step; time <= toS; time += step) {
    const text = step <= 60 ? formatClock(time) : formatClock(time).replace(/:00$/, '');
    ticks.push(
      line(x(time), y, x(time), y + 3, QUIET),
      label(x(time), y + 13, text, 'middle', QUIET),
    );
  }
  return line(fromX, y, toX, y, QUIET) + ticks.join('');
}

const HATCH_EVERY = 5;

/**
 * Stretches hatched over the full height of a picture's plot: told by their lines, not by a colour. Lines are drawn one by
 * one, since printing turns an SVG pattern into a coarse image.
 */
export function hatched(
  stretches: readonly { readonly fromS: number; readonly toS: number }[],
  { fromS, toS, x }: TimeScale,
  topY: number,
  bottomY: number,
): string {
  return stretches
    .filter((stretch) => stretch.toS > fromS && stretch.fromS < toS)
    .map((stretch) => {
      const fromX = x(Math.max(stretch.fromS, fromS));
      const toX = Math.max(fromX + 1, x(Math.min(stretch.toS, toS)));
      return (
        `<rect x="${at(fromX)}" y="${at(topY)}" width="${at(toX - fromX)}" height="${at(bottomY - topY)}" fill="#ffffff"/>` +
        `<path d="${diagonals(fromX, toX, topY, bottomY)}" stroke="${QUIET}" stroke-width="0.9"/>`
      );
    })
    .join('');
}

/** Lines that rise to the right, cut at the edges of a box and in step with those of every other box. */
function diagonals(fromX: number, toX: number, topY: number, bottomY: number): string {
  const first = Math.ceil((fromX + topY) / HATCH_EVERY) * HATCH_EVERY;
  const lines: string[] = [];
  for (let sum = first; sum <= toX + bottomY; sum += HATCH_EVERY) {
    const left = Math.max(fromX, sum - bottomY);
    const right = Math.min(toX, sum - topY);
    if (right > left) lines.push(`M${at(left)} ${at(sum - left)}L${at(right)} ${at(sum - right)}`);
  }
  return lines.join('');
}

/** A whole picture with its title for those who hear it. */
export function picture(height: number, title: string, body: readonly string[]): string {
  return (
    `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 ${PICTURE_WIDTH} ${at(height)}" width="${PICTURE_WIDTH}" height="${at(height)}" ` +
    `font-family="system-ui, sans-serif" font-size="${TEXT}" font-variant-numeric="tabular-nums" fill="none">` +
    `<title>${escapeXml(title)}</title>${body.join('')}</svg>`
  );
}
