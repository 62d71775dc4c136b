import type { SignalBlock } from '../recording/recording';
import type { Hertz } from '../units/rate';
import { readAhead, readBytes, SLICE_BYTES } from './file-bytes';

/** Where one channel's samples lie in each record, and how a digital number becomes its value. */
export interface ChannelLayout {
  readonly firstSample: number;
  readonly samplesPerRecord: number;
  readonly digitalMin: number;
  /** Value of digitalMin, and of one digital step: uV, or the file's own unit where that is unknown. */
  readonly valueAtMin: number;
  readonly step: number;
}

/** The records of a file, all checked to be inside it. */
export interface RecordLayout {
  readonly headerBytes: number;
  readonly recordCount: number;
  readonly recordSamples: number;
  readonly recordDurationS: number;
}

/** Some whole records as 16-bit numbers. */
export interface RecordSlice {
  readonly firstRecord: number;
  readonly records: number;
  readonly words: Int16Array;
}

/**
 * The sample part of an EDF file: read by slices of about 4 MB with two ahead, never whole. Samples are little-endian, as
 * are all machines that run this. Rejects with a Refusal where the file can no longer be read.
 */
export class EdfSamples {
  constructor(
    private readonly file: Blob,
    private readonly fileName: string,
    private readonly layout: RecordLayout,
    private readonly channels: readonly ChannelLayout[],
  ) {}

  /** Records [from, to) in slices of whole records, at least one record each. */
  slices(from: number, to: number): AsyncGenerator<RecordSlice> {
    const { headerBytes, recordSamples } = this.layout;
    const recordBytes = 2 * recordSamples;
    const each = Math.max(1, Math.floor(SLICE_BYTES / recordBytes));
    return readAhead(Math.ceil((to - from) / each), async (index) => {
      const firstRecord = from + index * each;
      const records = Math.min(each, to - firstRecord);
      const start = headerBytes + firstRecord * recordBytes;
      const bytes = await readBytes(this.file, this.fileName, start, start + records * recordBytes);
      return { firstRecord, records, words: new Int16Array(bytes.buffer) };
    });
  }

  /** Samples [from, to) of one channel, clipped to what exists. */
  async read(channel: number, from: number, to: number): Promise<Float64Array> {
    const layout = this.channels[channel];
    if (!layout) throw new RangeError(`no channel ${channel}`);
    const { samplesPerRecord } = layout;
    const start = Math.max(0, Math.floor(from));
    const end = Math.min(samplesPerRecord * this.layout.recordCount, Math.floor(to));
    const samples = new Float64Array(Math.max(0, end - start));
    if (samples.length === 0) return samples;
    if (2 * this.layout.recordSamples > SLICE_BYTES) {
      await this.readWithinRecords(layout, start, samples);
      return samples;
    }
    const firstRecord = Math.floor(start / samplesPerRecord);
    for await (const slice of this.slices(firstRecord, Math.ceil(end / samplesPerRecord)))
      for (let record = 0; record < slice.records; record += 1) {
        const at = (slice.firstRecord + record) * samplesPerRecord;
        const low = Math.max(start, at);
        const high = Math.min(end, at + samplesPerRecord);
        const word = record * this.layout.recordSamples + layout.firstSample + low - at;
        scale(slice.words, word, high - low, layout, samples, low - start);
      }
    return samples;
  }

  /** All samples of the channels in order; `firstSamples` are indexes in each channel's own rate. */
  async *blocks(channels: readonly number[]): AsyncGenerator<SignalBlock> {
    const layouts = channels.map((channel) => {
      const layout = this.channels[channel];
      if (!layout) throw new RangeError(`no channel ${channel}`);
      return layout;
    });
    const { recordCount, recordDurationS, recordSamples } = this.layout;
    if (2 * recordSamples > SLICE_BYTES) {
      yield* this.partsOfRecords(layouts);
      return;
    }
    for await (const { firstRecord, records, words } of this.slices(0, recordCount))
      yield {
        fromS: firstRecord * recordDurationS,
        firstSamples: layouts.map((layout) => firstRecord * layout.samplesPerRecord),
        samples: layouts.map((layout) => channelOf(words, records, recordSamples, layout)),
        done: (firstRecord + records) / recordCount,
      };
  }

  /** Records longer than a slice: each is read in equal parts of its duration, channel by channel. */
  private async *partsOfRecords(layouts: readonly ChannelLayout[]): AsyncGenerator<SignalBlock> {
    const { recordCount, recordDurationS, recordSamples } = this.layout;
    const parts = Math.ceil((2 * recordSamples) / SLICE_BYTES);
    const total = recordCount * parts;
    const boundary = (layout: ChannelLayout, part: number) =>
      Math.floor((layout.samplesPerRecord * part) / parts);
    yield* readAhead(total, async (index): Promise<SignalBlock> => {
      const record = Math.floor(index / parts);
      const part = index % parts;
      const samples: Float64Array[] = [];
      for (const layout of layouts) {
        const from = boundary(layout, part);
        const piece = new Float64Array(boundary(layout, part + 1) - from);
        await this.readWithinRecords(layout, record * layout.samplesPerRecord + from, piece);
        samples.push(piece);
      }
      return {
        fromS: (record + part / parts) * recordDurationS,
        firstSamples: layouts.map((one) => record * one.samplesPerRecord + boundary(one, part)),
        samples,
        done: (index + 1) / total,
      };
    });
  }

  /** Fills `out` with the channel's samples from `start` on, one read a record. */
  private async readWithinRecords(
    layout: ChannelLayout,
    start: number,
    out: Float64Array,
  ): Promise<void> {
    const { headerBytes, recordSamples } = this.layout;
    for (let filled = 0; filled < out.length; ) {
      const record = Math.floor((start + filled) / layout.samplesPerRecord);
      const within = start + filled - record * layout.samplesPerRecord;
      const count = Math.min(out.length - filled, layout.samplesPerRecord - within);
      const at = headerBytes + 2 * (record * recordSamples + layout.firstSample + within);
      const bytes = await readBytes(this.file, this.fileName, at, at + 2 * count);
      scale(new Int16Array(bytes.buffer), 0, count, layout, out, filled);
      filled += count;
    }
  }
}

/** Sampling rate of a channel (Kemp 1992): samples per record over the record's duration. */
export const rateOf = (samplesPerRecord: number, recordDurationS: number): Hertz =>
  samplesPerRecord / recordDurationS;

function channelOf(
  words: Int16Array,
  records: number,
  recordSamples: number,
  layout: ChannelLayout,
): Float64Array {
  const { samplesPerRecord, firstSample } = layout;
  const out = new Float64Array(records * samplesPerRecord);
  for (let record = 0; record < records; record += 1)
    scale(
      words,
      record * recordSamples + firstSample,
      samplesPerRecord,
      layout,
      out,
      record * samplesPerRecord,
    );
  return out;
}

function scale(
  words: Int16Array,
  from: number,
  count: number,
  { digitalMin, valueAtMin, step }: ChannelLayout,
  out: Float64Array,
  at: number,
): void {
  for (let i = 0; i < count; i += 1)
    out[at + i] = (words[from + i] - digitalMin) * step + valueAtMin;
}
