import { describe, expect, it } from 'vitest';
import { leadKey } from '../../src/recording/lead';
import {
  minutesRows,
  type Row,
  recordedLeads,
  secondsRows,
  spanActsOn,
} from '../../src/review/rows';
import { channel, recordingOf } from './pane-study';

const recording = recordingOf(600);
const roles = (slow: number[], heart: number | null) => ({
  slow: slow.map(channel),
  reported: 0,
  heart: heart === null ? null : channel(heart),
  breath: null,
});
const kinds = (rows: readonly Row[]) =>
  rows.map((row) => (row.kind === 'signal' ? `${row.signal} ${row.leadKey}` : row.kind));

describe('the rows of Minutes', () => {
  it('show recorded leads, slow waves, spectrogram and heart rate', () => {
    expect(
      kinds(minutesRows(roles([0, 1], 2), recording, { breathing: true, route: 'band' })),
    ).toEqual([
      'recorded #1',
      'recorded #2',
      'recorded #3',
      'slow-wave #1',
      'slow-wave #2',
      'spectrogram',
      'heart-rate',
      'breathing',
    ]);
  });

  it('show a lead that serves both once', () => {
    const rows = minutesRows(roles([0], 0), recording, { breathing: false, route: 'band' });
    expect(kinds(rows)).toEqual(['recorded #1', 'slow-wave #1', 'spectrogram', 'heart-rate']);
  });

  it('never lose the heart lead to the limit of three', () => {
    const keys = (slow: number[], heart: number | null) =>
      recordedLeads(roles(slow, heart)).map(leadKey);
    expect(keys([0, 1, 2, 3], 4)).toEqual(['#1', '#2', '#5']);
    expect(keys([0, 1, 2, 3], 3)).toEqual(['#1', '#2', '#4']);
    expect(keys([0, 1, 2, 3], 1)).toEqual(['#1', '#2', '#3']);
    expect(keys([0, 1, 2, 3], null)).toEqual(['#1', '#2', '#3']);
  });

  it('have keys of their own', () => {
    const all = [
      ...minutesRows(roles([0, 1], 0), recording, { breathing: true, route: 'band' }),
      ...secondsRows(roles([0, 1], 0), recording),
    ].map((row) => row.key);
    expect(new Set(all).size).toBe(all.length);
  });
});

describe('where a spoiled span is hatched', () => {
  const rows = [
    ...minutesRows(roles([0], 1), recording, { breathing: true, route: 'band' }),
    ...secondsRows(roles([0], 1), recording),
  ];
  const hit = (target: 'stomach' | 'heart' | 'both', lead: string | null) =>
    kinds(rows.filter((row) => spanActsOn({ lead, target }, row, '#2')));

  it('is every row for both organs on all leads', () => {
    expect(hit('both', null)).toHaveLength(rows.length);
  });

  it('is the stomach’s rows for the stomach', () => {
    expect(hit('stomach', '#1')).toEqual(['recorded #1', 'slow-wave #1', 'spectrogram']);
  });

  it('is the heart’s rows for the heart, with its recorded lead', () => {
    expect(hit('heart', '#2')).toEqual([
      'recorded #2',
      'heart-rate',
      'breathing',
      'interval',
      'recorded #2',
      'heartbeat #2',
    ]);
  });
});

describe('the rows of Seconds', () => {
  it('need a heart lead', () => {
    expect(secondsRows(roles([0], null), recording)).toEqual([]);
    expect(kinds(secondsRows(roles([0], 2), recording))).toEqual([
      'interval',
      'recorded #3',
      'heartbeat #3',
    ]);
  });
});
