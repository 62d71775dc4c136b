import type {
  EdfPlusContents,
  EdfPlusPatient,
  EdfPlusRecordingFields,
  EdfPlusSignal,
} from './edf-plus';

const MONTHS = ['JAN', 'FEB', 'MAR', 'APR', 'MAY', 'JUN', 'JUL', 'AUG', 'SEP', 'OCT', 'NOV', 'DEC'];
/** What the short date holds where the start is unknown: the first day its years can name (Kemp & Olivan 2003). */
const UNKNOWN_DATE = '01.01.85';

type SignalHeader = Omit<EdfPlusSignal, 'digital'>;

const ANNOTATION_SIGNAL: Omit<SignalHeader, 'samplesPerRecord'> = {
  label: 'EDF Annotations',
  transducer: '',
  unit: '',
  physicalMin: -1,
  physicalMax: 1,
  digitalMin: -32768,
  digitalMax: 32767,
  prefilter: '',
};

/** The header's bytes, with the annotation signal last; its length is given in 16-bit words. */
export function edfPlusHeader(
  contents: EdfPlusContents,
  annotationWords: number,
): Uint8Array<ArrayBuffer> {
  const signals: readonly SignalHeader[] = [
    ...contents.signals,
    { ...ANNOTATION_SIGNAL, samplesPerRecord: annotationWords },
  ];
  const start = readStart(contents.start);
  const fields: readonly (readonly [text: string, length: number])[] = [
    ['0', 8],
    [patientField(contents.patient), 80],
    [recordingField(start.longDate, contents.recordingFields), 80],
    [start.date, 8],
    [start.time, 8],
    [String(256 * (signals.length + 1)), 8],
    ['EDF+C', 44],
    [String(contents.recordCount), 8],
    [headerNumber(contents.recordDurationS), 8],
    [String(signals.length), 4],
    ...signals.map((one) => [one.label, 16] as const),
    ...signals.map((one) => [one.transducer, 80] as const),
    ...signals.map((one) => [one.unit, 8] as const),
    ...signals.map((one) => [headerNumber(one.physicalMin), 8] as const),
    ...signals.map((one) => [headerNumber(one.physicalMax), 8] as const),
    ...signals.map((one) => [headerNumber(one.digitalMin), 8] as const),
    ...signals.map((one) => [headerNumber(one.digitalMax), 8] as const),
    ...signals.map((one) => [one.prefilter, 80] as const),
    ...signals.map((one) => [headerNumber(one.samplesPerRecord), 8] as const),
    ...signals.map(() => ['', 32] as const),
  ];
  const text = fields.map(([field, length]) => ascii(field).slice(0, length).padEnd(length));
  return Uint8Array.from(text.join(''), (character) => character.charCodeAt(0));
}

/** A number as a header field can hold it exactly: at most 8 characters, no exponent. Throws RangeError where it cannot. */
function headerNumber(value: number): string {
  if (fitHeaderNumber(value) !== value)
    throw new RangeError(`${value} does not fit into 8 characters of a header`);
  return shortest(value);
}

/**
 * The nearest number that a header field of 8 characters can hold; scales are to be computed from it, since readers will.
 * Throws RangeError where |value| needs more than 8 digits before the point.
 */
export function fitHeaderNumber(value: number): number {
  for (let decimals = 7; decimals >= 0; decimals -= 1) {
    const rounded = Number(value.toFixed(decimals));
    if (shortest(rounded).length <= 8) return rounded;
  }
  throw new RangeError(`${value} has too many digits for a header`);
}

/** A number in the fewest characters without an exponent, to 7 decimals. */
function shortest(value: number): string {
  const text = value.toFixed(7).replace(/\.?0+$/, '');
  return text === '-0' ? '0' : text;
}

/** Printable ASCII: accents taken off, the micro sign as u, what remains outside as a question mark. */
function ascii(text: string): string {
  return text
    .replace(/[\u00b5\u03bc]/gu, 'u')
    .normalize('NFD')
    .replace(/\p{M}/gu, '')
    .replace(/[^ -~]/gu, '?');
}

function subfield(text: string | null): string {
  const joined = (text ?? '').trim().replace(/\s+/g, '_');
  return joined === '' ? 'X' : joined;
}

function patientField({ code, sex, birthDate, name }: EdfPlusPatient): string {
  return [
    subfield(code),
    sex ?? 'X',
    birthDate === null ? 'X' : longDate(birthDate),
    subfield(name),
  ].join(' ');
}

function recordingField(startDate: string, fields: EdfPlusRecordingFields): string {
  const { investigation, technician, equipment, additional } = fields;
  return [
    'Startdate',
    startDate,
    ...[investigation, technician, equipment, ...additional].map(subfield),
  ].join(' ');
}

function readStart(start: string | null): {
  readonly date: string;
  readonly time: string;
  readonly longDate: string;
} {
  if (start === null) return { date: UNKNOWN_DATE, time: '00.00.00', longDate: 'X' };
  const match = /^(\d{4})-(\d{2})-(\d{2})T(\d{2}):(\d{2}):(\d{2})(\.\d+)?$/.exec(start);
  if (!match) throw new RangeError(`no local time: ${start}`);
  const [, year, month, day, hour, minute, second] = match;
  const shortYear = Number(year) >= 1985 && Number(year) <= 2084 ? year.slice(2) : 'yy';
  return {
    date: `${day}.${month}.${shortYear}`,
    time: `${hour}.${minute}.${second}`,
    longDate: longDate(`${year}-${month}-${day}`),
  };
}

function longDate(isoDate: string): string {
  const match = /^(\d{4})-(\d{2})-(\d{2})$/.exec(isoDate);
  const month = MONTHS[Number(match?.[2]) - 1];
  if (!match || month === undefined) throw new RangeError(`no date: ${isoDate}`);
  return `${match[3]}-${month}-${match[1]}`;
}
