import { exp } from '../numeric/elementary';
import type { Cpm } from '../units/rate';
import type { Seconds } from '../units/time';
import type { SpectrumPeak } from './dominant-peak';
import type { OverBackground } from './over-background';
import type { SharedWindows } from './shared-windows';
import { EULER, type SmoothLevel } from './smooth-level';

/** A window of a row in which none shares a sample with another; place counts windows from the epoch's own, which is 0. */
export interface RowWindow {
  readonly place: number;
  readonly over: OverBackground;
}

/** An epoch and the independent windows beside it in its phase, by place. */
export interface WindowRow {
  readonly windows: readonly RowWindow[];
  readonly binCpm: number;
  /** Background of the row over its windows' own lines, as a natural logarithm. */
  readonly levelAt: (cpm: Cpm) => number;
}

/** Degree of the curve in log frequency that noise of a row may have over its windows' own lines. */
const CURVE_DEGREE = 3;
/** What stands so far above the curve is a line; the mean of fewer windows scatters more. */
const LINE_LOG = { one: 3, least: 0.2 };
/** Where the flanks of a place lie, for 240 s: beyond the main lobe of a line there. */
const FLANK = { nearCpm: 0.4, farCpm: 1.3, leastBins: 4, lowestCpm: 0.45 };
const FLANK_LENGTH_S = 240;
/** The top of a hump stands higher than its flanks: so many times as far over the curve (in logarithms; measured). */
const TOP_OVER_FLANKS = 1.4;
/** Half of the most by which the higher flank may lift the background over the lower one: more is another line. */
const MOST_ABOVE_LOWER = 0.6;

/**
 * The background of a row over its windows' own lines, as a natural logarithm by frequency: a cubic
 * in log frequency through the mean of their logarithms, lifted where the flanks on both sides of a
 * place are higher. What is as wide as its flanks is no line but a hump.
 */
function rowLevel(
  windows: readonly RowWindow[],
  {
    binCpm,
    lengthS,
    smooth,
  }: { readonly binCpm: number; readonly lengthS: Seconds; readonly smooth: SmoothLevel },
): (cpm: Cpm) => number {
  const mean = new Float64Array(windows[0].over.log.length);
  for (const { over } of windows)
    for (let k = 0; k < mean.length; k += 1) mean[k] += over.log[k] / windows.length;
  const most = LINE_LOG.one / Math.sqrt(windows.length) + LINE_LOG.least;
  const curve = smooth.through(mean, CURVE_DEGREE, most);
  const scale = FLANK_LENGTH_S / lengthS;
  const side = (lowCpm: Cpm, highCpm: Cpm): number | null => {
    const from = Math.ceil(Math.max(FLANK.lowestCpm, lowCpm) / binCpm);
    const to = Math.min(mean.length - 1, Math.floor(highCpm / binCpm));
    if (to - from + 1 < FLANK.leastBins) return null;
    let sum = 0;
    for (let k = from; k <= to; k += 1) sum += mean[k] - curve[k];
    return sum / (to - from + 1);
  };
  return (cpm) => {
    const [near, far] = [FLANK.nearCpm * scale, FLANK.farCpm * scale];
    const below = side(cpm - far, cpm - near);
    const above = side(cpm + near, cpm + far);
    const flanks =
      below === null || above === null
        ? (below ?? above ?? 0)
        : Math.min(below, above) + Math.min(MOST_ABOVE_LOWER, Math.abs(below - above) / 2);
    return curve[Math.round(cpm / binCpm)] + EULER + Math.max(0, TOP_OVER_FLANKS * flanks);
  };
}

/** The background of the row at a peak of the epoch, uV2/Hz. */
export function leastBackground(
  row: WindowRow,
  density: Float64Array,
  { bin, cpm }: SpectrumPeak,
): number {
  const own = row.windows.find(({ place }) => place === 0);
  return own ? density[bin] * exp(row.levelAt(cpm) - own.over.log[bin]) : 0;
}

/** Windows of a row, the epoch's own among them, from which its background can be told. */
const FEWEST = 3;

/** The row of an epoch; null where it holds too few windows. */
export function rowOf(
  windows: readonly RowWindow[],
  shared: Pick<SharedWindows, 'binCpm' | 'smooth' | 'options'>,
): WindowRow | null {
  if (windows.length < FEWEST) return null;
  const { binCpm, smooth, options } = shared;
  let level: ((cpm: Cpm) => number) | null = null;
  return {
    windows,
    binCpm,
    levelAt(cpm) {
      level ??= rowLevel(windows, { binCpm, smooth, lengthS: options.lengthS });
      return level(cpm);
    },
  };
}
