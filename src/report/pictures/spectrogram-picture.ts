import type { Phase } from '../../recording/phase';
import type { Epoch, SlowWaveRhythm } from '../../recording/rhythm';
import type { RhythmBands } from '../../recording/settings';
import type { Interval } from '../../recording/span';
import { indexedPng } from './indexed-png';
import { phasesBar } from './phases-bar';
import {
  at,
  GUTTER,
  hatched,
  INK,
  label,
  line,
  PICTURE_WIDTH,
  picture,
  QUIET,
  timeAxis,
  timeScale,
  valueScale,
} from './svg';

const TOP = 4;
const PLOT = 150;
/** Rows of the picture; finer than the eye parts on paper. */
const ROWS = 128;
const STEPS = 64;
const PAPER = [247, 245, 240] as const;
const TEAL = [31, 122, 114] as const;
const DARK = [16, 30, 40] as const;

export interface SpectrogramInput {
  readonly rhythm: SlowWaveRhythm;
  readonly phases: readonly Phase[];
  readonly spoiled: readonly Interval[];
  readonly bands: RhythmBands;
  readonly durationS: number;
  readonly stepS: number;
}

/** Spectrogram of the reported lead with its DF line, limits, scale and phases; the scale is fixed for the whole study. */
export function spectrogramPicture(input: SpectrogramInput): string {
  const { rhythm, phases, spoiled, bands, durationS, stepS } = input;
  const x = timeScale(0, durationS);
  const bar = phasesBar(phases, x, TOP);
  const top = bar.bottomY + 4;
  const bottom = top + PLOT;
  const y = valueScale(bands.lowCpm, bands.highCpm, top, bottom);
  const [lowDb, highDb] = levelRange(rhythm.spectrogram.levelDb);
  return picture(bottom + 22, 'Spectrogram of the slow wave with its dominant frequency', [
    bar.svg,
    spectrogramImage(input, x, top, [lowDb, highDb]),
    hatched(spoiled, x, top, bottom),
    ...[bands.normoLowCpm, bands.normoHighCpm].map((cpm) =>
      line(
        GUTTER,
        y(cpm),
        PICTURE_WIDTH - 8,
        y(cpm),
        INK,
        'stroke-dasharray="4 3" stroke-width="0.6"',
      ),
    ),
    dfLine(rhythm.epochs, x, y, stepS),
    ...[1, 2, 3, 4, 5, 6, 7, 8, 9]
      .filter((cpm) => cpm >= bands.lowCpm && cpm <= bands.highCpm)
      .map((cpm) => label(GUTTER - 5, y(cpm) + 3.5, String(cpm), 'end', QUIET)),
    label(2, top + 10, 'cpm'),
    label(2, top + 34, `${highDb} dB`, 'start', QUIET),
    scaleBar(top + 38),
    label(2, top + 112, `${lowDb} dB`, 'start', QUIET),
    timeAxis(0, durationS, bottom),
  ]);
}

function levelRange(levelDb: Float32Array): readonly [number, number] {
  const levels = Float32Array.from(levelDb.filter((level) => Number.isFinite(level))).sort();
  if (levels.length === 0) return [0, 60];
  const high = Math.ceil(levels[Math.floor(0.995 * (levels.length - 1))] / 5) * 5;
  const low = Math.floor(levels[Math.floor(0.1 * (levels.length - 1))] / 5) * 5;
  return [Math.min(low, high - 20), high];
}

function shade(step: number): readonly [number, number, number] {
  const place = (2 * step) / (STEPS - 1);
  const [from, to, share] = place <= 1 ? [PAPER, TEAL, place] : [TEAL, DARK, place - 1];
  const mix = (part: number) => Math.round(from[part] * (1 - share) + to[part] * share);
  return [mix(0), mix(1), mix(2)];
}

/** Index 0 is clear; 1 to STEPS run from paper to ink. */
const PALETTE: readonly (readonly [number, number, number])[] = [
  [255, 255, 255],
  ...Array.from({ length: STEPS }, (_, step) => shade(step)),
];

function spectrogramImage(
  { rhythm, bands, stepS }: SpectrogramInput,
  x: (seconds: number) => number,
  top: number,
  [lowDb, highDb]: readonly [number, number],
): string {
  const { centresS, firstCpm, stepCpm, binCount, levelDb } = rhythm.spectrogram;
  const columns = centresS.length;
  if (columns === 0) return '';
  const pixels = new Uint8Array(columns * ROWS);
  for (let row = 0; row < ROWS; row += 1) {
    const cpm = bands.highCpm - ((row + 0.5) / ROWS) * (bands.highCpm - bands.lowCpm);
    const bin = Math.min(binCount - 1, Math.max(0, Math.round((cpm - firstCpm) / stepCpm)));
    for (let column = 0; column < columns; column += 1) {
      const level = levelDb[column * binCount + bin];
      const place = Math.round(((level - lowDb) / (highDb - lowDb)) * (STEPS - 1));
      pixels[row * columns + column] = Number.isFinite(level)
        ? 1 + Math.min(STEPS - 1, Math.max(0, place))
        : 0;
    }
  }
  const png = indexedPng(pixels, columns, ROWS, PALETTE);
  const fromX = x(centresS[0] - stepS / 2);
  const width = x(centresS[columns - 1] + stepS / 2) - fromX;
  return `<image x="${at(fromX)}" y="${at(top)}" width="${at(width)}" height="${PLOT}" preserveAspectRatio="none" href="data:image/png;base64,${base64(png)}"/>`;
}

const LETTERS = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/';

function base64(bytes: Uint8Array): string {
  const out: string[] = [];
  for (let i = 0; i < bytes.length; i += 3) {
    const left = bytes.length - i;
    const three =
      (bytes[i] << 16) | ((left > 1 ? bytes[i + 1] : 0) << 8) | (left > 2 ? bytes[i + 2] : 0);
    const sixes = [three >>> 18, (three >>> 12) & 63, (three >>> 6) & 63, three & 63];
    out.push(sixes.map((six, place) => (place > left ? '=' : LETTERS[six])).join(''));
  }
  return out.join('');
}

function dfLine(
  epochs: readonly Epoch[],
  x: (seconds: number) => number,
  y: (cpm: number) => number,
  stepS: number,
): string {
  const points = epochs.flatMap(({ fromS, toS, kept, dfCpm, rhythm }) =>
    kept && dfCpm !== null && rhythm !== 'none' && rhythm !== 'undecided'
      ? [{ atS: (fromS + toS) / 2, dfCpm }]
      : [],
  );
  const steps = points.map(({ atS, dfCpm }, i) => {
    const joins = i > 0 && atS - points[i - 1].atS <= 1.5 * stepS;
    return `${joins ? 'L' : 'M'}${at(x(atS))} ${at(y(dfCpm))}${joins ? '' : 'l0.01 0'}`;
  });
  const path = steps.join('');
  const round = 'stroke-linecap="round" stroke-linejoin="round"';
  return `<path d="${path}" stroke="#ffffff" stroke-width="4" ${round}/><path d="${path}" stroke="#000000" stroke-width="1.4" ${round}/>`;
}

function scaleBar(top: number): string {
  const height = 62 / 16;
  return Array.from({ length: 16 }, (_, i) => {
    const [r, g, b] = shade(Math.round(((15 - i) / 15) * (STEPS - 1)));
    return `<rect x="2" y="${at(top + i * height)}" width="10" height="${at(height + 0.2)}" fill="rgb(${r} ${g} ${b})"/>`;
  }).join('');
}
