import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { annotationsEdf } from '../../src/export/annotations-edf';
import { separatedEdf } from '../../src/export/separated-edf';
import { edflibProgram, type ReadByEdflib, readByEdflib } from '../fixtures/edflib/program';
import { SEPARATED_INPUT } from './separated-input';

/**
 * What Bicadence writes as EDF+ is opened by EDFlib 1.23 (Debian libedf-dev), which refuses files that break the format
 * (Kemp & Olivan 2003). Left out only where a machine that is no CI machine has no EDFlib.
 */
const program = edflibProgram();
const missing = program === null && !process.env.CI;

describe.skipIf(missing)('separated.edf opened by EDFlib', () => {
  const folder = mkdtempSync(join(tmpdir(), 'bicadence-edflib-'));
  let read: ReadByEdflib;
  beforeAll(() => {
    if (!program) throw new Error('no EDFlib: apt-get install gcc libedf-dev');
    const path = join(folder, 'separated.edf');
    writeFileSync(path, Buffer.concat([...separatedEdf(SEPARATED_INPUT)]));
    read = readByEdflib(program, path);
  });
  afterAll(() => rmSync(folder, { recursive: true }));

  it('is an EDF+ file with its labels, units, rates, length and start', () => {
    expect(read.filetype).toBe(1);
    expect(read.duration_s).toBe(100);
    expect(read.start).toBe('2024-05-14T09:00:00');
    expect(read.patient_code).toBe('INV-3');
    expect(read.equipment).toBe('Bicadence 0.1.0');
    expect(
      read.channels.map(({ label, unit, rate_hz }) => [label.trim(), unit.trim(), rate_hz]),
    ).toEqual([
      ['slow #1', 'uV', 4],
      ['heart #2', 'uV', 250],
    ]);
  });

  it('with the samples it was given, to half a step', () => {
    const given = [SEPARATED_INPUT.slow[0].samples, SEPARATED_INPUT.heart?.samples ?? []];
    read.channels.forEach(({ samples, step }, i) => {
      expect(samples.length).toBe(given[i].length);
      samples.forEach((value, k) => {
        const wanted = Number.isNaN(given[i][k]) ? 0 : given[i][k];
        expect(Math.abs(value - wanted)).toBeLessThan(0.501 * step);
      });
    });
  });

  it('with phases, spans, events, symptoms and beats as annotations', () => {
    expect(read.annotations).toEqual([
      [0, '60', 'fasting'],
      [10, '', 'beat N'],
      [11.001, '', 'beat V'],
      [25, '5', 'spoiled: gap, both, #1'],
      [40.5, '', 'event: drank 200 ml'],
      [50, '', 'symptom: nausea 6/10'],
    ]);
  });
});

describe.skipIf(missing)('annotations.edf opened by EDFlib', () => {
  it('is an EDF+ file of annotations alone, the same as those beside the signals', () => {
    if (!program) throw new Error('no EDFlib: apt-get install gcc libedf-dev');
    const folder = mkdtempSync(join(tmpdir(), 'bicadence-edflib-'));
    const path = join(folder, 'annotations.edf');
    writeFileSync(path, Buffer.concat([...annotationsEdf(SEPARATED_INPUT)]));
    const read = readByEdflib(program, path);
    rmSync(folder, { recursive: true });
    expect(read).toMatchObject({
      filetype: 1,
      duration_s: 100,
      patient_code: 'INV-3',
      channels: [],
    });
    expect(read.annotations.map(([, , text]) => text)).toEqual([
      ...['fasting', 'beat N', 'beat V', 'spoiled: gap, both, #1'],
      ...['event: drank 200 ml', 'symptom: nausea 6/10'],
    ]);
  });
});
