import { isMeal, type Phase } from '../recording/phase';
import type { Epoch } from '../recording/rhythm';
import type { RhythmBands } from '../recording/settings';
import type { Interval } from '../recording/span';
import { formatClock } from '../units/time';
import { rangeOf, type TrendRow } from './pictures/trend-rows';
import type { WaveExcerpt } from './pictures/waves-picture';

/** What the spectrogram shows: where DF runs in each phase, and how much is hatched. */
export function spectrogramWords(
  epochs: readonly Epoch[],
  phases: readonly Phase[],
  { lowCpm, highCpm }: RhythmBands,
  spoiled: readonly Interval[],
): string {
  const byPhase = phases
    .filter((phase) => !isMeal(phase))
    .map(({ name }) => `${name} ${dfRange(epochs.filter(({ phase }) => phase === name))}`);
  const minutes = spoiled.reduce((sum, { fromS, toS }) => sum + (toS - fromS), 0) / 60;
  return (
    `Spectrogram of the slow wave, ${lowCpm} to ${highCpm} cpm. Dominant frequency: ${byPhase.join('; ')}. ` +
    `Hatched as spoiled: ${minutes.toFixed(1)} min.`
  );
}

function dfRange(epochs: readonly Epoch[]): string {
  const df = epochs
    .flatMap(({ kept, dfCpm, rhythm }) =>
      kept && dfCpm !== null && rhythm !== 'none' && rhythm !== 'undecided' ? [dfCpm] : [],
    )
    .sort((a, b) => a - b);
  if (df.length === 0) return 'none';
  return `from ${df[0].toFixed(2)} to ${df[df.length - 1].toFixed(2)} cpm`;
}

/** The slow wave's excerpts with the height each reaches. */
export function wavesWords(excerpts: readonly WaveExcerpt[]): string {
  const each = excerpts.map(({ name, fromS, toS, signal }) => {
    let low = 0;
    let high = 0;
    for (let i = 0; i < signal.timesS.length; i += 1) {
      if (!(signal.timesS[i] >= fromS && signal.timesS[i] <= toS)) continue;
      low = Math.min(low, signal.low[i]);
      high = Math.max(high, signal.high[i]);
    }
    return `${name}, ${formatClock(fromS)} to ${formatClock(toS)}: between ${low.toFixed(0)} and ${high.toFixed(0)} µV`;
  });
  return `Slow wave. ${each.join('; ')}.`;
}

/** The range each series of the trend runs through. */
export function trendWords(rows: readonly TrendRow[]): string {
  const each = rows.flatMap(({ name, unit, points }) => {
    const range = rangeOf(points);
    return range ? [`${name} from ${range[0]} to ${range[1]} ${unit}`] : [];
  });
  return `Over the study: ${each.join('; ')}.`;
}
