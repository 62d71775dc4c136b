import { halfWidth } from '../numeric/half-width';
import type { Figures } from '../recording/figure';
import type { HeartSegment, RrSeries } from '../recording/heart-series';
import type { Phase } from '../recording/phase';
import type { Settings } from '../recording/settings';
import { intervalsWithin } from './rr-series';

/** About a minute of beats: what is drawn together keeps breathing and slower swings. */
const BLOCK = 60;
/** Blocks a part must hold at least for the draw to say anything. */
const FEWEST_BLOCKS = 4;
const Z95 = 1.959963984540054;

interface PartOfSeries {
  readonly rr: RrSeries;
  readonly part: Phase;
  readonly segments: readonly HeartSegment[];
  readonly settings: Settings['variability'];
}

/**
 * Half the width of the nominal 95 % range of the figures that doubts of beats move, by key; a figure of which none can be
 * told is not there. Heart rate, RMSSD and SDNN by the moving-block bootstrap over intervals (Kuensch 1989), SDNN about each
 * segment's mean; powers from their degrees of freedom, twice bandwidth times length (Bendat and Piersol 1971).
 */
export function heartHalfWidths(
  from: PartOfSeries,
  figures: Figures,
): Readonly<Record<string, number>> {
  const { lfHz, hfHz } = from.settings;
  return Object.fromEntries(
    [
      ...bootstrapped(from),
      ['lf_ms2', powerHalfWidth(from, figures, 'lf_ms2', lfHz)] as const,
      ['hf_ms2', powerHalfWidth(from, figures, 'hf_ms2', hfHz)] as const,
    ].filter(([, half]) => half > 0 && Number.isFinite(half)),
  );
}

function powerHalfWidth(
  { segments }: PartOfSeries,
  figures: Figures,
  key: string,
  [low, high]: readonly [number, number],
): number {
  const figure = figures[key];
  const seconds = segments
    .filter(({ state }) => state === 'used')
    .reduce((sum, { fromS, toS }) => sum + toS - fromS, 0);
  if (figure?.kind !== 'number' || seconds === 0) return Number.NaN;
  return (Z95 * figure.value) / Math.sqrt((high - low) * seconds);
}

/** NN intervals of the segments that carry figures, with what each adds to the squares about its segment's mean and of steps. */
function columns({ rr, part, segments }: PartOfSeries) {
  const { first, end } = intervalsWithin(rr, part.fromS, part.toS);
  const rrMs: number[] = [];
  const about: number[] = [];
  const steps: number[] = [];
  for (const segment of segments) {
    if (segment.state === 'irregular') continue;
    const own: number[] = [];
    for (let i = first; i < end; i += 1) {
      if (rr.timesS[i] < segment.fromS || rr.timesS[i] >= segment.toS || rr.nn[i] !== 1) continue;
      own.push(rr.rrMs[i]);
      steps.push(i > first && rr.nn[i - 1] === 1 ? (rr.rrMs[i] - rr.rrMs[i - 1]) ** 2 : Number.NaN);
    }
    const mean = own.reduce((sum, one) => sum + one, 0) / own.length;
    rrMs.push(...own);
    about.push(...own.map((one) => (one - mean) ** 2));
  }
  return { rrMs, about, steps };
}

function bootstrapped(from: PartOfSeries): readonly (readonly [string, number])[] {
  const { rrMs, about, steps } = columns(from);
  const count = rrMs.length;
  const meanOf = (values: readonly number[]) => (places: Int32Array) => {
    let sum = 0;
    let n = 0;
    for (const i of places) {
      if (Number.isNaN(values[i])) continue;
      sum += values[i];
      n += 1;
    }
    return sum / n;
  };
  const half = (statistic: (places: Int32Array) => number): number =>
    halfWidth({ count, blockLength: BLOCK, fewestBlocks: FEWEST_BLOCKS }, statistic);
  const [rate, square, step] = [meanOf(rrMs), meanOf(about), meanOf(steps)];
  return [
    ['heart_rate_bpm', half((places) => 60000 / rate(places))],
    ['rmssd_ms', half((places) => Math.sqrt(step(places)))],
    ['sdnn_ms', half((places) => Math.sqrt(square(places)))],
  ];
}
