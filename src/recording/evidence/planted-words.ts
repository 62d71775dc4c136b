import type { EvidenceLine } from './evidence-line';
import type {
  OverStretches,
  PlantedBeats,
  PlantedEvidence,
  PlantedHeart,
  PlantedRate,
  PlantedSlow,
  PlantedWave,
  SmallestWave,
} from './planted';

/** A check is repeated over at least so many stretches where the study is long enough. */
const WANTED_STRETCHES = 8;

/** A height as it is written: two significant digits below 100 uV, whole numbers above. */
export function heightWords(uv: number): string {
  return `${uv < 10 ? uv.toFixed(1) : uv.toFixed(0)} µV`;
}

export const rateWords = (rate: PlantedRate): string =>
  rate.kind === 'drift' ? 'drift 1.5 to 5.5 cpm' : `${rate.cpm} cpm`;

/** "31 of 31 epochs" */
export const rightWords = ({ right, epochs }: PlantedWave): string =>
  `${right} of ${epochs} epochs`;

/** A number with a fixed count of decimals, never "-0". */
function fixed(value: number, decimals: number): string {
  const text = value.toFixed(decimals);
  return /^-0(\.0*)?$/.test(text) ? text.slice(1) : text;
}

/** A value over the stretches: its median with the least and the greatest; a dash of none. */
export function spreadWords(value: OverStretches | null, decimals: number): string {
  if (!value) return '—';
  const { median, least, most } = value;
  return `${fixed(median, decimals)} (${fixed(least, decimals)} to ${fixed(most, decimals)})`;
}

/** How small a wave of one rate this recording could show. */
export const smallestWords = ({ cpm, uv, upToUv, mostPct }: SmallestWave): string =>
  uv === null
    ? `${cpm} cpm: not even ${heightWords(upToUv)} (${mostPct} % of epochs)`
    : `${cpm} cpm: ${heightWords(uv)}`;

const fewWords = (stretches: number): string | null =>
  stretches < WANTED_STRETCHES
    ? `${stretches === 1 ? 'One stretch' : `${stretches} stretches`} only: the study is short`
    : null;

/** What all steady waves of one height say together. */
function togetherWords(waves: readonly PlantedWave[]): string {
  const steady = waves.filter(({ rate }) => rate.kind === 'steady');
  const sum = (value: (one: PlantedWave) => number) =>
    steady.reduce((all, one) => all + value(one), 0);
  const [right, epochs] = [sum((one) => one.right), sum((one) => one.epochs)];
  const snr = steady.map(({ snrDb }) => (snrDb ? snrDb.median.toFixed(0) : '—')).join(', ');
  return `${heightWords(steady[0].uv)}: rhythm right in ${Math.round((100 * right) / epochs)} % of ${epochs} epochs, drawn ${snr} dB over the rest at ${steady.map(({ rate }) => (rate.kind === 'steady' ? rate.cpm : '')).join(', ')} cpm`;
}

function slowLines(slow: PlantedSlow): readonly EvidenceLine[] {
  const heights = [...new Set(slow.waves.map(({ uv }) => uv))];
  const own =
    slow.ownFrom === 'rhythm'
      ? `the first is this study’s own height`
      : `no rhythm of its own: the first is the height of its highest peaks`;
  const words = heights.map((uv) => togetherWords(slow.waves.filter((one) => one.uv === uv)));
  const missed = slow.smallest.some(({ uv }) => uv === null);
  return [
    {
      name: 'Planted waves',
      words: `${words.join('; ')} (${own}).`,
      mark: fewWords(slow.stretches),
    },
    {
      name: 'Smallest wave',
      words: `Would have been found in 95 % of ${slow.epochs} epochs: ${slow.smallest.map(smallestWords).join('; ')}.`,
      mark: missed ? 'Where no height is given, a missing rhythm says nothing' : null,
    },
  ];
}

function beatWords({
  share,
  sensitivityPct,
  predictivityPct,
  timingMs,
  rmssdErrorMs,
}: PlantedBeats) {
  const percent = (value: OverStretches | null) => (value ? `${value.median.toFixed(1)} %` : '—');
  const found = `${share === 1 ? 'own height' : 'a quarter of it'}: ${percent(sensitivityPct)} found, ${percent(predictivityPct)} of those found are real`;
  if (!timingMs) return found;
  const rmssd = rmssdErrorMs ? `, RMSSD off by ${fixed(rmssdErrorMs.median, 1)} ms` : '';
  return `${found}, times within ${timingMs.median.toFixed(1)} ms${rmssd}`;
}

const heartLines = (heart: PlantedHeart): readonly EvidenceLine[] => [
  {
    name: 'Planted heartbeats',
    words: `${heart.beats.map(beatWords).join('; ')}.`,
    mark: fewWords(heart.stretches),
  },
];

/** What the trust section of Findings and the report say of it. */
export const plantedLines = ({ slow, heart }: PlantedEvidence): readonly EvidenceLine[] => [
  ...(slow.kind === 'planted'
    ? slowLines(slow)
    : [{ name: 'Planted waves', words: `Not made. ${slow.reason}`, mark: null }]),
  ...(heart.kind === 'planted'
    ? heartLines(heart)
    : [{ name: 'Planted heartbeats', words: `Not made. ${heart.reason}`, mark: null }]),
];

/** What stands beside "no rhythm": how large a wave would have been found; null where that is not known. */
export function besideNoneWords({ slow }: PlantedEvidence): string | null {
  if (slow.kind !== 'planted') return null;
  const shown = slow.smallest.map(({ cpm, uv, upToUv }) =>
    uv === null
      ? `not even one of ${heightWords(upToUv)} at ${cpm} cpm`
      : `one of ${heightWords(uv)} at ${cpm} cpm`,
  );
  const own = slow.ownFrom === 'rhythm' ? `; its own is ${heightWords(slow.ownUv)}` : '';
  return `A wave would have been found in 95 % of epochs: ${shown.join(', ')} (peak height, planted in this recording’s own noise${own}).`;
}
