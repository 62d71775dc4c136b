import { type Lead, leadChannels } from '../src/recording/lead';
import type { SignalSource } from '../src/recording/recording';
import type { Job } from './job';

/** Longest piece given to a consumer at once, so that other messages get their turn in between. */
const PIECE_SAMPLES = 16384;

/** Anything that takes a lead's samples in order. */
export interface LeadConsumer {
  push(block: Float64Array): void;
}

export interface LeadToRead {
  readonly lead: Lead;
  readonly consumers: readonly LeadConsumer[];
}

/** Reads the file once, in order, and gives each lead's samples (uV, NaN in gaps) to its consumers. */
export async function passOverLeads(
  source: SignalSource,
  leads: readonly LeadToRead[],
  job: Job,
  step: string,
): Promise<void> {
  const channels = [...new Set(leads.flatMap(({ lead }) => leadChannels(lead)))];
  for await (const block of source.blocks(channels)) {
    const samplesOf = (channel: number) => block.samples[channels.indexOf(channel)];
    for (const { lead, consumers } of leads) {
      const samples = leadSamples(lead, samplesOf);
      for (let from = 0; from < samples.length; from += PIECE_SAMPLES) {
        const piece = samples.subarray(from, from + PIECE_SAMPLES);
        for (const consumer of consumers) consumer.push(piece);
        await job.breathe();
      }
    }
    job.progress(step, block.done);
  }
}

/** Samples of a lead over one stretch, from the samples of its channels over the same stretch. */
export function leadSamples(
  lead: Lead,
  samplesOf: (channel: number) => Float64Array,
): Float64Array {
  if (lead.kind === 'channel') return samplesOf(lead.channel);
  const minus = samplesOf(lead.minus);
  return samplesOf(lead.plus).map((value, i) => value - minus[i]);
}

/** Samples [from, to) of a lead, read from the file. */
export async function readLead(
  source: SignalSource,
  lead: Lead,
  from: number,
  to: number,
): Promise<Float64Array> {
  const channels = leadChannels(lead);
  const read: Float64Array[] = [];
  for (const channel of channels) read.push(await source.read(channel, from, to));
  return leadSamples(lead, (channel) => read[channels.indexOf(channel)]);
}
