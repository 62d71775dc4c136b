import type { SignalBlock } from '../recording/recording';
import type { Hertz } from '../units/rate';
import { digitalNumbers } from './digital-numbers';
import type { EdfRecords } from './edf-records';
import { readAhead, SLICE_BYTES } from './file-bytes';
import { firstPlace, placesOf, type RecordRun } from './record-runs';

/** Where one channel's samples lie in each record, and how a digital number becomes its value. */
export interface ChannelLayout {
  readonly firstSample: number;
  readonly samplesPerRecord: number;
  readonly digitalMin: number;
  /** Value of digitalMin, and of one digital step: uV, or the file's own unit where that is unknown. */
  readonly valueAtMin: number;
  readonly step: number;
}

/** Longest piece of a gap in one block. */
const GAP_SAMPLES = 262_144;

/**
 * The samples of an EDF or BDF file on the recording's clock: each channel on its own even grid, NaN where the runs of records
 * leave a gap.
 */
export class EdfSamples {
  constructor(
    private readonly records: EdfRecords,
    private readonly channels: readonly ChannelLayout[],
    private readonly runs: readonly RecordRun[],
  ) {}

  /** Samples [from, to) of one channel, clipped to what exists. */
  async read(channel: number, from: number, to: number): Promise<Float64Array> {
    const layout = this.layoutOf(channel);
    const { samplesPerRecord } = layout;
    const { recordDurationS } = this.records.layout;
    const start = Math.max(0, Math.floor(from));
    const end = Math.min(placesOf(this.runs, samplesPerRecord, recordDurationS), Math.floor(to));
    const samples = new Float64Array(Math.max(0, end - start)).fill(Number.NaN);
    for (const run of this.runs) {
      const first = firstPlace(run, samplesPerRecord, recordDurationS);
      const low = Math.max(start, first);
      const high = Math.min(end, first + run.records * samplesPerRecord);
      if (low >= high) continue;
      const inFile = run.firstRecord * samplesPerRecord + low - first;
      await this.fill(layout, inFile, samples.subarray(low - start, high - start));
    }
    return samples;
  }

  /** All samples of the channels in order; `firstSamples` are places on each channel's own grid. */
  async *blocks(channels: readonly number[]): AsyncGenerator<SignalBlock> {
    const layouts = channels.map((channel) => this.layoutOf(channel));
    const { recordDurationS } = this.records.layout;
    let before: { readonly run: RecordRun; readonly ends: readonly number[] } | null = null;
    for (const run of this.runs) {
      const firsts = layouts.map((one) => firstPlace(run, one.samplesPerRecord, recordDurationS));
      if (before) yield* this.emptyBlocks(before.run, run, { ends: before.ends, firsts });
      yield* this.records.long
        ? this.partsOfRecords(run, layouts, firsts)
        : this.wholeRecords(run, layouts, firsts);
      before = {
        run,
        ends: layouts.map((one, i) => firsts[i] + run.records * one.samplesPerRecord),
      };
    }
  }

  private layoutOf(channel: number): ChannelLayout {
    const layout = this.channels[channel];
    if (!layout) throw new RangeError(`no channel ${channel}`);
    return layout;
  }

  /** The gap between two runs, in pieces. */
  private *emptyBlocks(
    before: RecordRun,
    after: RecordRun,
    places: { readonly ends: readonly number[]; readonly firsts: readonly number[] },
  ): Generator<SignalBlock> {
    const { recordCount, recordDurationS } = this.records.layout;
    const endS = before.startS + before.records * recordDurationS;
    const lengths = places.firsts.map((first, i) => first - places.ends[i]);
    const pieces = Math.ceil(Math.max(0, ...lengths) / GAP_SAMPLES);
    const at = (length: number, piece: number) => Math.floor((length * piece) / pieces);
    for (let piece = 0; piece < pieces; piece += 1)
      yield {
        fromS: endS + ((after.startS - endS) * piece) / pieces,
        firstSamples: places.ends.map((end, i) => end + at(lengths[i], piece)),
        samples: lengths.map((length) =>
          new Float64Array(at(length, piece + 1) - at(length, piece)).fill(Number.NaN),
        ),
        done: after.firstRecord / recordCount,
      };
  }

  private async *wholeRecords(
    run: RecordRun,
    layouts: readonly ChannelLayout[],
    firsts: readonly number[],
  ): AsyncGenerator<SignalBlock> {
    const { recordCount, recordDurationS, recordSamples, sampleBytes } = this.records.layout;
    const end = run.firstRecord + run.records;
    for await (const { firstRecord, records, bytes } of this.records.slices(run.firstRecord, end)) {
      const before = firstRecord - run.firstRecord;
      const words = digitalNumbers(bytes, sampleBytes);
      yield {
        fromS: run.startS + before * recordDurationS,
        firstSamples: layouts.map((one, i) => firsts[i] + before * one.samplesPerRecord),
        samples: layouts.map((layout) => channelOf(words, records, recordSamples, layout)),
        done: (firstRecord + records) / recordCount,
      };
    }
  }

  /** Records longer than a slice: each is read in equal parts of its duration, channel by channel. */
  private async *partsOfRecords(
    run: RecordRun,
    layouts: readonly ChannelLayout[],
    firsts: readonly number[],
  ): AsyncGenerator<SignalBlock> {
    const { recordCount, recordDurationS } = this.records.layout;
    const parts = Math.ceil(this.records.recordBytes / SLICE_BYTES);
    const boundary = (layout: ChannelLayout, part: number) =>
      Math.floor((layout.samplesPerRecord * part) / parts);
    yield* readAhead(run.records * parts, async (index): Promise<SignalBlock> => {
      const before = Math.floor(index / parts);
      const record = run.firstRecord + before;
      const part = index % parts;
      const samples: Float64Array[] = [];
      for (const layout of layouts) {
        const from = boundary(layout, part);
        const piece = new Float64Array(boundary(layout, part + 1) - from);
        await this.fillWithinRecords(layout, record * layout.samplesPerRecord + from, piece);
        samples.push(piece);
      }
      return {
        fromS: run.startS + (before + part / parts) * recordDurationS,
        firstSamples: layouts.map(
          (one, i) => firsts[i] + before * one.samplesPerRecord + boundary(one, part),
        ),
        samples,
        done: (record + (part + 1) / parts) / recordCount,
      };
    });
  }

  /** Fills `out` with the channel's samples as they lie in the file, from its `start`th on. */
  private async fill(layout: ChannelLayout, start: number, out: Float64Array): Promise<void> {
    if (this.records.long) return this.fillWithinRecords(layout, start, out);
    const { samplesPerRecord } = layout;
    const { recordSamples, sampleBytes } = this.records.layout;
    const end = start + out.length;
    const firstRecord = Math.floor(start / samplesPerRecord);
    const slices = this.records.slices(firstRecord, Math.ceil(end / samplesPerRecord));
    for await (const slice of slices) {
      const words = digitalNumbers(slice.bytes, sampleBytes);
      for (let record = 0; record < slice.records; record += 1) {
        const at = (slice.firstRecord + record) * samplesPerRecord;
        const low = Math.max(start, at);
        const high = Math.min(end, at + samplesPerRecord);
        const word = record * recordSamples + layout.firstSample + low - at;
        scale(words, word, high - low, layout, out, low - start);
      }
    }
  }

  private async fillWithinRecords(
    layout: ChannelLayout,
    start: number,
    out: Float64Array,
  ): Promise<void> {
    for (let filled = 0; filled < out.length; ) {
      const record = Math.floor((start + filled) / layout.samplesPerRecord);
      const within = start + filled - record * layout.samplesPerRecord;
      const count = Math.min(out.length - filled, layout.samplesPerRecord - within);
      const words = await this.records.within(record, layout.firstSample + within, count);
      scale(words, 0, count, layout, out, filled);
      filled += count;
    }
  }
}

/** Sampling rate of a channel (Kemp 1992): samples per record over the record's duration. */
export const rateOf = (samplesPerRecord: number, recordDurationS: number): Hertz =>
  samplesPerRecord / recordDurationS;

function channelOf(
  words: Int16Array | Int32Array,
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
  words: Int16Array | Int32Array,
  from: number,
  count: number,
  { digitalMin, valueAtMin, step }: ChannelLayout,
  out: Float64Array,
  at: number,
): void {
  for (let i = 0; i < count; i += 1)
    out[at + i] = (words[from + i] - digitalMin) * step + valueAtMin;
}
