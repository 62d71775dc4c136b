import { describe, expect, it } from 'vitest';
import {
  addEvent,
  addRow,
  type PhaseRow,
  phaseNames,
  proposedFed,
  readPhases,
  rowsOf,
  withTypedEvent,
} from '../../src/app/phase-draft';

const STUDY_S = 5400;
const row = (id: number, name: string, from: string, to: string): PhaseRow => ({
  id,
  name,
  from,
  to,
});

describe('typed phases', () => {
  it('are read from seconds, m:ss and h:mm:ss alike, in the order of time', () => {
    const { phases, errors } = readPhases(
      [
        row(0, 'fed', '0:42:00', '1:30:00'),
        row(1, 'fasting', '0', '30:00'),
        row(2, 'meal', '1800', '40:00'),
      ],
      STUDY_S,
    );
    expect(errors).toEqual({});
    expect(phases).toEqual([
      { name: 'fasting', fromS: 0, toS: 1800 },
      { name: 'meal', fromS: 1800, toS: 2400 },
      { name: 'fed', fromS: 2520, toS: 5400 },
    ]);
  });

  it('come back as they were typed', () => {
    const phases = [
      { name: 'fasting', fromS: 0, toS: 1800.5 },
      { name: 'meal', fromS: 1800.5, toS: 2400.125 },
    ];
    expect(readPhases(rowsOf(phases), STUDY_S).phases).toEqual(phases);
  });

  it('are refused beside the field that is wrong', () => {
    const faults = (rows: readonly PhaseRow[]) => readPhases(rows, STUDY_S).errors;
    expect(faults([row(0, 'fasting', 'soon', '30:00')])[0].from).toMatch(/h:mm:ss/);
    expect(faults([row(0, 'fasting', '0', '30:75')])[0].to).toMatch(/h:mm:ss/);
    expect(faults([row(0, 'fasting', '30:00', '30:00')])[0].to).toMatch(/after the start/);
    expect(faults([row(0, 'fasting', '0', '2:00:00')])[0].to).toMatch(/ends at 1:30:00/);
    const twice = faults([row(0, 'fed', '0', '60'), row(1, 'fed', '60', '120')]);
    expect(twice[0].name).toMatch(/two phases/);
    const over = faults([row(0, 'fasting', '0', '31:00'), row(1, 'meal', '30:00', '40:00')]);
    expect(over[1].from).toMatch(/before fasting ends at 0:31:00/);
  });

  it('may end with the last fraction of a second of the recording, and are cut there', () => {
    const { phases, errors } = readPhases([row(0, 'fasting', '0', '1:30:00')], 5399.6);
    expect(errors).toEqual({});
    expect(phases[0].toS).toBe(5399.6);
  });
});

describe('proposals', () => {
  it('begin the fed phase two minutes after the meal ends', () => {
    const rows = [row(0, 'fasting', '0', '30:00'), row(1, 'meal', '30:00', '40:00')];
    const fed = proposedFed(rows, STUDY_S);
    expect(fed?.rows[2]).toMatchObject({ name: 'fed', from: '0:42:00', to: '1:30:00' });
    expect(fed && proposedFed(fed.rows, STUDY_S)).toBeNull();
  });

  it('serve the second meal of a long study too', () => {
    const rows = [
      row(0, 'meal', '0', '600'),
      row(1, 'fed', '720', '3000'),
      row(2, 'meal-2', '3000', '3600'),
    ];
    expect(proposedFed(rows, STUDY_S)?.rows[3]).toMatchObject({ name: 'fed-2', from: '1:02:00' });
    expect(phaseNames(rows)).toContain('fed-3');
  });

  it('add phases in the order of a test meal, each where the last one ends', () => {
    const first = addRow([], STUDY_S);
    expect(first[0]).toMatchObject({ name: 'fasting', from: '0:00:00' });
    const rows = addRow([row(0, 'fasting', '0', '30:00')], STUDY_S);
    expect(rows[1]).toMatchObject({ name: 'meal', from: '0:30:00' });
    expect(
      addRow([...rows.slice(0, 1), row(1, 'meal', '30:00', '40:00')], STUDY_S)[2],
    ).toMatchObject({ name: 'fed', from: '0:42:00' });
  });
});

describe('events', () => {
  it('are kept in the order of time, each with an id of its own', () => {
    const first = addEvent([], { at: '52:40', text: ' turned over ' }, STUDY_S);
    if (!first.ok) throw new Error('refused');
    const second = addEvent(first.events, { at: '3:00', text: 'cough' }, STUDY_S);
    if (!second.ok) throw new Error('refused');
    expect(second.events.map(({ atS, text }) => [atS, text])).toEqual([
      [180, 'cough'],
      [3160, 'turned over'],
    ]);
    expect(new Set(second.events.map((one) => one.id)).size).toBe(2);
  });

  it('want a time inside the recording and some words', () => {
    expect(addEvent([], { at: '2:00:00', text: '' }, STUDY_S)).toEqual({
      ok: false,
      at: 'The recording ends at 1:30:00.',
      text: 'Say what happened.',
    });
  });

  it('are kept with the one that is typed but not yet added; a blank one is none', () => {
    const noted = [{ id: 1, atS: 60, text: 'cough' }];
    expect(withTypedEvent(noted, { at: ' ', text: '' }, STUDY_S)).toEqual({
      ok: true,
      events: noted,
    });
    const grown = withTypedEvent(noted, { at: '12:30', text: 'nausea' }, STUDY_S);
    expect(grown.ok && grown.events.map(({ atS, text }) => [atS, text])).toEqual([
      [60, 'cough'],
      [750, 'nausea'],
    ]);
    expect(withTypedEvent(noted, { at: '12:30', text: '' }, STUDY_S)).toEqual({
      ok: false,
      text: 'Say what happened.',
    });
    expect(withTypedEvent(noted, { at: '', text: 'nausea' }, STUDY_S)).toMatchObject({
      ok: false,
      at: expect.stringMatching(/h:mm:ss/),
    });
  });
});
