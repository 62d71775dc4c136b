import { describe, expect, it } from 'vitest';
import {
  addRow,
  type PhaseRow,
  phaseNames,
  proposedFed,
  readPhases,
  rowsOf,
} from '../../src/app/phase-draft';

/** An invented recording of an hour and a half from twelve minutes past nine. */
const STUDY = { durationS: 5400, startOfDayS: 33_120 };
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
      STUDY,
    );
    expect(errors).toEqual({});
    expect(phases).toEqual([
      { name: 'fasting', fromS: 0, toS: 1800 },
      { name: 'meal', fromS: 1800, toS: 2400 },
      { name: 'fed', fromS: 2520, toS: 5400 },
    ]);
  });

  it('are read from the clock where they are typed so', () => {
    const rows = [row(0, 'fasting', '@9:12', '9:42 am'), row(1, 'meal', '09:42:00', '2400')];
    expect(readPhases(rows, STUDY)).toEqual({
      phases: [
        { name: 'fasting', fromS: 0, toS: 1800 },
        { name: 'meal', fromS: 1800, toS: 2400 },
      ],
      errors: {},
    });
  });

  it('come back as they were typed', () => {
    const phases = [
      { name: 'fasting', fromS: 0, toS: 1800.5 },
      { name: 'meal', fromS: 1800.5, toS: 2400.125 },
    ];
    expect(readPhases(rowsOf(phases), STUDY).phases).toEqual(phases);
  });

  it('are refused beside the field that is wrong', () => {
    const faults = (rows: readonly PhaseRow[]) => readPhases(rows, STUDY).errors;
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
    const { phases, errors } = readPhases([row(0, 'fasting', '0', '1:30:00')], {
      ...STUDY,
      durationS: 5399.6,
    });
    expect(errors).toEqual({});
    expect(phases[0].toS).toBe(5399.6);
  });
});

describe('proposals', () => {
  it('begin the fed phase two minutes after the meal ends', () => {
    const rows = [row(0, 'fasting', '0', '30:00'), row(1, 'meal', '30:00', '40:00')];
    const fed = proposedFed(rows, STUDY);
    expect(fed?.rows[2]).toMatchObject({ name: 'fed', from: '0:42:00', to: '1:30:00' });
    expect(fed && proposedFed(fed.rows, STUDY)).toBeNull();
  });

  it('serve the second meal of a long study too', () => {
    const rows = [
      row(0, 'meal', '0', '600'),
      row(1, 'fed', '720', '3000'),
      row(2, 'meal-2', '3000', '3600'),
    ];
    expect(proposedFed(rows, STUDY)?.rows[3]).toMatchObject({ name: 'fed-2', from: '1:02:00' });
    expect(phaseNames(rows)).toContain('fed-3');
  });

  it('add phases in the order of a test meal, each where the last one ends', () => {
    const first = addRow([], STUDY);
    expect(first[0]).toMatchObject({ name: 'fasting', from: '0:00:00' });
    const rows = addRow([row(0, 'fasting', '0', '30:00')], STUDY);
    expect(rows[1]).toMatchObject({ name: 'meal', from: '0:30:00' });
    expect(addRow([...rows.slice(0, 1), row(1, 'meal', '30:00', '40:00')], STUDY)[2]).toMatchObject(
      { name: 'fed', from: '0:42:00' },
    );
  });
});
