import { minMaxColumns } from '../src/numeric/min-max-columns';
import { leadChannels } from '../src/recording/lead';
import type { SignalSource } from '../src/recording/recording';
import type { Columns, ColumnsRequest } from './analysis-api';
import { leadSamples } from './lead-pass';
import { leadChannel, type SignalStore } from './pipeline-signals';

/** Wider windows than this are drawn from the pyramid, narrower ones from the file's own samples. */
const FROM_PYRAMID_S = 60;
/** Without a pyramid, wider windows than this many samples wait for it. */
const MOST_SAMPLES = 2_500_000;

/** Columns of one drawn signal for a pane, from what is kept of the lead or else from the file's own samples. */
export async function columnsOf(
  source: SignalSource,
  signals: SignalStore,
  request: ColumnsRequest,
): Promise<Columns> {
  const { lead, signal, fromS, toS } = request;
  if (!(toS > fromS) || !(request.columns >= 1)) throw new Error('columns want a width');
  const kept = signals.get(lead);
  const slow = signals.drawn(lead);
  if (signal === 'slow-wave' && slow)
    return { request, ...cut(slow.slowWave, slow.rateHz, request) };
  if (signal === 'heartbeat' && kept?.heart)
    return { request, ...cut(kept.heart.output.heartbeat, kept.heart.output.rateHz, request) };
  if (signal !== 'recorded') return { request, ...cut([], 1, request) };
  if (kept && toS - fromS > FROM_PYRAMID_S)
    return { request, ...kept.pyramid.columns(fromS, toS, request.columns) };
  const { rateHz } = leadChannel(source.recording, lead);
  if ((toS - fromS) * rateHz > MOST_SAMPLES) return { request, ...cut([], 1, request) };
  const first = Math.max(0, Math.floor(fromS * rateHz) - 1);
  const read = new Map<number, Float64Array>();
  for (const channel of leadChannels(lead))
    read.set(channel, await source.read(channel, first, Math.ceil(toS * rateHz) + 2));
  const samples = leadSamples(lead, (channel) => {
    const found = read.get(channel);
    if (!found) throw new Error(`channel ${channel} was not read`);
    return found;
  });
  return { request, ...minMaxColumns(samples, rateHz, first, fromS, toS, request.columns) };
}

const cut = (
  samples: ArrayLike<number>,
  rateHz: number,
  { fromS, toS, columns: n }: ColumnsRequest,
) => minMaxColumns(samples, rateHz, 0, fromS, toS, n);
