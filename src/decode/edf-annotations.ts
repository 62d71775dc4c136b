import type { Annotation } from '../recording/recording';
import { decodeLoosely } from './edf-fields';

const ENDS_TEXT = 0x14;
const STARTS_DURATION = 0x15;

/** The annotation lists (TALs) of one record of one annotation signal. */
export interface RecordAnnotations {
  /** Onsets are seconds from the file's start time, as written. */
  readonly annotations: readonly Annotation[];
  /** Onset of the first list where its first text is empty: the start of the record. */
  readonly timeKeepingS: number | null;
  /** Lists read although they break the letter of the format (no sign, no end mark, text not UTF-8). */
  readonly loose: number;
  /** Lists that could not be read. */
  readonly lost: number;
}

/**
 * Parses the annotation bytes of one record: lists `Onset [0x15 Duration] 0x14 (Text 0x14)* 0x00` (Kemp & Olivan 2003).
 * Several texts of one list become several annotations; empty texts are left out; control characters become blanks. What
 * does not parse is counted, nothing is thrown.
 */
export function parseRecordAnnotations(bytes: Uint8Array): RecordAnnotations {
  const annotations: Annotation[] = [];
  let timeKeepingS: number | null = null;
  let loose = 0;
  let lost = 0;
  let first = true;
  for (let from = 0; from < bytes.length; ) {
    const zero = bytes.indexOf(0, from);
    const to = zero < 0 ? bytes.length : zero;
    if (to > from) {
      const list = parseList(bytes.subarray(from, to));
      if (list) {
        if (first && list.texts[0] === '') timeKeepingS = list.onsetS;
        if (list.loose || zero < 0) loose += 1;
        for (const text of list.texts)
          if (text !== '')
            annotations.push({ onsetS: list.onsetS, durationS: list.durationS, text });
      } else lost += 1;
      first = false;
    }
    from = to + 1;
  }
  return { annotations, timeKeepingS, loose, lost };
}

interface AnnotationList {
  readonly onsetS: number;
  readonly durationS: number | null;
  readonly texts: readonly string[];
  readonly loose: boolean;
}

function parseList(bytes: Uint8Array): AnnotationList | null {
  const timeEnd = bytes.indexOf(ENDS_TEXT);
  if (timeEnd < 0) return null;
  const [onset, duration, ...more] = split(bytes.subarray(0, timeEnd), STARTS_DURATION).map(
    (part) => decodeLoosely(part),
  );
  if (more.length > 0 || !/^[+-]?\d+(\.\d*)?$/.test(onset)) return null;
  const noDuration = duration === undefined || duration === '';
  if (!noDuration && !/^\d+(\.\d*)?$/.test(duration)) return null;
  const parts = split(bytes.subarray(timeEnd + 1), ENDS_TEXT);
  const closed = parts[parts.length - 1].length === 0;
  const texts = (closed ? parts.slice(0, -1) : parts).map(decodeLoosely);
  return {
    onsetS: Number(onset),
    durationS: noDuration ? null : Number(duration),
    texts: texts.map((text) => text.replace(/\p{Cc}+/gu, ' ').trim()),
    loose: !closed || !/^[+-]/.test(onset) || !parts.every(isUtf8),
  };
}

function isUtf8(bytes: Uint8Array): boolean {
  try {
    new TextDecoder('utf-8', { fatal: true }).decode(bytes);
    return true;
  } catch {
    return false;
  }
}

function split(bytes: Uint8Array, mark: number): Uint8Array[] {
  const parts: Uint8Array[] = [];
  let from = 0;
  for (let at = bytes.indexOf(mark); at >= 0; at = bytes.indexOf(mark, from)) {
    parts.push(bytes.subarray(from, at));
    from = at + 1;
  }
  parts.push(bytes.subarray(from));
  return parts;
}
