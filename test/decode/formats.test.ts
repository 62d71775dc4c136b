import { describe, expect, it } from 'vitest';
import type { Format, Recognition } from '../../src/decode/format';
import { chooseFormat, FORMATS, openRecording } from '../../src/decode/formats';
import { edfBytes } from './edf-bytes';
import { refused } from './refused';

const row = (name: string, recognition: Recognition, ...extensions: string[]): Format => ({
  name,
  extensions,
  recognises: () => recognition,
  open: () => Promise.reject(new Error('not opened here')),
});
const signals = [{ records: [[1, 2]] }];
const open = (bytes: BlobPart, name = 'study.edf') => openRecording(new Blob([bytes]), name, null);

describe('the table of formats', () => {
  it('lets content decide before the name', () => {
    const head = edfBytes({ signals });
    for (const name of ['study.csv', 'study', 'study.bdf'])
      expect(chooseFormat(FORMATS, head, name)?.name).toBe('EDF');
    const text = new TextEncoder().encode('1,2\n3,4\n5,6\n');
    expect(chooseFormat(FORMATS, text, 'study.edf')?.name).toBe('delimited text');
  });

  it('asks the name only among possible rows', () => {
    const formats = [row('a', 'possible', 'x'), row('b', 'possible', 'y'), row('c', 'no', 'z')];
    const choose = (name: string) => chooseFormat(formats, new Uint8Array(1), name)?.name;
    expect(choose('study.Y')).toBe('b');
    expect(choose('study.z')).toBe('a');
    expect(choose('study')).toBe('a');
    expect(chooseFormat([row('c', 'no')], new Uint8Array(1), 'study.c')).toBeNull();
  });

  it('takes two rows that are certain of the same bytes for a programming error', () => {
    const formats = [row('a', 'certain'), row('b', 'certain')];
    expect(() => chooseFormat(formats, new Uint8Array(1), 'study')).toThrow(
      'formats claim the same bytes: a, b',
    );
  });

  it('has one row that is certain for each kind of header', () => {
    const certain = (file: Parameters<typeof edfBytes>[0]) =>
      FORMATS.filter((one) => one.recognises(edfBytes(file), '') === 'certain').map(
        (one) => one.name,
      );
    expect(certain({ signals })).toEqual(['EDF']);
    expect(certain({ reserved: 'EDF+C', signals })).toEqual(['EDF+C']);
    expect(certain({ reserved: 'EDF+', signals })).toEqual(['EDF+C']);
    expect(certain({ reserved: 'EDF+D', signals })).toEqual(['EDF+D']);
    expect(certain({ version: '\u00ffABCDEFG', reserved: '24BIT', signals })).toEqual(['BDF']);
    expect(certain({ version: '\u00ffABCDEFG', reserved: 'BDF+C', signals })).toEqual(['BDF+C']);
    expect(certain({ version: '\u00ffABCDEFG', reserved: 'BDF+D', signals })).toEqual(['BDF+D']);
  });
});

describe('files chosen by mistake are named as what they look like', () => {
  it.each<[string, BlobPart]>([
    ['an empty file', ''],
    ['a gzip archive', Uint8Array.of(0x1f, 0x8b, 8, 0)],
    ['a zip archive or an office document', 'PK\u0003\u0004....'],
    ['a PDF document', '%PDF-1.7\n'],
    ['a web page (HTML)', '\n<!DOCTYPE html><html><title>404</title>'],
    ['an XML file', '<?xml version="1.0"?>'],
    ['a JSON file', '{"format": 1}'],
    ['a PNG picture', Uint8Array.of(0x89, 0x50, 0x4e, 0x47, 13, 10)],
  ])('%s', async (words, bytes) => {
    const failure = await refused(open(bytes));
    expect(failure.kind).toBe('wrong-input');
    expect(failure.message).toBe(`study.edf: this looks like ${words}, not like a recording.`);
  });

  it('or as no format at all', async () => {
    const failure = await refused(open(Uint8Array.of(1, 0, 2, 0, 3, 200, 255)));
    expect(failure.message).toMatch(/no format that can be read/);
  });
});
