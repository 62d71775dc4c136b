import { describe, expect, it } from 'vitest';
import { editNameShown } from '../../src/app/edit-name';
import { blankNote, draftOf, readNote } from '../../src/app/note-draft';
import { BLANK_SPAN, leadOptions, readSpan, spanDraft } from '../../src/app/span-draft';
import type { Span } from '../../src/recording/span';

/** An invented recording of an hour and a half from twelve minutes past nine. */
const STUDY = { durationS: 5400, startOfDayS: 33_120 };

describe('a typed event or symptom', () => {
  it('is read with its time, from the start or from the clock', () => {
    const event = { ...blankNote('event', 754), text: ' drank 200 ml ' };
    expect(event.at).toBe('0:12:34');
    expect(readNote(event, STUDY)).toEqual({
      ok: true,
      note: { kind: 'event', atS: 754, text: 'drank 200 ml' },
    });
    expect(
      readNote({ kind: 'symptom', at: '@9:24:34', text: 'nausea', score: '0' }, STUDY),
    ).toEqual({ ok: true, note: { kind: 'symptom', atS: 754, text: 'nausea', score: 0 } });
  });

  it('is refused field by field', () => {
    expect(readNote(blankNote('event', null), STUDY)).toEqual({
      ok: false,
      faults: { at: expect.stringMatching(/^Type a time/), text: 'Say what happened.' },
    });
    expect(readNote({ kind: 'symptom', at: '2:00:00', text: 'pain', score: '' }, STUDY)).toEqual({
      ok: false,
      faults: {
        at: 'The recording ends at 1:30:00.',
        score: 'Type a whole number from 0 to 10.',
      },
    });
  });

  it('is offered for changing as it was written', () => {
    const note = { kind: 'symptom', id: 3, atS: 900.5, text: 'nausea', score: 6 } as const;
    const { id: _, ...same } = note;
    expect(readNote(draftOf(note), STUDY)).toEqual({ ok: true, note: same });
  });
});

const SPAN: Span = {
  id: 4,
  fromS: 60.123456,
  toS: 90,
  lead: '#1~#2',
  target: 'heart',
  cause: 'cough',
  origin: 'proposed',
  note: 'loud',
};

describe('the name of an edit', () => {
  it('leaves out what people wrote while identity is hidden, and nothing else', () => {
    const written = 'write symptom 0:15:00.5 nausea, Ms Kowalska 6/10';
    expect(editNameShown(written, true)).toBe('write symptom 0:15:00.5');
    expect(editNameShown(written, false)).toBe(written);
    for (const plain of ['change phases', 'exclude 0:01:00-0:02:00', 'class beat at 0:00:01 as V'])
      expect(editNameShown(plain, true)).toBe(plain);
  });
});

describe('a typed span', () => {
  it('is read with both times, for whom, why and on which lead', () => {
    const draft = { ...BLANK_SPAN, from: '@9:13', to: '90', cause: 'talk' as const, note: ' x ' };
    expect(readSpan(draft, STUDY, null)).toEqual({
      ok: true,
      parts: { fromS: 60, toS: 90, target: 'both', cause: 'talk', lead: null, note: 'x' },
    });
  });

  it('keeps the times that nobody typed anew to the last digit', () => {
    const draft = { ...spanDraft(SPAN), to: '91' };
    expect(draft.from).toBe('0:01:00.123');
    const read = readSpan(draft, STUDY, SPAN);
    expect(read.ok && [read.parts.fromS, read.parts.toS]).toEqual([60.123456, 91]);
  });

  it('wants an end after its start', () => {
    expect(readSpan({ ...BLANK_SPAN, from: '90', to: '1:30' }, STUDY, null)).toEqual({
      ok: false,
      faults: { to: 'The end must come after the start.' },
    });
    expect(readSpan(BLANK_SPAN, STUDY, null)).toMatchObject({
      faults: { from: expect.stringMatching(/^Type/), to: expect.stringMatching(/^Type/) },
    });
  });

  it('may be on all leads, one in use, or the one it is on already', () => {
    const roles = {
      slow: [{ kind: 'difference', plus: 0, minus: 1 }],
      reported: 0,
      heart: { kind: 'channel', channel: 1 },
      breath: null,
    } as const;
    expect(leadOptions(roles, ['A', 'B'], [SPAN, { lead: '#7' }, { lead: null }])).toEqual([
      ['', 'all leads'],
      ['#1~#2', 'A − B'],
      ['#7', '#7'],
      ['#2', 'B'],
    ]);
  });
});
