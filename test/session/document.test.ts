import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { BEAT_CLASSES, BEAT_ORIGINS, beatsOf } from '../../src/recording/beat';
import { Refusal } from '../../src/recording/failure';
import { compactBeats, expandBeats } from '../../src/session/compact-beats';
import { SESSION_VERSION, type Session } from '../../src/session/document';
import { safeCode, sessionFileName } from '../../src/session/file-name';
import { undoableEdit } from '../../src/session/log';
import { documentToSession, readLine, textToSession } from '../../src/session/read-document';
import { sameValue } from '../../src/session/same-value';
import { MIGRATIONS, migrate } from '../../src/session/versions';
import { documentText, lineToKept, sessionToDocument } from '../../src/session/write-document';
import { always } from '../properties';
import { workedSession } from './worked-session';

const worked = workedSession();
const written = () => JSON.parse(documentText(sessionToDocument(worked, 'Bicadence 0.1.0')));

function refusalOf(act: () => unknown): Refusal['failure'] {
  try {
    act();
  } catch (error) {
    if (error instanceof Refusal) return error.failure;
    throw error;
  }
  throw new Error('nothing was refused');
}

describe('beats in a file', () => {
  const beat = fc.record({
    tick: fc.integer({ min: 0, max: 2 ** 40 }),
    beatClass: fc.constantFrom(...BEAT_CLASSES),
    origin: fc.constantFrom(...BEAT_ORIGINS),
  });
  it('come back as they were, whatever they are', () => {
    const rows = fc.uniqueArray(beat, { selector: (one) => one.tick, maxLength: 200 });
    fc.assert(
      fc.property(rows, (list) => {
        const beats = beatsOf(list);
        const through = JSON.parse(JSON.stringify(compactBeats(beats)));
        expect(sameValue(expandBeats(through), beats)).toBe(true);
      }),
      always(100),
    );
  });
  it('are small: first tick, differences, and runs of class and origin', () => {
    const detected = { beatClass: 'N', origin: 'detected' } as const;
    const beats = beatsOf([
      { tick: 100, ...detected },
      { tick: 250, ...detected },
      { tick: 251, beatClass: 'V', origin: 'detected' },
    ]);
    expect(compactBeats(beats)).toEqual({
      ticks: [100, 150, 1],
      classes: [
        ['N', 2],
        ['V', 1],
      ],
      origins: [['detected', 3]],
    });
  });
  it('are refused where they stand still, go back, or their runs do not add up', () => {
    const good = { ticks: [5, 1], classes: [['N', 2]], origins: [['added', 2]] } as const;
    expect(expandBeats(good).ticks).toEqual(Float64Array.of(5, 6));
    expect(() => expandBeats({ ...good, ticks: [5, 0] })).toThrow('beat 2');
    expect(() => expandBeats({ ...good, classes: [['N', 1]] })).toThrow('add up to 2');
    expect(() => expandBeats({ ...good, classes: [['N', 3]] })).toThrow('add up to 2');
    expect(() => expandBeats({ ...good, origins: [['guessed', 2]] })).toThrow('"guessed"');
  });
});

describe('a session file', () => {
  it('gives the same session again, with what can be undone', () => {
    const again = textToSession(documentText(sessionToDocument(worked, 'Bicadence 0.1.0')));
    expect(sameValue(again, worked)).toBe(true);
    expect(undoableEdit(again)).toEqual(undoableEdit(worked));
  });

  it('holds no name of the person and says who prepared and read it', () => {
    const document = written();
    expect(Object.keys(document.study)).not.toContain('name');
    expect([document.preparedBy, document.readBy]).toEqual(['A. Tech', 'A. Reader']);
    expect(document.symptoms).toMatchObject([{ text: 'nausea', score: 4 }]);
    expect(document.doubts).toHaveLength(4);
    expect(document.bookmarks).toMatchObject([{ note: 'early' }]);
  });

  it('has one line a line of the log', () => {
    const lines = documentText(sessionToDocument(worked, 'x')).split('\n');
    expect(lines.filter((line) => line.startsWith('{"n":'))).toHaveLength(worked.log.length);
    expect(lines.at(-1)).toBe('');
  });

  it('is never written with what could not be read again', () => {
    const broken = { ...worked, state: { ...worked.state, notes: 5 } } as unknown as Session;
    expect(() => sessionToDocument(broken, 'x')).toThrow('notes');
    const endless = { ...worked.log[0], n: Number.POSITIVE_INFINITY };
    expect(() => lineToKept(endless)).toThrow('at n');
  });

  it('keeps each line of the log as it was', () => {
    for (const line of worked.log)
      expect(readLine(JSON.parse(JSON.stringify(lineToKept(line))))).toEqual(line);
    expect(refusalOf(() => readLine({ n: 1 })).place).toBe('atUtc');
  });
});

describe('what is no good session', () => {
  it('is refused as no session where it is something else', () => {
    for (const value of [null, 5, [], {}, { format: 'other', version: 1 }])
      expect(refusalOf(() => documentToSession(value))).toMatchObject({ kind: 'wrong-input' });
  });
  it('is refused as damaged where the text is cut off', () => {
    const cut = documentText(sessionToDocument(worked, 'x')).slice(0, 900);
    expect(refusalOf(() => textToSession(cut)).kind).toBe('broken-format');
  });
  it('is refused as newer, by the program that wrote it, with nothing changed', () => {
    const document = { ...written(), version: 7, program: 'Bicadence 9.0.0' };
    const before = JSON.stringify(document);
    const failure = refusalOf(() => documentToSession(document));
    expect(failure.kind).toBe('not-supported');
    expect(failure.message).toContain('Bicadence 9.0.0');
    expect(failure.remedy).toContain('Nothing was changed');
    expect(JSON.stringify(document)).toBe(before);
  });
  it('is refused as damaged with the path', () => {
    const cases: readonly [string, (document: ReturnType<typeof written>) => void][] = [
      ['version', (one) => (one.version = 'one')],
      ['spans.0.cause', (one) => (one.spans[0].cause = 'sneeze')],
      [
        'log.2.act.edit.changes.0.removed.0.1',
        (one) => (one.log[2].act.edit.changes[0].removed[0][1] = 'X'),
      ],
      ['settings.epoch.lengthS', (one) => (one.settings.epoch.lengthS = null)],
      ['beats', (one) => (one.beats.ticks[3] = -5)],
      ['start', (one) => one.start.beats.ticks.pop()],
      ['extra', (one) => (one.extra = 1)],
    ];
    for (const [path, damage] of cases) {
      const document = written();
      damage(document);
      expect(
        refusalOf(() => documentToSession(document)),
        path,
      ).toMatchObject({
        kind: 'broken-format',
        place: path,
      });
    }
  });
  it('is refused where its log does not lead to its state, and says to which part not', () => {
    const document = written();
    document.notes = 'other words';
    document.beats.ticks[0] += 1;
    document.beats.ticks[1] -= 1;
    expect(refusalOf(() => documentToSession(document)).message).toContain('beats, notes');
    const shuffled = written();
    shuffled.log.splice(1, 1);
    expect(refusalOf(() => documentToSession(shuffled)).message).toContain('line 3');
    const impossible = written();
    impossible.log[0].act.edit.changes[0].removed[0][0] += 1;
    expect(refusalOf(() => documentToSession(impossible)).message).toContain('no beat');
  });
});

describe('versions', () => {
  it('are led on by one named step each, without gaps', () => {
    expect(MIGRATIONS.map((step) => step.from)).toEqual(
      Array.from({ length: SESSION_VERSION - 1 }, (_, i) => i + 1),
    );
    expect(new Set(MIGRATIONS.map((step) => step.name)).size).toBe(MIGRATIONS.length);
  });
  it('are climbed in order, and a missing step is an error', () => {
    const steps = [
      { from: 2, name: 'b', up: (one: object) => ({ ...one, b: 1 }) },
      { from: 1, name: 'a', up: (one: object) => ({ ...one, a: 1 }) },
    ];
    expect(migrate({ version: 1 }, 1, steps, 3)).toEqual({ version: 3, a: 1, b: 1 });
    expect(() => migrate({ version: 1 }, 1, steps.slice(0, 1), 3)).toThrow('version 1');
  });
  it.each(Array.from({ length: SESSION_VERSION }, (_, i) => i + 1))(
    'opens the frozen sample of version %i',
    (version) => {
      const sample = readFileSync(`test/fixtures/session-v${version}.json`, 'utf8');
      expect(JSON.parse(sample).version).toBe(version);
      const session = textToSession(sample);
      expect(session.log.length).toBeGreaterThan(10);
      expect(session.state.study.code).toBe('INV-8');
      expect(session.state.signed.map((one) => one.meaning)).toEqual(['prepared', 'read']);
      expect(session.state.beats.ticks[0]).toBe(64);
    },
  );
});

describe('a session of version 1', () => {
  it('keeps the drawing it was made with: every settings object in it says so', () => {
    const sample = readFileSync('test/fixtures/session-v1.json', 'utf8');
    const session = textToSession(sample);
    const drawing = { slowGain: 'even', breathingOut: 'never' };
    expect(session.state.settings).toMatchObject(drawing);
    for (const signed of session.state.signed) expect(signed.settings).toMatchObject(drawing);
  });

  it('keeps what a newer program has written into its journal since', () => {
    const document = { version: 1, log: [{ settings: { slowRoute: 'band', slowGain: 'fitted' } }] };
    expect(migrate(document, 1, MIGRATIONS, 2)).toEqual({
      version: 2,
      log: [{ settings: { slowRoute: 'band', slowGain: 'fitted', breathingOut: 'never' } }],
    });
  });
});

describe('a session of version 3', () => {
  it('is given the average heartbeat of its day in every settings object', () => {
    const session = textToSession(readFileSync('test/fixtures/session-v3.json', 'utf8'));
    const said = { beatAverage: { beforeMs: 300, afterMs: 500, beats: 60 } };
    expect(session.state.settings).toMatchObject(said);
    for (const signed of session.state.signed) expect(signed.settings).toMatchObject(said);
  });
});

describe('the name of a session file', () => {
  it('is the code in characters that every system allows', () => {
    expect(sessionFileName(worked)).toBe('INV-8.bicadence.json');
    expect(safeCode('../a b/ü:7')).toBe('a_b_7');
    expect(safeCode(' . ')).toBe('study');
    expect(safeCode('con')).toBe('study-con');
    expect(safeCode('x'.repeat(200))).toHaveLength(80);
  });
});
