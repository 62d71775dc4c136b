import type { Phase } from '../../recording/phase';
import type { Epoch, SlowWaveRhythm } from '../../recording/rhythm';
import type { RhythmBands } from '../../recording/settings';
import type { Interval } from '../../recording/span';
import { base64 } from './base64';
import { indexedPng } from './indexed-png';
import { phaseEdges, phasesBar } from './phases-bar';
import { levelRange, spectrogramPixels } from './spectrogram-pixels';
import { RAMP_PALETTE, RAMP_STOPS } from './spectrogram-ramp';
import {
  at,
  GUTTER,
  hatched,
  INK,
  label,
  line,
  PLOT_END,
  picture,
  QUIET,
  type TimeScale,
  timeAxis,
  timeScale,
  valueScale,
} from './svg';

const LEGEND = 13;
const PLOT = 160;

export interface SpectrogramInput {
  readonly rhythm: SlowWaveRhythm;
  readonly phases: readonly Phase[];
  readonly spoiled: readonly Interval[];
  readonly bands: RhythmBands;
  readonly durationS: number;
  readonly stepS: number;
  /** Stretches shown larger elsewhere: barred at the foot of the plot. */
  readonly marked: readonly Interval[];
}

/** Spectrogram of the reported lead with its DF line, limits, scale and phases; the scale is fixed for the whole study. */
export function spectrogramPicture(input: SpectrogramInput): string {
  const { rhythm, phases, spoiled, bands, durationS, stepS, marked } = input;
  const scale = timeScale(0, durationS);
  const bar = phasesBar(phases, scale, LEGEND + 4);
  const top = bar.bottomY + 3;
  const bottom = top + PLOT;
  const y = valueScale(bands.lowCpm, bands.highCpm, top, bottom);
  const range = levelRange(rhythm.spectrogram.levelDb);
  return picture(bottom + 18, 'Spectrogram of the slow wave with its dominant frequency', [
    legend(range),
    bar.svg,
    spectrogramImage(input, scale, top, range),
    hatched(spoiled, scale, top, bottom),
    phaseEdges(phases, scale, top, bottom),
    ...[bands.normoLowCpm, bands.normoHighCpm].map((cpm) => limit(y(cpm))),
    dfLine(rhythm.epochs, scale, y, stepS),
    ...ticksCpm(bands).map((cpm) =>
      label(GUTTER - 5, cpm === bands.highCpm ? top + 8 : y(cpm) + 3.5, String(cpm), 'end', QUIET),
    ),
    label(2, top + 8, 'Slow wave'),
    label(2, top + 20, 'cpm', 'start', QUIET),
    ...marked.map(({ fromS, toS }) =>
      line(scale.x(fromS), bottom, scale.x(toS), bottom, INK, 'stroke-width="4"'),
    ),
    timeAxis(scale, bottom),
  ]);
}

/** Whole numbers of the search band; so many that their labels stay apart. */
function ticksCpm({ lowCpm, highCpm }: RhythmBands): readonly number[] {
  const first = Math.ceil(lowCpm);
  const count = Math.floor(highCpm) - first + 1;
  const step = Math.ceil(count / 12);
  return Array.from({ length: Math.ceil(count / step) }, (_, i) => first + i * step);
}

/** A limit of the normal band: dashes with a light edge, so that they stand out of dark and of light. */
function limit(y: number): string {
  const dashes = 'stroke-dasharray="4 3"';
  return (
    line(GUTTER, y, PLOT_END, y, '#ffffff', 'stroke-width="1.6"') +
    line(GUTTER, y, PLOT_END, y, '#000000', `${dashes} stroke-width="0.8"`)
  );
}

const LEGEND_WIDTH = 160;

/** The level scale right above the plot, away from its axes: least and greatest level and the colours between. */
function legend([lowDb, highDb]: readonly [number, number]): string {
  const endX = PLOT_END - 96;
  const fromX = endX - LEGEND_WIDTH;
  const stops = RAMP_STOPS.map(
    (colour, i) => `<stop offset="${at(i / (RAMP_STOPS.length - 1))}" stop-color="${colour}"/>`,
  );
  return [
    `<defs><linearGradient id="levels">${stops.join('')}</linearGradient></defs>`,
    label(fromX - 4, 10, String(lowDb), 'end', QUIET),
    `<rect x="${fromX}" y="2" width="${LEGEND_WIDTH}" height="9" fill="url(#levels)" stroke="${QUIET}" stroke-width="0.5"/>`,
    label(endX + 4, 10, `${highDb} dB re 1 µV²/Hz`, 'start', QUIET),
  ].join('');
}

function spectrogramImage(
  { rhythm, bands, stepS }: SpectrogramInput,
  { x }: TimeScale,
  top: number,
  range: readonly [number, number],
): string {
  const { lowCpm, highCpm } = bands;
  const image = spectrogramPixels(rhythm.spectrogram, stepS, [lowCpm, highCpm], range);
  if (!image) return '';
  const { pixels, width, height, fromS, toS } = image;
  const png = base64(indexedPng(pixels, width, height, RAMP_PALETTE));
  return `<image x="${at(x(fromS))}" y="${at(top)}" width="${at(x(toS) - x(fromS))}" height="${PLOT}" preserveAspectRatio="none" href="data:image/png;base64,${png}"/>`;
}

function dfLine(
  epochs: readonly Epoch[],
  { x }: TimeScale,
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
