import { describe, expect, it } from 'vitest';
import {
  type FindingsCell,
  type FindingsTable,
  mainTables as mainTablesWith,
  otherTables as otherTablesWith,
} from '../../src/export/report-findings';
import { type Figures, type FigureValue, numberFigure, withheld } from '../../src/recording/figure';
import { FIGURES } from '../../src/recording/figure-catalogue';
import type { FigureChange, Findings, PhaseFindings } from '../../src/recording/findings';
import { EMPTY_PROTOCOL } from '../../src/recording/protocol';
import { rangesOf, type SiteRange } from '../../src/recording/site-reference';
import { INVENTED_RANGE } from '../recording/invented-range';

const mainTables = (all: Findings) => mainTablesWith(all, () => []);
const otherTables = (all: Findings) => otherTablesWith(all, () => []);

const part = (name: string, figures: Figures, phase = name): PhaseFindings => ({
  name,
  phase,
  fromS: 0,
  toS: 1800,
  keptStomachS: 1800,
  keptHeartS: 1800,
  adequacyStomach: 'enough',
  adequacyHeart: 'enough',
  figures,
});

const findings = (
  phases: readonly PhaseFindings[],
  changes: readonly FigureChange[] = [],
): Findings => ({ edit: 1, phases, changes, seen: [], warnings: [] });

const change = (key: string, value: FigureValue, to = 'fed'): FigureChange => ({
  key,
  from: 'fasting',
  to,
  value,
});

/** Fasting, meal, fed and a half of it with one figure each; fed is compared where a change is given. */
const oneFigure = (key: string, values: readonly FigureValue[], changed?: FigureValue) =>
  findings(
    [
      part('fasting', { [key]: values[0] }),
      part('meal', { [key]: numberFigure(99) }),
      part('fed', { [key]: values[1] }),
      part('fed 0-30', { [key]: values[2] }, 'fed'),
    ],
    changed ? [change(key, changed)] : [],
  );

function rowOf(table: FindingsTable, key: string) {
  const row = table.groups.flatMap(({ rows }) => rows).find((one) => one.key === key);
  if (!row) throw new Error(`no row ${key}`);
  return row;
}

const textsOf = (table: FindingsTable, letters: readonly string[]) =>
  letters.map((letter) => table.notes.find((note) => note.letter === letter)?.text);

const words = (cells: readonly FindingsCell[]) => cells.map((cell) => cell.words);

describe('the figures as the report prints them', () => {
  it('every figure of the catalogue is printed, main ones first and none twice over both tables', () => {
    const all = findings([part('fasting', {}), part('fed', {})]);
    const keys = (tables: readonly FindingsTable[]) =>
      tables.flatMap(({ groups }) => groups.flatMap(({ rows }) => rows.map(({ key }) => key)));
    const [table] = mainTables(all);
    const beside = table.groups.flatMap((group) => group.beside.map(({ key }) => key));
    const printed = [...keys(mainTables(all)), ...keys(otherTables(all))];
    expect(new Set([...printed, ...beside])).toEqual(new Set(FIGURES.map(({ key }) => key)));
    expect(new Set(printed).size).toBe(printed.length);
  });

  it('the meal has no column, and the change stands right after the fed phase it belongs to', () => {
    const values = [1, 2, 3].map((value) => numberFigure(value));
    const [table] = mainTables(oneFigure('df_median_cpm', values, numberFigure(1)));
    expect(table.columns).toEqual([
      { kind: 'phase', name: 'fasting' },
      { kind: 'phase', name: 'fed' },
      { kind: 'change', name: 'fed' },
      { kind: 'phase', name: 'fed 0-30' },
    ]);
    expect(words(rowOf(table, 'df_median_cpm').cells)).toEqual(['1.00', '2.00', '+1.00', '3.00']);
  });

  it('breathing, movement and heart rate stand with the changes they may explain', () => {
    const [table] = mainTables(findings([part('fasting', {}), part('fed', {})]));
    const beside = Object.fromEntries(
      table.groups.map((group) => [group.organ, group.beside.map(({ key }) => key)]),
    );
    expect(beside).toEqual({
      stomach: ['heart_rate_bpm', 'breathing_bpm', 'movement_pct'],
      heart: ['breathing_bpm', 'movement_pct'],
    });
  });

  it('what every column stands on is one note of the row, counts in turn', () => {
    const values = [27, 44, 25].map((n) => numberFigure(3, `${n} epochs`, ['derived']));
    const [table] = mainTables(oneFigure('df_median_cpm', values));
    const row = rowOf(table, 'df_median_cpm');
    expect(textsOf(table, row.letters)).toEqual(['27; 44; 25 epochs', 'derived']);
    expect(row.cells.every(({ letters }) => letters.length === 0)).toBe(true);
    expect(table.inOrderOf).toEqual(['fasting', 'fed', 'fed 0-30']);
  });

  it('a mark of one column stays in its cell', () => {
    const limited = ['limited: 35 % of the phase is lost'];
    const values = [numberFigure(3), numberFigure(3, null, limited), numberFigure(3)];
    const [table] = mainTables(oneFigure('df_median_cpm', values));
    const { letters, cells } = rowOf(table, 'df_median_cpm');
    expect(letters).toEqual([]);
    expect(cells.map((cell) => textsOf(table, cell.letters))).toEqual([[], limited, []]);
  });

  it('two marks that differ in their numbers alone are both said', () => {
    const twice = numberFigure(3, null, ['limited by 5', 'limited by 7']);
    const [table] = mainTables(oneFigure('df_median_cpm', [twice, twice, twice]));
    const { letters, cells } = rowOf(table, 'df_median_cpm');
    const said = [...textsOf(table, letters), ...textsOf(table, cells[0].letters)];
    expect(said).toEqual(['limited by 5', 'limited by 7']);
  });

  it('a withheld figure is a dash whose letter gives the reason', () => {
    const values = [numberFigure(11, '900 NN'), withheld('needs 20 min'), withheld('needs 20 min')];
    const [table] = otherTables(oneFigure('triangular_index', values));
    const { cells } = rowOf(table, 'triangular_index');
    expect(words(cells)).toEqual(['11.0', '—', '—']);
    expect(textsOf(table, cells[1].letters)).toEqual(['needs 20 min']);
    expect(cells[2].letters).toEqual(cells[1].letters);
    expect(table.hasWithheld).toBe(true);
  });

  it('a figure that nobody computed is a dash with a reason too, never an empty cell', () => {
    const [table] = mainTables(findings([part('fasting', {})]));
    for (const { cells } of table.groups.flatMap(({ rows, beside }) => [...rows, ...beside]))
      expect(cells.every((cell) => cell.words !== '' && cell.letters.length > 0)).toBe(true);
  });

  it('a figure never compared has a dash of its own kind; a change that fails says why', () => {
    const values = [1, 2, 3].map((value) => numberFigure(value));
    const [kept] = mainTables(oneFigure('stomach_kept_min', values, numberFigure(1)));
    expect(rowOf(kept, 'stomach_kept_min').cells[2]).toMatchObject({ kind: 'not-compared' });
    expect(kept.hasNotCompared).toBe(true);
    const [failed] = mainTables(oneFigure('rmssd_ms', values, withheld('both are needed')));
    const [, , cell] = rowOf(failed, 'rmssd_ms').cells;
    expect([cell.kind, textsOf(failed, cell.letters)]).toEqual(['withheld', ['both are needed']]);
  });

  it('counts instead of percent say what they count', () => {
    const count: FigureValue = { kind: 'count', count: 5, of: 7, what: 'epochs', marks: [] };
    const [table] = mainTables(oneFigure('time_normo_pct', [count, numberFigure(50), count]));
    const { cells } = rowOf(table, 'time_normo_pct');
    expect(cells[0].words).toBe('5 of 7');
    expect(textsOf(table, cells[0].letters)).toEqual(['epochs, not percent']);
  });

  it('the factor of a change in decibel stands beside it', () => {
    const values = [58, 62, 62].map((value) => numberFigure(value));
    const changed = numberFigure(4.1, '× 2.6');
    const [table] = mainTables(oneFigure('dp_mean_spectrum_db', values, changed));
    expect(rowOf(table, 'dp_mean_spectrum_db').cells[2]).toMatchObject({
      words: '+4.1',
      small: '× 2.6',
    });
  });

  it('many meals go into tables of two, each beginning with fasting', () => {
    const fed = ['fed', 'fed-2', 'fed-3'];
    const all = findings(
      [part('fasting', {}), ...fed.map((name) => part(name, {}))],
      fed.map((name) => change('rmssd_ms', numberFigure(1), name)),
    );
    const names = mainTables(all).map(({ columns }) =>
      columns.filter(({ kind }) => kind === 'phase').map(({ name }) => name),
    );
    expect(names).toEqual([
      ['fasting', 'fed', 'fed-2'],
      ['fasting', 'fed-3'],
    ]);
  });

  it('a study without phases has one column and compares nothing', () => {
    const [table, ...more] = mainTables(findings([part('whole', { rmssd_ms: numberFigure(30) })]));
    expect(more).toEqual([]);
    expect(table.columns).toEqual([{ kind: 'phase', name: 'whole' }]);
    expect([table.inOrderOf, table.hasNotCompared]).toEqual([[], false]);
  });
});

describe('the ranges that a site keeps', () => {
  const range: SiteRange = { ...INVENTED_RANGE, source: 'invented <b>paper</b>' };
  const reference = { ranges: [range, { ...range, phase: 'fed' as const, high: null }] };
  const values = [numberFigure(3), numberFigure(3.1), withheld('too short')];
  const [table] = mainTablesWith(
    oneFigure('df_median_cpm', values, numberFigure(0.1)),
    rangesOf(reference, EMPTY_PROTOCOL),
  );
  const { cells } = rowOf(table, 'df_median_cpm');

  it('stand in the cell of the phase they fit, not beside a change or a withheld figure', () => {
    expect(cells.map(({ ranges }) => ranges)).toEqual([['2.1–4.3'], ['at least 2.1'], [], []]);
    expect(table.hasRanges).toBe(true);
  });

  it('name what they hold for and their source in a note, as text', () => {
    expect(textsOf(table, cells[0].letters)).toEqual([
      'reference of this site: fasting of 25–35 min; invented people; source: invented <b>paper</b>',
    ]);
    expect(rowOf(table, 'rmssd_ms').cells.every(({ ranges }) => ranges.length === 0)).toBe(true);
  });
});
