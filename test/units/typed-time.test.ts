import { describe, expect, it } from 'vitest';
import {
  clockText,
  readTypedTime,
  type TimeFrame,
  timeColumn,
  timeOfDay,
  typedTimeFault,
  typedTimeHelp,
} from '../../src/units/typed-time';

/** A recording of an hour from twelve minutes past nine. */
const MORNING: TimeFrame = { durationS: 3600, startOfDayS: 9 * 3600 + 12 * 60 };
/** Eight hours from ten in the evening, and 0.4 s more. */
const NIGHT: TimeFrame = { durationS: 8 * 3600 + 0.4, startOfDayS: 22 * 3600 };
const DAY: TimeFrame = { durationS: 26 * 3600, startOfDayS: 9 * 3600 };
const UNDATED: TimeFrame = { durationS: 3600, startOfDayS: null };

const study = (atS: number) => ({ kind: 'study', atS });
const clock = (atS: number) => ({ kind: 'clock', atS });

describe('a column of times', () => {
  it('has as many decimals as the time that needs most, 3 at most', () => {
    const times = [60, 61.5, 3600];
    expect(times.map(timeColumn(times))).toEqual(['0:01:00.0', '0:01:01.5', '1:00:00.0']);
    expect([60, 61].map(timeColumn([60, 61]))).toEqual(['0:01:00', '0:01:01']);
    expect(timeColumn([1 / 3])(1 / 3)).toBe('0:00:00.333');
  });
});

describe('a time typed from the start', () => {
  it.each([
    ['754', 754],
    [' 754.5 ', 754.5],
    ['754,5', 754.5],
    ['0', 0],
    ['12:34', 754],
    ['75:00', 4500],
    ['0:12:34', 754],
    ['00:12:34.567', 754.567],
    ['0:12:34,5', 754.5],
  ])('%s is read as seconds', (text, atS) => {
    expect(readTypedTime(text, { ...MORNING, durationS: 5000 })).toEqual(study(atS));
  });

  it('may end with the last fraction of a second of the recording, and is cut there', () => {
    expect(readTypedTime('8:00:01', NIGHT)).toEqual(study(8 * 3600 + 0.4));
    expect(readTypedTime('8:00:02', NIGHT)).toEqual({ kind: 'outside', as: 'study' });
  });

  it('means the study where both readings would do, and the clock only where it alone does', () => {
    expect(readTypedTime('9:12:00', { durationS: 12 * 3600, startOfDayS: 7 * 3600 })).toEqual(
      study(9 * 3600 + 720),
    );
    expect(readTypedTime('09:24:34', MORNING)).toEqual(clock(754));
    expect(readTypedTime('10:20', { ...MORNING, durationS: 500 })).toEqual({
      kind: 'outside',
      as: 'study',
    });
    expect(readTypedTime('09:24:34', UNDATED)).toEqual({ kind: 'outside', as: 'study' });
  });
});

describe('a time typed as on the clock', () => {
  it.each([
    ['@9:24', 720],
    ['@09:24:34', 754],
    ['@ 09:24:34.25', 754.25],
    ['@10', 48 * 60],
    ['9:24 am', 720],
    ['9:24:34AM', 754],
    ['10 a.m.', 48 * 60],
    ['@9:24 am', 720],
    ['@9:12', 0],
  ])('%s is told from the study’s own by its mark', (text, atS) => {
    expect(readTypedTime(text, MORNING)).toEqual(clock(atS));
  });

  it('goes on past midnight, and to later days where one says which', () => {
    expect(readTypedTime('@00:30', NIGHT)).toEqual(clock(2.5 * 3600));
    expect(readTypedTime('12:30 am', NIGHT)).toEqual(clock(2.5 * 3600));
    expect(readTypedTime('11 pm', NIGHT)).toEqual(clock(3600));
    expect(readTypedTime('@10:00', DAY)).toEqual(clock(3600));
    expect(readTypedTime('@10:00 +1', DAY)).toEqual(clock(25 * 3600));
    expect(readTypedTime('10 am +1', DAY)).toEqual(clock(25 * 3600));
    expect(readTypedTime('@12:00 +1', DAY)).toEqual({ kind: 'outside', as: 'clock' });
  });

  it('takes the second the recording began in for its start', () => {
    expect(readTypedTime('@9:12:00', { durationS: 60, startOfDayS: 33120.7 })).toEqual(clock(0));
  });

  it('is refused outside the recording, and where the file has no time of its own', () => {
    expect(readTypedTime('@8:00', MORNING)).toEqual({ kind: 'outside', as: 'clock' });
    expect(readTypedTime('@9:24', UNDATED)).toEqual({ kind: 'no-clock' });
  });
});

describe('what is no time', () => {
  it.each([
    '12:60',
    '0:75:00',
    '1:2:3:4',
    '9h12',
    'soon',
    '-5',
    '1e3',
    ':30',
    '12:',
    '@',
    '@25:00',
    '@9:75',
    '@9:12:60',
    '13:00 pm',
    '0:30 am',
    '@noon',
    '12:34 +1',
    '@9:12 +',
    '9:12 am pm',
    '٣',
  ])('%s is not taken for one', (text) => {
    expect(readTypedTime(text, MORNING)).toEqual({ kind: 'unreadable' });
    expect(typedTimeFault(text, MORNING)).toContain(`“${text}” is no time. Type seconds (754)`);
  });

  it('is told with what can be typed instead', () => {
    expect(typedTimeFault('', MORNING)).toMatch(/^Type a time: seconds .*clock time \(@9:12/);
    expect(typedTimeFault('2:00:00', MORNING)).toBe('The recording ends at 1:00:00.');
    expect(typedTimeFault('@8:00', MORNING)).toBe(
      'On the clock the recording runs from 09:12:00 to 10:12:00.',
    );
    expect(typedTimeFault('@8:00', UNDATED)).toMatch(/does not say at what time it began/);
    expect(typedTimeFault('12:34', MORNING)).toBeNull();
    expect(typedTimeHelp(UNDATED)).not.toContain('clock');
  });
});

describe('the time on the clock', () => {
  it('is read from the header’s local start', () => {
    expect(timeOfDay('2024-05-03T09:12:00')).toBe(33120);
    expect(timeOfDay('2024-05-03T23:59:59.25')).toBe(86399.25);
    expect(timeOfDay(null)).toBeNull();
    expect(timeOfDay('2024-05-03')).toBeNull();
  });

  it('is written with two digits for the hour, and the day where it is a later one', () => {
    expect(clockText(754, MORNING)).toBe('09:24:34');
    expect(clockText(0.25, MORNING)).toBe('09:12:00.25');
    expect(clockText(7199.9996, NIGHT)).toBe('00:00:00 +1');
    expect(clockText(2.5 * 3600, NIGHT)).toBe('00:30:00 +1');
    expect(clockText(0, UNDATED)).toBeNull();
  });

  it('comes back as it was written', () => {
    for (const atS of [0, 3599.125, 7200, 20000.5, 28800.4]) {
      const text = clockText(atS, NIGHT);
      expect(readTypedTime(`@${text}`, NIGHT), `${text}`).toEqual(clock(expect.closeTo(atS, 6)));
    }
  });
});
