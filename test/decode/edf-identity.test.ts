import { describe, expect, it } from 'vitest';
import { openRecording } from '../../src/decode/formats';
import { blobOf, type FileBytes } from './edf-bytes';

const open = (file: FileBytes) => openRecording(blobOf(file), 'study.edf', null);
const GOOD: FileBytes = { signals: [{ records: [[0]] }] };

describe('who and when', () => {
  it('come from the subfields of EDF+', async () => {
    const { recording } = await open({
      ...GOOD,
      patient: 'INV-07 M 29-JAN-1956 Invented_Person',
      recording: 'Startdate 02-MAR-2021 EMG jop N1 L_Biceps_Brachii',
    });
    // Birth date and recording subfields are examples of Kemp & Olivan 2003 with another start date.
    expect(recording.identity).toEqual({
      code: 'INV-07',
      name: 'Invented Person',
      sex: 'M',
      birthYear: 1956,
      recordingText: 'EMG, jop, N1, L Biceps Brachii',
    });
    expect(recording.start).toEqual({ kind: 'known', local: '2021-03-02T10:20:30' });
  });

  it('are null where EDF+ says X', async () => {
    const { recording } = await open(GOOD);
    expect(recording.identity).toEqual({
      code: null,
      name: null,
      sex: null,
      birthYear: null,
      recordingText: '',
    });
  });

  it('of plain EDF stay whole, as a name, since they may hold one', async () => {
    const { recording } = await open({
      ...GOOD,
      patient: 'no. 17, Invented P.',
      recording: 'ward 3',
    });
    expect(recording.identity).toMatchObject({
      code: null,
      name: 'no. 17, Invented P.',
      recordingText: 'ward 3',
    });
  });

  it.each(['00.00.00', '32.13.99', '3/14/21', '-', '31.02.20'])(
    'are unknown where the date is “%s”',
    async (startDate) => {
      const { recording } = await open({ ...GOOD, startDate, recording: '' });
      expect(recording.start).toMatchObject({ kind: 'unknown' });
      expect(recording.found.some((found) => found.what.includes('start'))).toBe(true);
    },
  );

  it('are unknown where the header gives two dates', async () => {
    const { recording } = await open({ ...GOOD, startDate: '01.01.85' });
    expect(recording.start).toEqual({ kind: 'unknown', raw: '01.01.85 10.20.30' });
    expect(recording.found[0].what).toMatch(/two start dates/);
  });

  it('beyond 2084 come from the long date', async () => {
    const { recording } = await open({
      ...GOOD,
      startDate: '02.03.yy',
      recording: 'Startdate 02-MAR-2099 X X X',
    });
    expect(recording.start).toEqual({ kind: 'known', local: '2099-03-02T10:20:30' });
  });

  it('say invented where the header does', async () => {
    const { recording } = await open({ ...GOOD, patient: 'INVENTED-01 X X invented_data' });
    expect(recording.invented).toBe(true);
    expect((await open(GOOD)).recording.invented).toBe(false);
  });
});
