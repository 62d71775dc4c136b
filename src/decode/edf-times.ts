import type { Annotation, FoundInFile } from '../recording/recording';
import { parseRecordAnnotations } from './edf-annotations';
import type { EdfHeader } from './edf-header';
import type { EdfSamples } from './edf-samples';
import { refusal } from './refusals';

/** What the annotation signals say: annotations as written, and when the first sample was taken. */
export interface FileTimes {
  /** Onsets are seconds from the file's start time. */
  readonly annotations: readonly Annotation[];
  /** Seconds from the file's start time to the first sample. */
  readonly firstOnsetS: number;
}

interface FileTimesInput {
  readonly header: EdfHeader;
  readonly samples: EdfSamples;
  readonly fileName: string;
  readonly format: 'EDF' | 'EDF+C';
}

interface Counts {
  loose: number;
  lost: number;
  untimed: number;
}

/**
 * Reads every annotation signal of the file. The first list of the first annotation signal keeps each record's time; records
 * whose times do not follow one another within a sample of the fastest signal are refused, as the gaps of EDF+D are.
 */
export async function readFileTimes(
  input: FileTimesInput,
  found: FoundInFile[],
): Promise<FileTimes> {
  const { header, samples, format } = input;
  const signals = header.signals.filter((signal) => signal.annotations);
  if (signals.length === 0) {
    if (format === 'EDF+C')
      found.push({
        severity: 'warning',
        what: 'the file calls itself EDF+ and has no annotation signal; records are taken as following one another',
        place: null,
      });
    return { annotations: [], firstOnsetS: 0 };
  }
  const annotations: Annotation[] = [];
  const counts: Counts = { loose: 0, lost: 0, untimed: 0 };
  const clock = new RecordClock(input);
  for await (const { firstRecord, records, words } of samples.slices(0, header.recordCount))
    for (let i = 0; i < records; i += 1)
      signals.forEach((signal, which) => {
        const at = i * header.recordSamples + signal.firstSample;
        const bytes = new Uint8Array(words.buffer, 2 * at, 2 * signal.samplesPerRecord);
        const record = parseRecordAnnotations(bytes);
        for (const one of record.annotations) annotations.push(one);
        counts.loose += record.loose;
        counts.lost += record.lost;
        if (which > 0) return;
        if (record.timeKeepingS === null) counts.untimed += 1;
        else clock.check(firstRecord + i, record.timeKeepingS);
      });
  nameCounts(counts, format, header.recordCount, found);
  if (clock.firstOnsetS < 0 || clock.firstOnsetS >= 1)
    found.push({
      severity: 'warning',
      what: `the first record starts ${clock.firstOnsetS} s after the file's start time, not within its first second; the start was moved by that`,
      place: 'record 1',
    });
  return { annotations, firstOnsetS: clock.firstOnsetS };
}

/** Checks that records follow one another. */
class RecordClock {
  firstOnsetS = 0;
  private started = false;
  private readonly toleranceS: number;

  constructor(private readonly input: FileTimesInput) {
    const { header } = input;
    const most = Math.max(
      ...header.signals.map((one) => (one.annotations ? 1 : one.samplesPerRecord)),
    );
    this.toleranceS = header.recordDurationS / most;
  }

  /** Throws a Refusal where record `record` (from 0) does not start where the records before it end. */
  check(record: number, onsetS: number): void {
    const { header, fileName } = this.input;
    if (!this.started) {
      this.firstOnsetS = onsetS - record * header.recordDurationS;
      this.started = true;
    }
    const expectedS = this.firstOnsetS + record * header.recordDurationS;
    if (Math.abs(onsetS - expectedS) <= this.toleranceS) return;
    throw refusal('not-supported', fileName, {
      message: `record ${record + 1} starts at ${onsetS} s where ${Number(expectedS.toFixed(6))} s would follow on; the file has gaps, as EDF+D has, and such files cannot be read yet.`,
      place: `record ${record + 1}, byte ${header.headerBytes + 2 * record * header.recordSamples}`,
      remedy:
        'Export the recording without interruptions, or each uninterrupted part to a file of its own.',
    });
  }
}

function nameCounts(counts: Counts, format: string, records: number, found: FoundInFile[]): void {
  const add = (severity: FoundInFile['severity'], what: string) =>
    found.push({ severity, what, place: 'annotation signals' });
  if (format === 'EDF')
    add('note', 'the file calls itself plain EDF and has an annotation signal, which was read');
  if (counts.untimed > 0)
    add(
      'warning',
      `${counts.untimed} of ${records} records do not say when they start; they were taken as following on`,
    );
  if (counts.loose > 0)
    add(
      'note',
      `${counts.loose} annotation lists break the letter of the format (sign, end mark or UTF-8) and were read all the same`,
    );
  if (counts.lost > 0) add('warning', `${counts.lost} annotation lists could not be read`);
}
