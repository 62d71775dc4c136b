import { digitalNumbers, type SampleBytes } from './digital-numbers';
import { readAhead, readBytes, SLICE_BYTES } from './file-bytes';

/** The records of a file, all checked to be inside it. */
export interface RecordLayout {
  readonly headerBytes: number;
  readonly recordCount: number;
  /** Samples of all signals in one record. */
  readonly recordSamples: number;
  readonly recordDurationS: number;
  readonly sampleBytes: SampleBytes;
}

/** Some whole records as bytes. */
export interface RecordSlice {
  readonly firstRecord: number;
  readonly records: number;
  readonly bytes: Uint8Array<ArrayBuffer>;
}

/**
 * The records of an EDF or BDF file: read by slices of about 4 MB with two ahead, never whole. Rejects with a Refusal where
 * the file can no longer be read.
 */
export class EdfRecords {
  /** True where one record is longer than a slice, and is better read in parts. */
  readonly long: boolean;
  readonly recordBytes: number;

  constructor(
    private readonly file: Blob,
    private readonly fileName: string,
    readonly layout: RecordLayout,
  ) {
    this.recordBytes = layout.sampleBytes * layout.recordSamples;
    this.long = this.recordBytes > SLICE_BYTES;
  }

  /** Records [from, to) in slices of whole records, at least one record each. */
  slices(from: number, to: number): AsyncGenerator<RecordSlice> {
    const { recordBytes } = this;
    const each = Math.max(1, Math.floor(SLICE_BYTES / recordBytes));
    return readAhead(Math.ceil((to - from) / each), async (index) => {
      const firstRecord = from + index * each;
      const records = Math.min(each, to - firstRecord);
      const start = this.layout.headerBytes + firstRecord * recordBytes;
      const bytes = await readBytes(this.file, this.fileName, start, start + records * recordBytes);
      return { firstRecord, records, bytes };
    });
  }

  /** `count` digital numbers of one record, from its sample `sample` on. */
  async within(record: number, sample: number, count: number): Promise<Int16Array | Int32Array> {
    const { headerBytes, sampleBytes } = this.layout;
    const at = headerBytes + record * this.recordBytes + sampleBytes * sample;
    const bytes = await readBytes(this.file, this.fileName, at, at + sampleBytes * count);
    return digitalNumbers(bytes, sampleBytes);
  }
}
