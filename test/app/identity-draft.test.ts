import { describe, expect, it } from 'vitest';
import { codeFault, offeredCode } from '../../src/app/identity-draft';
import { readIdentity } from '../../src/decode/edf-identity';

const header = (patient: string) =>
  readIdentity({ patient, recording: '', startDate: '01.01.24', startTime: '10.00.00' });
/** What delimited text says of a person. */
const nobody = { code: null, name: null };

describe('the code a study is kept under', () => {
  it('is asked for where a text file names none', () => {
    expect(offeredCode(nobody, null)).toBe('');
    expect(codeFault('  ', nobody)).toMatch(/Type a code/);
    expect(codeFault('EG-0815', nobody)).toBeNull();
  });

  it('is never the name that plain EDF keeps in its one field for the patient', () => {
    const plain = header('Jane Q. Doe');
    expect(plain.name).toBe('Jane Q. Doe');
    expect(offeredCode(plain, null)).toBe('');
    expect(codeFault('jane q doe', plain)).toMatch(/name in the header/);
    expect(codeFault('EG-0815', plain)).toBeNull();
  });

  it('is the code field of EDF+, unless that repeats the name', () => {
    expect(offeredCode(header('MCH-0234567 F 02-MAY-1951 Haagse_Harry'), null)).toBe('MCH-0234567');
    expect(offeredCode(header('Doe_Jane F 02-MAY-1951 Doe_Jane'), null)).toBe('');
    expect(offeredCode(header('X X X X'), null)).toBe('');
  });

  it('stays that of the kept session', () => {
    expect(offeredCode(header('MCH-0234567 F X X'), 'EG-0815')).toBe('EG-0815');
  });
});
