import { describe, expect, it } from 'vitest';
import { editStatus } from '../../src/app/edit-status';
import { signatureLost, signatureState } from '../../src/app/signature-words';
import type { LogLine, Session, Signature } from '../../src/session/document';

/** A session of which only log and signatures matter here: `edits` lines, signed at some of them. */
function sessionWith(edits: number, signed: readonly (readonly [Signature['meaning'], number])[]) {
  const log = Array.from({ length: edits }, (_, i) => ({ n: i + 1 }));
  const signatures = signed.map(([meaning, edit]) => ({ meaning, name: 'A. Technician', edit }));
  return { log, state: { signed: signatures } } as unknown as Session;
}

describe('the signature in the bar', () => {
  it('is not spoken of before anybody has signed', () => {
    expect(signatureState(sessionWith(4, []))).toMatchObject({ words: '', changed: false });
  });

  it('says by whom the study was prepared, read or amended; signing itself is one more line of the log', () => {
    const words = (meaning: Signature['meaning']) =>
      signatureState(sessionWith(5, [[meaning, 4]])).words;
    expect(words('prepared')).toBe('prepared by A. Technician');
    expect(words('read')).toBe('signed as read by A. Technician');
    expect(words('amended')).toBe('amended and signed by A. Technician');
  });

  it('says that the study was changed since', () => {
    const { words, whole, changed } = signatureState(sessionWith(6, [['read', 4]]));
    expect(words).toBe('changed since signed');
    expect(whole).toMatch(/^changed since A\. Technician signed it/);
    expect(changed).toBe(true);
  });
});

describe('an edit of a signed study', () => {
  const read = sessionWith(5, [['read', 4]]);
  const edited = sessionWith(6, [['read', 4]]);

  it('says once that the report is a draft again', () => {
    expect(signatureLost(read, edited)).toMatch(/draft again\. Changed since A\. Technician/);
    expect(signatureLost(edited, sessionWith(7, [['read', 4]]))).toBeNull();
    expect(signatureLost(sessionWith(1, []), sessionWith(2, []))).toBeNull();
  });

  it('says only that it was changed where it had not been read yet, and was a draft', () => {
    const words = signatureLost(
      sessionWith(5, [['prepared', 4]]),
      sessionWith(6, [['prepared', 4]]),
    );
    expect(words).toMatch(/^Changed since A\. Technician prepared it/);
  });

  it('says nothing where the edit is a new signature', () => {
    const amended = sessionWith(7, [
      ['read', 4],
      ['amended', 6],
    ]);
    expect(signatureLost(edited, amended)).toBeNull();
  });
});

describe('the foot line', () => {
  const line = (act: LogLine['act']): LogLine => ({ n: 1, atUtc: '', reviewer: 'A', act });

  it('names each edit as Undo would, and leaves undo and redo their own words', () => {
    const name = 'class beat at 0:12:00.063 as V';
    const edit = { name, changes: [] };
    expect(editStatus(line({ kind: 'edit', edit }))).toBe(`Done: ${name}`);
    expect(editStatus(line({ kind: 'undo', of: 1 }))).toBe('');
  });
});
