import type { LimitsRange } from '../recording/evidence/ranges';
import { type Figures, numberOf } from '../recording/figure';
import { BAND_PRESETS, bandsName, type RhythmBands, type Settings } from '../recording/settings';
import type { Seconds } from '../units/time';
import { stomachFigures } from './figures';
import { epochsInSteps, type SlowWaveRhythmOptions } from './slow-wave-rhythm';
import { createStomachMemory, type StomachMemory } from './stomach-memory';

/** Lengths of epochs in use. */
const LENGTHS_S: readonly Seconds[] = [180, 240, 300];

/** Percentages that hang on limits and epoch length. */
const KEYS = [
  'time_normo_pct',
  'time_brady_pct',
  'time_tachy_pct',
  'time_none_pct',
  'time_mixed_pct',
  'time_undecided_pct',
  'share_brady_pct',
  'share_normo_pct',
  'share_tachy_pct',
] as const;

/** What trying limits leaves for the next time: windows by epoch length, judged epochs by length and limits. */
export type LimitsMemory = Map<string, StomachMemory>;

interface NamedPart {
  readonly name: string;
  readonly fromS: Seconds;
  readonly toS: Seconds;
}

/** The ranges by limits of one part's percentages, by key. */
export type PartLimits = Readonly<Record<string, LimitsRange>>;

const different = <T>(values: readonly T[], nameOf: (value: T) => string): readonly T[] => [
  ...new Map(values.map((value) => [nameOf(value), value])).values(),
];

function variantsOf({ rhythmBands, epoch }: Settings) {
  const lengths = different([epoch.lengthS, ...LENGTHS_S], String);
  const bands = different([rhythmBands, ...BAND_PRESETS], bandsName);
  return { lengths, bands };
}

const wordsOf = (bands: RhythmBands, lengthS: Seconds): string =>
  `${bandsName(bands)}, epochs of ${Number((lengthS / 60).toFixed(2))} min`;

/**
 * The lowest and highest of each percentage under every published set of limits (BAND_PRESETS) and under epochs of 3, 4 and
 * 5 min, all combinations, beside the settings in force; by the name of the part. Each is computed from the start, as the
 * printed figures are. Yields how far it is. Percentages that a variant withholds leave it out. A memory kept from call to call
 * spares what has not changed; results are the same without one.
 */
export function* limitsRanges(
  options: Omit<SlowWaveRhythmOptions, 'memory'>,
  parts: readonly NamedPart[],
  kept: LimitsMemory | null,
): Generator<number, ReadonlyMap<string, PartLimits>> {
  const { settings, spoiled } = options;
  const { lengths, bands } = variantsOf(settings);
  const found = new Map<string, Map<string, LimitsRange>>();
  const variants = lengths.length * bands.length;
  let done = 0;
  for (const lengthS of lengths) {
    const memories: LimitsMemory = kept ?? new Map();
    const windows = memoryAt(memories, String(lengthS));
    for (const rhythmBands of bands) {
      const memory = memoryAt(memories, wordsOf(rhythmBands, lengthS));
      Object.assign(memory, { windows: windows.windows, halfWindows: windows.halfWindows });
      const own = { ...settings, rhythmBands, epoch: { ...settings.epoch, lengthS } };
      const steps = epochsInSteps({ ...options, settings: own, memory });
      let step = steps.next();
      for (; !step.done; step = steps.next()) yield done / variants;
      Object.assign(windows, { windows: memory.windows, halfWindows: memory.halfWindows });
      done += 1;
      for (const part of parts) {
        const { figures } = stomachFigures({
          analysis: step.value,
          phase: part,
          spoiled,
          settings: own,
        });
        const ranges = found.get(part.name) ?? new Map<string, LimitsRange>();
        found.set(part.name, ranges);
        widen(ranges, figures, wordsOf(rhythmBands, lengthS));
        yield done / variants;
      }
    }
  }
  return new Map([...found].map(([name, ranges]) => [name, Object.fromEntries(ranges)]));
}

function memoryAt(memories: LimitsMemory, name: string): StomachMemory {
  const memory = memories.get(name) ?? createStomachMemory();
  memories.set(name, memory);
  return memory;
}

function widen(ranges: Map<string, LimitsRange>, figures: Figures, by: string): void {
  for (const key of KEYS) {
    const value = numberOf(figures[key]);
    if (Number.isNaN(value)) continue;
    const { low, high, lowBy, highBy } = ranges.get(key) ?? {
      low: value,
      high: value,
      lowBy: by,
      highBy: by,
    };
    ranges.set(key, {
      low: Math.min(low, value),
      high: Math.max(high, value),
      lowBy: value < low ? by : lowBy,
      highBy: value > high ? by : highBy,
    });
  }
}
