import type { FoundInFile, Identity, StartTime } from '../recording/recording';
import { type CalendarDate, dayTime, longDate, shortDate } from './edf-fields';
import type { EdfHeader } from './edf-header';
import { quoted } from './refusals';

type HeaderTexts = Pick<EdfHeader, 'patient' | 'recording' | 'startDate' | 'startTime'>;

const known = (subfield: string): string | null => {
  const text = subfield.replace(/_/g, ' ').trim();
  return text === '' || text.toUpperCase() === 'X' ? null : text;
};

/**
 * Who the header says it is. The subfields of EDF+ ("code sex birthdate name", blanks as underscores, X for unknown; Kemp &
 * Olivan 2003) are taken apart, of the birth date only the year is kept; other text is kept whole as the name, since it may
 * hold one.
 */
export function readIdentity(texts: HeaderTexts): Identity {
  const recordingText = readRecordingText(texts.recording);
  const [code, sex, birth, ...names] = texts.patient.split(/\s+/);
  const parted =
    /^[MFX]$/i.test(sex ?? '') && (longDate(birth ?? '') !== null || /^X$/i.test(birth ?? ''));
  if (!parted)
    return { code: null, name: known(texts.patient), sex: null, birthYear: null, recordingText };
  return {
    code: known(code),
    name: known(names[0] ?? ''),
    sex: known(sex.toUpperCase()),
    birthYear: longDate(birth)?.year ?? null,
    recordingText,
  };
}

/** True where the header's texts contain the words that mark a study the program made up. */
export function saysInvented(texts: HeaderTexts): boolean {
  return /invented[ _]data/i.test(`${texts.patient} ${texts.recording}`);
}

/** The free text of the recording field; of EDF+ subfields those that are known, without the start date. */
function readRecordingText(text: string): string {
  const [mark, , ...rest] = text.split(/\s+/);
  if (mark !== 'Startdate') return text;
  return rest
    .map(known)
    .filter((part) => part !== null)
    .join(', ');
}

/**
 * Local date and time of the first sample: the header's date and time plus `offsetS` seconds (the first record's onset).
 * Unknown where either is not as the standard writes it, or where the long date of EDF+ says another day.
 */
export function readStart(texts: HeaderTexts, offsetS: number, found: FoundInFile[]): StartTime {
  const raw = `${texts.startDate} ${texts.startTime}`.trim();
  const time = dayTime(texts.startTime);
  const short = shortDate(texts.startDate);
  const long = longDate(/^Startdate\s+(\S+)/.exec(texts.recording)?.[1] ?? '');
  const date = long ?? short;
  const clash = long !== null && short !== null && !sameDate(long, short);
  if (time === null || date === null || clash) {
    found.push({
      severity: 'warning',
      what: clash
        ? `the header gives two start dates, ${quoted(texts.startDate)} and ${quoted(texts.recording)}; the start is taken as unknown`
        : `the start ${quoted(raw)} is no date and time as EDF writes them; the start is taken as unknown`,
      place: 'byte 168, start date and time',
    });
    return { kind: 'unknown', raw };
  }
  return { kind: 'known', local: localTime(date, time, offsetS) };
}

function sameDate(a: CalendarDate, b: CalendarDate): boolean {
  return a.day === b.day && a.month === b.month && a.year % 100 === b.year % 100;
}

function localTime(date: CalendarDate, secondOfDay: number, offsetS: number): string {
  const whole = Math.floor(offsetS);
  const microseconds = Math.min(999_999, Math.round((offsetS - whole) * 1e6));
  const day = Date.UTC(date.year, date.month - 1, date.day);
  const text = new Date(day + (secondOfDay + whole) * 1000).toISOString().slice(0, 19);
  const fraction = String(microseconds).padStart(6, '0').replace(/0+$/, '');
  return fraction === '' ? text : `${text}.${fraction}`;
}
