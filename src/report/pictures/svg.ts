import { formatClock } from '../../units/time';

/** Pictures of the printed page are drawn in these units, 4 to a millimetre of a page 180 mm wide. */
export const PICTURE_WIDTH = 720;
export const GUTTER = 64;
const RIGHT = 8;

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

/** From seconds to the picture's x. */
export function timeScale(fromS: number, toS: number): (seconds: number) => number {
  const width = PICTURE_WIDTH - GUTTER - RIGHT;
  return (seconds) => GUTTER + ((seconds - fromS) / (toS - fromS)) * width;
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
const MOST_TICKS = 10;

/** The time axis under a picture: h:mm where it can, h:mm:ss where steps are shorter than a minute. */
export function timeAxis(fromS: number, toS: number, y: number): string {
  const x = timeScale(fromS, toS);
  const step = STEPS_S.find((one) => (toS - fromS) / one <= MOST_TICKS) ?? 21600;
  const ticks: string[] = [];
  for (let time = Math.ceil(fromS / step) * step; time <= toS; time += step) {
    const text = step < 60 ? formatClock(time) : formatClock(time).replace(/:00$/, '');
    ticks.push(
      line(x(time), y, x(time), y + 3, QUIET),
      label(x(time), y + 13, text, 'middle', QUIET),
    );
  }
  return line(GUTTER, y, PICTURE_WIDTH - RIGHT, y, QUIET) + ticks.join('');
}

/** Hatching for what is excluded; told by its lines, not by a colour. */
const HATCH =
  '<pattern id="hatch" width="5" height="5" patternUnits="userSpaceOnUse" patternTransform="rotate(45)"><rect width="5" height="5" fill="#ffffff"/><line x1="0" y1="0" x2="0" y2="5" stroke="#52606d" stroke-width="1"/></pattern>';

/** Stretches hatched over the full height of a picture's plot. */
export function hatched(
  stretches: readonly { readonly fromS: number; readonly toS: number }[],
  x: (seconds: number) => number,
  topY: number,
  bottomY: number,
): string {
  return stretches
    .map(({ fromS, toS }) => {
      const width = Math.max(1, x(toS) - x(fromS));
      return `<rect x="${at(x(fromS))}" y="${at(topY)}" width="${at(width)}" height="${at(bottomY - topY)}" fill="url(#hatch)" fill-opacity="0.75"/>`;
    })
    .join('');
}

/** A whole picture with its title for those who hear it. */
export function picture(height: number, title: string, body: readonly string[]): string {
  return (
    `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 ${PICTURE_WIDTH} ${height}" width="${PICTURE_WIDTH}" height="${height}" ` +
    'font-family="system-ui, sans-serif" font-size="10" font-variant-numeric="tabular-nums" fill="none">' +
    `<title>${escapeXml(title)}</title><defs>${HATCH}</defs>${body.join('')}</svg>`
  );
}
