import type { Annotation } from '../recording/recording';
import type { Seconds } from '../units/time';
import type { EdfPlusContents } from './edf-plus';

/** The annotation signal, record by record. */
export interface AnnotationRecords {
  /** Even. */
  readonly bytesPerRecord: number;
  readonly record: (record: number) => Uint8Array;
}

type Timeline = Pick<EdfPlusContents, 'annotations' | 'recordCount' | 'recordDurationS'>;

/** Fraction of a second of a local time, 0 where there is none. */
export function startFraction(start: string | null): Seconds {
  const fraction = /\.\d+$/.exec(start ?? '');
  return fraction ? Number(`0${fraction[0]}`) : 0;
}

/**
 * Annotation lists (Kemp & Olivan 2003): each record begins with the list that keeps its time, then come the annotations
 * whose onset lies in it (those before the start in the first record, those after the end in the last).
 */
export function annotationRecords(timeline: Timeline, fractionS: Seconds): AnnotationRecords {
  const { annotations, recordCount, recordDurationS } = timeline;
  const lists = new Map<number, string>();
  const sorted = [...annotations].sort((a, b) => a.onsetS - b.onsetS);
  for (const annotation of sorted) {
    const place = Math.floor(annotation.onsetS / recordDurationS);
    const record = Math.max(0, Math.min(recordCount - 1, place));
    lists.set(record, (lists.get(record) ?? '') + annotationList(annotation, fractionS));
  }
  const encoder = new TextEncoder();
  const bytesOf = (record: number) =>
    encoder.encode(
      `${onset(fractionS + record * recordDurationS)}\u0014\u0014\u0000${lists.get(record) ?? ''}`,
    );
  let most = 0;
  for (let record = 0; record < recordCount; record += 1)
    most = Math.max(most, bytesOf(record).length);
  return { bytesPerRecord: most + (most % 2), record: bytesOf };
}

function annotationList({ onsetS, durationS, text }: Annotation, fractionS: Seconds): string {
  const duration = durationS === null ? '' : `\u0015${decimals(durationS)}`;
  return `${onset(fractionS + onsetS)}${duration}\u0014${plainText(text)}\u0014\u0000`;
}

/** Control characters would end the text or the list; they become blanks. */
function plainText(text: string): string {
  return text.replace(/\p{Cc}/gu, ' ');
}

function onset(seconds: Seconds): string {
  const text = decimals(seconds);
  return text.startsWith('-') ? text : `+${text}`;
}

/** Seconds to the microsecond without zeros at the end. */
function decimals(seconds: Seconds): string {
  const text = seconds.toFixed(6).replace(/\.?0+$/, '');
  return text === '-0' ? '0' : text;
}
