import { formatClock, parseClock, type Seconds } from './time';

const DAY_S: Seconds = 86_400;
/** Typed to the second, the first and the last second of a recording are part of it whatever their fractions. */
const SECOND_S: Seconds = 1;

/** What a typed time is read against. */
export interface TimeFrame {
  readonly durationS: Seconds;
  /** Time of day of the first sample, from 0 to below 86,400; null where the file does not say when it was taken. */
  readonly startOfDayS: Seconds | null;
}

/** What was typed: a time in the study, one on the clock, or neither. */
export type TypedTime =
  | { readonly kind: 'study' | 'clock'; readonly atS: Seconds }
  | { readonly kind: 'empty' | 'unreadable' | 'no-clock' }
  | { readonly kind: 'outside'; readonly as: 'study' | 'clock' };

/** The time of day of a local date and time ("2024-05-03T09:12:00.5"); null where there is none. */
export function timeOfDay(local: string | null): Seconds | null {
  const found = /T(\d\d):(\d\d):(\d\d(?:\.\d+)?)/.exec(local ?? '');
  return found && Number(found[1]) * 3600 + Number(found[2]) * 60 + Number(found[3]);
}

/**
 * Reads a typed time. From the start of the recording: seconds ("754"), m:ss or h:mm:ss ("0:12:34.5"). On the clock: with @
 * before it ("@9:12", "@09:12:34") or am or pm after it ("9:12 am"); the first such time at or after the start is meant, or that
 * of a later day ("@9:12 +1"). A plain h:mm:ss past the end is on the clock where that lies in the recording. A decimal comma
 * counts as a point.
 */
export function readTypedTime(text: string, frame: TimeFrame): TypedTime {
  const typed = text.trim().toLowerCase();
  if (typed === '') return { kind: 'empty' };
  const marked = clockOfDay(typed);
  if (marked !== null) return onClock(marked, frame);
  const atS = parseClock(typed);
  if (atS === null) return { kind: 'unreadable' };
  if (atS < frame.durationS + SECOND_S)
    return { kind: 'study', atS: Math.min(atS, frame.durationS) };
  const plain = typed.split(':').length === 3 ? clockOfDay(`@${typed}`) : null;
  const clock = plain !== null && plain !== 'unreadable' ? onClock(plain, frame) : null;
  return clock?.kind === 'clock' ? clock : { kind: 'outside', as: 'study' };
}

/** A time of day as typed; `days` after the day the recording began, null where nobody says. */
interface ClockTime {
  readonly ofDayS: Seconds;
  readonly days: number | null;
}

/** The clock time of a text that is marked as one; null where it bears no mark. */
function clockOfDay(typed: string): ClockTime | 'unreadable' | null {
  const parts = /^(@?)\s*([^@+]*?)\s*(?:([ap])\.?m\.?)?\s*(?:\+\s*(\d+))?$/.exec(typed);
  if (!parts) return typed.startsWith('@') ? 'unreadable' : null;
  const [, at, body, half, later] = parts;
  if (at === '' && half === undefined) return null;
  const time = /^(\d{1,2})(?::(\d\d)(?::(\d\d(?:[.,]\d*)?))?)?$/.exec(body);
  if (!time) return 'unreadable';
  const [hour, minute, second] = time
    .slice(1)
    .map((part) => Number((part ?? '0').replace(',', '.')));
  if (minute > 59 || second >= 60 || hour > 23) return 'unreadable';
  if (half !== undefined && (hour < 1 || hour > 12)) return 'unreadable';
  const hours = half === undefined ? hour : (hour % 12) + (half === 'p' ? 12 : 0);
  return {
    ofDayS: hours * 3600 + minute * 60 + second,
    days: later === undefined ? null : Number(later),
  };
}

function onClock(time: ClockTime | 'unreadable', { durationS, startOfDayS }: TimeFrame): TypedTime {
  if (time === 'unreadable') return { kind: 'unreadable' };
  if (startOfDayS === null) return { kind: 'no-clock' };
  const sameDayS = Math.round((time.ofDayS - startOfDayS) * 1e6) / 1e6;
  const atS =
    time.days === null
      ? sameDayS + (sameDayS <= -SECOND_S ? DAY_S : 0)
      : sameDayS + time.days * DAY_S;
  if (atS <= -SECOND_S || atS >= durationS + SECOND_S) return { kind: 'outside', as: 'clock' };
  return { kind: 'clock', atS: Math.min(Math.max(0, atS), durationS) };
}

/** A time as it is offered for typing: whole seconds without decimals, others with as many as they need, 3 at most. */
export function timeText(seconds: Seconds): string {
  return formatClock(seconds, decimalsOf(seconds));
}

/** How many decimals of a second, 3 at most, a time needs to be written as it is. */
const decimalsOf = (seconds: Seconds): number =>
  [0, 1, 2, 3].find((d) => seconds === Number(seconds.toFixed(d))) ?? 3;

/** Writes the times of one column with as many decimals as the one that needs most. */
export function timeColumn(times: readonly Seconds[]): (seconds: Seconds) => string {
  const decimals = times.reduce((most, one) => Math.max(most, decimalsOf(one)), 0);
  return (seconds) => formatClock(seconds, decimals);
}

/** The time on the clock, "09:24:34", with " +1" on the day after the recording began. Null where the start is not known. */
export function clockText(atS: Seconds, { startOfDayS }: TimeFrame): string | null {
  if (startOfDayS === null) return null;
  const ms = Math.round((startOfDayS + atS) * 1000);
  const days = Math.floor(ms / (DAY_S * 1000));
  const text = timeText((ms - days * DAY_S * 1000) / 1000);
  return `${text.replace(/^(\d):/, '0$1:')}${days > 0 ? ` +${days}` : ''}`;
}

const WHAT_CAN_BE_TYPED = 'seconds (754), m:ss or h:mm:ss from the start';

/** What may be typed into a field for a time, in one sentence; the clock only where it is known. */
export function typedTimeHelp(frame: TimeFrame): string {
  const clock = frame.startOfDayS === null ? '' : ', or the clock time (@9:12 or 9:12 am)';
  return `${WHAT_CAN_BE_TYPED}${clock}`;
}

/** What is wrong with a typed time and what can be typed; null where it was read. */
export function typedTimeFault(text: string, frame: TimeFrame): string | null {
  const read = readTypedTime(text, frame);
  const { durationS } = frame;
  switch (read.kind) {
    case 'study':
    case 'clock':
      return null;
    case 'empty':
      return `Type a time: ${typedTimeHelp(frame)}.`;
    case 'unreadable':
      return `“${text.trim()}” is no time. Type ${typedTimeHelp(frame)}.`;
    case 'no-clock':
      return `The file does not say at what time it began. Type ${WHAT_CAN_BE_TYPED}.`;
    case 'outside':
      return read.as === 'study'
        ? `The recording ends at ${timeText(durationS)}.`
        : `On the clock the recording runs from ${clockText(0, frame)} to ${clockText(durationS, frame)}.`;
  }
}
