import { nanRuns } from '../numeric/nan-runs';
import type { Channel } from '../recording/channel';
import type { Gap, Recording, SignalSource } from '../recording/recording';
import type { Hertz } from '../units/rate';

const BLOCK_SAMPLES = 262_144;

/** Samples that are all in memory, behind the same door as those that stay in the file. All have the recording's rate. */
export function memorySource(
  recording: Recording,
  signals: readonly Float64Array[],
  rateHz: Hertz,
): SignalSource {
  const signal = (channel: number): Float64Array => {
    const samples = signals[channel];
    if (!samples) throw new RangeError(`no channel ${channel}`);
    return samples;
  };
  return {
    recording,
    async read(channel, from, to) {
      const start = Math.max(0, Math.floor(from));
      return signal(channel).slice(start, Math.max(start, Math.floor(to)));
    },
    async *blocks(channels) {
      const wanted = channels.map(signal);
      const length = signals[0]?.length ?? 0;
      for (let at = 0; at < length; at += BLOCK_SAMPLES)
        yield {
          fromS: at / rateHz,
          firstSamples: wanted.map(() => at),
          samples: wanted.map((samples) => samples.slice(at, at + BLOCK_SAMPLES)),
          done: Math.min(1, (at + BLOCK_SAMPLES) / length),
        };
    },
  };
}

/** Runs of NaN of every channel as gaps; a run that all channels share is one gap of all of them (channel null). */
export function gapsOf(signals: readonly Float64Array[], rateHz: Hertz): readonly Gap[] {
  const runs = signals.map(nanRuns);
  const keys = runs.map((list) => new Set(list.map(({ from, to }) => `${from}-${to}`)));
  const gaps: Gap[] = [];
  runs.forEach((list, channel) => {
    for (const { from, to } of list) {
      const isShared = keys.every((set) => set.has(`${from}-${to}`));
      if (isShared && channel > 0) continue;
      gaps.push({ channel: isShared ? null : channel, fromS: from / rateHz, toS: to / rateHz });
    }
  });
  return gaps.sort((a, b) => a.fromS - b.fromS || (a.channel ?? -1) - (b.channel ?? -1));
}

/** A channel of a text file: no digitiser, no filters known. */
export function textChannel(
  index: number,
  { label, unit }: Pick<Channel, 'label' | 'unit'>,
  rateHz: Hertz,
  sampleCount: number,
): Channel {
  return {
    index,
    label,
    rateHz,
    sampleCount,
    unit,
    stepUv: 0,
    railsUv: null,
    transducer: '',
    prefilter: { kind: 'unknown', text: '' },
  };
}
