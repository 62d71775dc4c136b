import { describe, expect, it } from 'vitest';
import { minuteOfHeart } from '../../src/export/minute-of-heart';
import { bytesOf, type ResultFile } from '../../src/export/result-file';
import { tableFiles } from '../../src/export/table-files';
import type { Doubt } from '../../src/recording/doubt';
import { FIGURES } from '../../src/recording/figure-catalogue';
import type { SiteRange } from '../../src/recording/site-reference';
import { epoch, inventedInput } from './invented-input';
import { readCsv } from './read-csv';

const input = inventedInput();
const textOf = (file: ResultFile): string => new TextDecoder().decode(bytesOf(file));
const fileOf = (name: string, from = input) => {
  const file = tableFiles(from).find((one) => one.name === name);
  return file ? textOf(file) : '';
};
/** Rows as records by the header. */
const table = (name: string, from = input) => {
  const [header, ...rows] = readCsv(fileOf(name, from));
  return rows.map((row) => Object.fromEntries(row.map((cell, i) => [header[i], cell])));
};
/** An open doubt of the beat at a tick. */
const doubtAt = (tick: number): Doubt => ({
  id: `extra-beat-${tick}`,
  kind: 'extra-beat',
  fromS: 0,
  toS: 0,
  tick,
  lead: null,
  why: 'Invented.',
  mend: null,
  effect: null,
});

describe('the files of results', () => {
  it('are five, and name nobody', () => {
    const files = tableFiles(input);
    expect(files.map((file) => file.name)).toEqual([
      'beats.csv',
      'epochs.csv',
      'minutes.csv',
      'spans.csv',
      'findings.json',
    ]);
    for (const text of files.map(textOf)) {
      expect(text.endsWith('\n')).toBe(true);
      expect(text).not.toMatch(/Anna|Kowalska|1980|\r/);
    }
  });
  it('begin with the columns of files.md', () => {
    const header = (name: string) => fileOf(name).split('\n', 1)[0];
    expect(header('beats.csv')).toBe('time_s,sample,class,origin,rr_ms,nn,doubt');
    expect(header('epochs.csv')).toBe(
      'start_s,end_s,lead,phase,kept,spoiled_fraction,df_cpm,dp_db,peak_share,rhythm,flags',
    );
    expect(header('minutes.csv')).toBe(
      'minute,lead,phase,df_cpm,dp_db,rhythm,heart_rate_bpm,breathing_bpm,rmssd_ms,beats,open_doubts,spoiled_fraction',
    );
    expect(header('spans.csv')).toBe('from_s,to_s,lead,for,cause,origin,note');
  });
});

describe('beats.csv', () => {
  it('has the refined time, the sample, and the interval that ends at the beat', () => {
    const rows = table('beats.csv');
    expect(rows).toHaveLength(7);
    expect(rows[0]).toEqual({
      time_s: '10.000000',
      sample: '2500',
      class: 'N',
      origin: 'detected',
      rr_ms: '',
      nn: '',
      doubt: '',
    });
    expect(rows[4]).toMatchObject({ time_s: '13.260000', sample: '3315', rr_ms: '860.0', nn: '1' });
  });
  it('says at each beat whether a doubt stands there, and how it was settled', () => {
    const [, kept, open, both] = input.state.beats.ticks;
    const settled = (tick: number, ending: 'kept' | 'mended') => ({
      id: `a-${tick}`,
      ending,
      tick,
    });
    const doubted = {
      ...input,
      state: { ...input.state, doubts: [settled(kept, 'kept'), settled(both, 'mended')] },
      openDoubts: [doubtAt(open), doubtAt(both)],
    };
    const column = table('beats.csv', doubted).map(({ doubt }) => doubt);
    expect(column).toEqual(['', 'kept', 'open', 'open', '', '', '']);
  });
  it('leaves an interval out where it is not known, and goes on in step after it', () => {
    const heart = input.heart;
    if (!heart) throw new Error('heart');
    const keep = [0, 1, 3, 4, 5];
    const rr = {
      timesS: Float64Array.from(keep, (i) => heart.rr.timesS[i]),
      rrMs: Float64Array.from(keep, (i) => heart.rr.rrMs[i]),
      nn: Uint8Array.of(1, 1, 0, 1, 1),
    };
    const rows = table('beats.csv', { ...input, heart: { ...heart, rr } });
    expect(rows.map((row) => row.rr_ms)).toEqual([
      '',
      '800.0',
      '810.0',
      '',
      '860.0',
      '800.0',
      '805.0',
    ]);
    expect(rows[4].nn).toBe('0');
  });
  it('is empty but for its header where there is no heart lead', () => {
    const state = { ...input.state, roles: { ...input.state.roles, heart: null } };
    expect(table('beats.csv', { ...input, state, heart: null })).toEqual([]);
  });
});

describe('epochs.csv', () => {
  it('writes DF with two decimals, DP with one, and nothing where the epoch is not kept', () => {
    const [kept, lost] = table('epochs.csv');
    expect(kept).toEqual({
      start_s: '0.000000',
      end_s: '120.000000',
      lead: '#1~#2',
      phase: 'fasting',
      kept: '1',
      spoiled_fraction: '0.0313',
      df_cpm: '2.95',
      dp_db: '31.3',
      peak_share: '0.5000',
      rhythm: 'normo',
      flags: 'filled half',
    });
    expect(lost).toMatchObject({
      kept: '0',
      df_cpm: '',
      dp_db: '',
      peak_share: '',
      rhythm: '',
      flags: '',
    });
  });
});

describe('minutes.csv', () => {
  it('has heart rate and RMSSD of CV-23 in the minute that holds its beats', () => {
    // CV-23: heart rate from the mean NN 73.998 per minute, RMSSD 42.485 ms.
    const [first, second] = table('minutes.csv');
    expect(first).toMatchObject({
      minute: '0',
      heart_rate_bpm: '74.0',
      rmssd_ms: '42.5',
      beats: '7',
    });
    expect(second).toMatchObject({
      heart_rate_bpm: '',
      rmssd_ms: '',
      beats: '0',
      open_doubts: '0',
    });
    const rr = input.heart?.rr;
    if (!rr) throw new Error('heart');
    expect(minuteOfHeart(rr, 0, []).heartRateBpm).toBeCloseTo(73.998, 3);
    expect(minuteOfHeart(rr, 0, []).rmssdMs).toBeCloseTo(42.485, 3);
  });
  it('counts the open doubts that end in the minute, those of another lead apart', () => {
    const at = (toS: number, lead: string | null) => ({ ...doubtAt(1), toS, lead });
    const lead = input.stomach[0].lead;
    const openDoubts = [at(10, null), at(59.9, lead), at(60, null), at(61, '#9')];
    const counts = table('minutes.csv', { ...input, openDoubts }).map((row) => row.open_doubts);
    expect(counts.slice(0, 2)).toEqual(['2', '1']);
  });
  it('pairs no intervals across one that is not NN, was removed, or ends in another minute', () => {
    const rr = input.heart?.rr;
    if (!rr) throw new Error('heart');
    // By hand: without 790 the pairs are 800-810, 860-800, 800-805: sqrt((100 + 3600 + 25) / 3).
    const expected = Math.sqrt(3725 / 3);
    const notNn = { ...rr, nn: Uint8Array.of(1, 1, 0, 1, 1, 1) };
    expect(minuteOfHeart(notNn, 0, []).rmssdMs).toBeCloseTo(expected, 9);
    const without = (column: Float64Array) => column.filter((_, i) => i !== 2);
    const removed = { timesS: without(rr.timesS), rrMs: without(rr.rrMs), nn: rr.nn.slice(1) };
    expect(minuteOfHeart(removed, 0, []).rmssdMs).toBeCloseTo(expected, 9);
    // A minute that begins at 12.3 s holds the intervals 790 ending at 12.4 and all after it.
    expect(minuteOfHeart(rr, 12.3, []).rmssdMs).toBeCloseTo(Math.sqrt((4900 + 3600 + 25) / 3), 9);
  });
  it('has no RMSSD where the minute lies in a segment whose rhythm is irregular, but its heart rate', () => {
    const heart = input.heart;
    if (!heart) throw new Error('heart');
    const segment = (state: 'irregular' | 'used', fromS: number, toS: number) => ({
      phase: 'fasting',
      fromS,
      toS,
      nnShare: 1,
      state,
      sdnnMs: null,
      lfMs2: null,
      hfMs2: null,
    });
    const minute = (...segments: ReturnType<typeof segment>[]) =>
      table('minutes.csv', { ...input, heart: { ...heart, segments } })[0];
    expect(minute(segment('irregular', 0, 150))).toMatchObject({
      heart_rate_bpm: '74.0',
      rmssd_ms: '',
    });
    expect(minute(segment('used', 0, 150)).rmssd_ms).toBe('42.5');
    // By hand: with what ends before 12 s left out the pairs are 790-860, 860-800, 800-805.
    expect(minute(segment('irregular', 0, 12), segment('used', 12, 150)).rmssd_ms).toBe(
      Math.sqrt((4900 + 3600 + 25) / 3).toFixed(1),
    );
  });
  it('has the stomach columns of the epoch centred at the start of the minute', () => {
    const rows = table('minutes.csv');
    expect(rows.map((row) => row.df_cpm)).toEqual(['', '2.95', '']);
    expect(rows.map((row) => row.phase)).toEqual(['fasting', '', '']);
    const [rhythm] = input.stomach;
    const off = [epoch({ fromS: 20, toS: 140 }), epoch({ fromS: 100, toS: 220, dfCpm: 3 })];
    const shifted = { ...input, stomach: [{ ...rhythm, epochs: off }] };
    expect(table('minutes.csv', shifted).map((row) => row.df_cpm)).toEqual(['', '2.95', '']);
  });
  it('counts what is spoiled for the stomach, also of a last minute that is cut short', () => {
    const rows = table('minutes.csv');
    expect(rows.map((row) => row.spoiled_fraction)).toEqual(['0.0000', '0.2500', '0.0000']);
    const [talk] = input.state.spans;
    const late = {
      ...input,
      state: { ...input.state, spans: [{ ...talk, fromS: 135, toS: 200 }] },
    };
    expect(table('minutes.csv', late)[2].spoiled_fraction).toBe('0.5000');
  });
  it('has the breathing of the window around it, and nothing where that cannot be told', () => {
    expect(table('minutes.csv').map((row) => row.breathing_bpm)).toEqual(['14.3', '', '']);
  });
  it('has the breathing of its own lead also where there is no heart lead', () => {
    const breathing = {
      centresS: Float64Array.of(30, 90),
      perMinute: Float64Array.of(15.2, 16.1),
      from: 'lead' as const,
    };
    const rows = table('minutes.csv', { ...input, heart: null, breathing });
    expect(rows.map((row) => row.breathing_bpm)).toEqual(['15.2', '16.1', '']);
    expect(rows[0]).toMatchObject({ heart_rate_bpm: '', rmssd_ms: '' });
  });
});

describe('spans.csv', () => {
  it('is in order of start, with an apostrophe before what looks like a formula', () => {
    expect(table('spans.csv')).toEqual([
      {
        from_s: '60.000000',
        to_s: '63.000000',
        lead: '#2',
        for: 'heart',
        cause: 'talk',
        origin: 'drawn',
        note: '',
      },
      {
        from_s: '70.000000',
        to_s: '85.000000',
        lead: '',
        for: 'stomach',
        cause: 'talk',
        origin: 'drawn',
        note: '\'=talk, "loud"',
      },
    ]);
  });
});

describe('findings.json', () => {
  const findings = () => JSON.parse(fileOf('findings.json'));
  it('says which study, program, edit and settings its figures belong to', () => {
    expect(findings()).toMatchObject({
      format: 'bicadence-findings',
      program: 'Bicadence 0.1.0',
      sha256: 'ab'.repeat(32),
      edit: 7,
      study: { code: 'INV-7', duration_s: 150, invented: true },
      roles: { slow: ['#1~#2'], reported: '#1~#2', heart: '#2', breath: null },
      settings: { slow_band_cpm: [0.8, 10], epoch: { length_s: 240, max_spoiled: 0.25 } },
    });
  });
  it('has each figure as a number with its unit, a count, or withheld with the reason', () => {
    const [fasting] = findings().phases;
    expect(fasting).toMatchObject({
      name: 'fasting',
      coverage_stomach: 0.9769,
      adequacy_heart: 'limited',
    });
    expect(fasting.figures).toEqual({
      time_normo_pct: { count: 5, of: 7, what: 'epochs', marks: ['short'] },
      rmssd_ms: { unit: 'ms', value: 42.5, basis: '5 pairs', marks: [] },
      lf_ms2: { unit: 'ms²', withheld: 'under 2 min' },
    });
    expect(findings().changes).toEqual([
      { key: 'rmssd_ms', from: 'fasting', to: 'fed', unit: 'ms', withheld: 'no fed' },
    ]);
  });
  it('has the site’s ranges beside the numbers they fit, and no such key elsewhere', () => {
    const range: SiteRange = {
      figure: 'rmssd_ms',
      phase: 'fasting',
      minMinutes: 0.5,
      maxMinutes: 60,
      posture: '',
      meal: '',
      low: 11,
      high: null,
      population: 'invented people',
      source: '<b>invented</b>',
    };
    const [fasting] = findings().phases;
    const minutes = (fasting.to_s - fasting.from_s) / 60;
    expect(minutes).toBeGreaterThan(0.5);
    const siteReference = { ranges: [range, { ...range, figure: 'lf_ms2' }] };
    const [beside] = JSON.parse(fileOf('findings.json', { ...input, siteReference })).phases;
    expect(beside.figures).toEqual({
      ...fasting.figures,
      rmssd_ms: {
        ...fasting.figures.rmssd_ms,
        references_of_this_site: [
          {
            high: null,
            low: 11,
            max_minutes: 60,
            meal: '',
            min_minutes: 0.5,
            phase: 'fasting',
            population: 'invented people',
            posture: '',
            source: '<b>invented</b>',
          },
        ],
      },
    });
  });
  it('has its figures in the order of the catalogue, whatever order they were made in', () => {
    const [fasting] = findings().phases;
    const order = FIGURES.map((figure) => figure.key).filter((key) => key in fasting.figures);
    expect(Object.keys(fasting.figures)).toEqual(order);
    const { settings } = input.state;
    const turned = Object.fromEntries(Object.entries(settings).reverse()) as typeof settings;
    const other = { ...input, state: { ...input.state, settings: turned } };
    expect(fileOf('findings.json', other)).toBe(fileOf('findings.json'));
  });
  it('carries no figure that the catalogue does not define', () => {
    const [phase] = input.findings.phases;
    const strange = { ...phase, figures: { mood: { kind: 'withheld', reason: '' } as const } };
    const other = { ...input, findings: { ...input.findings, phases: [strange] } };
    expect(() => tableFiles(other)).toThrow('mood');
  });
});
