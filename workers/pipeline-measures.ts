import { measureQrs } from '../src/heart/qrs-quality';
import type { SignalSource } from '../src/recording/recording';
import { heartCandidates, type QrsMeasure } from './propose-roles';

/** Stretches of each candidate on which the heartbeat is measured, as parts of the study. */
const MEASURED_AT = [0.15, 0.5, 0.85];
const MEASURED_S = 12;
/** Rate at which the heartbeat is measured for that; its band ends far below. */
const MEASURED_HZ = 250;

/** How clearly a heartbeat stands in each channel that may carry one: the middle of a few stretches. */
export async function measureHeartbeats(source: SignalSource): Promise<readonly QrsMeasure[]> {
  const measures: QrsMeasure[] = [];
  for (const channel of heartCandidates(source.recording.channels)) {
    const length = Math.round(MEASURED_S * channel.rateHz);
    const every = Math.max(1, Math.floor(channel.rateHz / MEASURED_HZ));
    const parts = [];
    for (const part of MEASURED_AT) {
      const from = Math.max(0, Math.floor(part * channel.sampleCount - length / 2));
      const samples = await source.read(channel.index, from, from + length);
      parts.push(measureQrs(meansOf(samples, every), channel.rateHz / every));
    }
    const [middle] = parts.sort((a, b) => a.quality - b.quality).slice(parts.length >> 1);
    measures.push({ channel: channel.index, ...middle });
  }
  return measures;
}

/** Means of so many samples each; a rest is left out. */
function meansOf(samples: Float64Array, every: number): Float64Array {
  if (every === 1) return samples;
  return Float64Array.from({ length: Math.floor(samples.length / every) }, (_, i) => {
    let sum = 0;
    for (let j = i * every; j < (i + 1) * every; j += 1) sum += samples[j];
    return sum / every;
  });
}
