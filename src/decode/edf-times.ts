import type { Annotation, FoundInFile } from '../recording/recording';
import type { Seconds } from '../units/time';
import { parseRecordAnnotations } from './edf-annotations';
import type { EdfHeader } from './edf-header';
import type { EdfRecords } from './edf-records';
import type { EdfVariant } from './edf-variant';
import { RecordClock } from './record-clock';
import { gapsBetween, type RecordRun } from './record-runs';

/** What the annotation signals say: annotations as written, and when the records were taken. */
export interface FileTimes {
  /** Onsets are seconds from the file's start time. */
  readonly annotations: readonly Annotation[];
  /** Seconds from the file's start time to the first sample. */
  readonly firstOnsetS: Seconds;
  readonly runs: readonly RecordRun[];
}

interface FileTimesInput {
  readonly header: EdfHeader;
  readonly records: EdfRecords;
  readonly variant: EdfVariant;
}

interface Counts {
  loose: number;
  lost: number;
  untimed: number;
}

/**
 * Reads every annotation signal of the file. The first list of the first annotation signal keeps each record's time; records
 * that do not follow one another within a sample of the fastest signal leave gaps, whatever the file calls itself. Times that
 * run backwards are not trusted: records are then laid end to end, which is named.
 */
export async function readFileTimes(
  input: FileTimesInput,
  found: FoundInFile[],
): Promise<FileTimes> {
  const { header, records, variant } = input;
  const signals = header.signals.filter((signal) => signal.annotations);
  const endToEnd = [{ firstRecord: 0, records: header.recordCount, startS: 0 }];
  if (signals.length === 0) {
    nameMissingTimes(variant, found);
    return { annotations: [], firstOnsetS: 0, runs: endToEnd };
  }
  const annotations: Annotation[] = [];
  const counts: Counts = { loose: 0, lost: 0, untimed: 0 };
  const clock = new RecordClock(header.recordDurationS, fastestSampleS(header));
  const { sampleBytes } = header;
  for await (const slice of records.slices(0, header.recordCount))
    for (let i = 0; i < slice.records; i += 1)
      signals.forEach((signal, which) => {
        const at = sampleBytes * (i * header.recordSamples + signal.firstSample);
        const bytes = slice.bytes.subarray(at, at + sampleBytes * signal.samplesPerRecord);
        const record = parseRecordAnnotations(bytes);
        for (const one of record.annotations) annotations.push(one);
        counts.loose += record.loose;
        counts.lost += record.lost;
        if (which > 0) return;
        if (record.timeKeepingS === null) counts.untimed += 1;
        clock.next(record.timeKeepingS);
      });
  nameCounts(counts, variant, header.recordCount, found);
  const { firstOnsetS } = clock;
  if (firstOnsetS < 0 || firstOnsetS >= 1)
    found.push({
      severity: 'warning',
      what: `the first record starts ${firstOnsetS} s after the file's start time, not within its first second; the start was moved by that`,
      place: 'record 1',
    });
  return { annotations, firstOnsetS, runs: trustedRuns(clock, input, found) ?? endToEnd };
}

function fastestSampleS({ signals, recordDurationS }: EdfHeader): Seconds {
  const most = Math.max(...signals.map((one) => (one.annotations ? 1 : one.samplesPerRecord)));
  return recordDurationS / most;
}

/** The runs by the file's own times, with what is odd about them named; null where they contradict themselves. */
function trustedRuns(
  clock: RecordClock,
  { header, variant }: FileTimesInput,
  found: FoundInFile[],
): readonly RecordRun[] | null {
  const times = clock.times();
  const { headerBytes, recordSamples, sampleBytes, recordDurationS } = header;
  const placeOf = (record: number) =>
    `record ${record + 1}, byte ${headerBytes + record * sampleBytes * recordSamples}`;
  if (times.kind === 'untrusted') {
    found.push({
      severity: 'warning',
      what: `record ${times.record + 1} ${times.why}: the times in this file cannot be trusted. Its records were laid end to end, so times and gaps shown are not those of the recording`,
      place: placeOf(times.record),
    });
    return null;
  }
  const gaps = gapsBetween(times.runs, recordDurationS);
  const lostS = gaps.reduce((sum, { fromS, toS }) => sum + toS - fromS, 0);
  if (gaps.length > 0)
    found.push({
      severity: variant.plus === 'D' ? 'note' : 'warning',
      what: `${variant.plus === 'D' ? '' : 'the file calls itself uninterrupted, but '}${counted(gaps.length, 'stretch', 'es')} without samples, ${Number(lostS.toFixed(3))} s in all; figures leave them out`,
      place: placeOf(times.runs[1].firstRecord),
    });
  if (times.driftS > 2 * fastestSampleS(header))
    found.push({
      severity: times.driftS > 1 ? 'warning' : 'note',
      what: `the times of the records wander by up to ${Math.round(1000 * times.driftS)} ms against their sampling rate; samples were kept at that rate`,
      place: 'annotation signals',
    });
  return times.runs;
}

const counted = (count: number, what: string, plural: string): string =>
  `${count} ${what}${count === 1 ? '' : plural}`;

function nameMissingTimes({ name, plus }: EdfVariant, found: FoundInFile[]): void {
  if (plus === 'none') return;
  const gaps = plus === 'D' ? '; gaps it may have cannot be known' : '';
  found.push({
    severity: 'warning',
    what: `the file calls itself ${name} and has no annotation signal; records are taken as following one another${gaps}`,
    place: null,
  });
}

function nameCounts(
  counts: Counts,
  { name, plus }: EdfVariant,
  records: number,
  found: FoundInFile[],
): void {
  const add = (severity: FoundInFile['severity'], what: string) =>
    found.push({ severity, what, place: 'annotation signals' });
  if (plus === 'none')
    add('note', `the file calls itself plain ${name} and has an annotation signal, which was read`);
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
