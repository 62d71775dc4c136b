import { describe, expect, it } from 'vitest';
import { copyReview } from '../../src/app/room/review-copy';
import { createShellStore } from '../../src/app/shell-store';
import {
  identityTexts,
  plainLabel,
  recordingWithout,
  stateWithout,
  without,
} from '../../src/export/without-identity';
import type { Recording } from '../../src/recording/recording';
import { deleteBeats, setField } from '../../src/session/edits';
import { paneStudy, RATE_HZ, recordingOf } from '../review/pane-study';
import { signature } from '../session/invented-session';

/** An invented person in every place of a file where one can stand. */
const NAMED: Recording = (() => {
  const plain = recordingOf(600);
  return {
    ...plain,
    fileName: 'Maria_Mustermann_2024.edf',
    identity: {
      code: 'PAT-4711',
      name: 'Mustermann, Maria',
      sex: 'F',
      birthYear: 1961,
      recordingText: 'Ward 7 Dr Beispiel',
    },
    start: { kind: 'known', local: '2024-05-14T09:00:00' },
    channels: plain.channels.map((one, i) => ({
      ...one,
      label: ['EGG 1', 'Mustermann', 'Lead 2-3'][i],
      transducer: 'belonging to Mustermann',
      prefilter: { kind: 'unknown', text: 'Maria' },
    })),
    annotations: [{ onsetS: 10, durationS: null, text: 'Maria coughs' }],
    found: [{ severity: 'note', what: 'label of Mustermann', place: null }],
  };
})();

function namedReview() {
  const { stores, state } = paneStudy();
  const { session, analysis } = stores;
  const apply = session.getState().apply;
  session.getState().setReviewer('B. Beispiel');
  apply(setField(state(), 'phases', [{ name: 'Maria fed', fromS: 0, toS: 300 }], 'phases'));
  apply(setField(state(), 'events', [{ id: 1, atS: 5, text: 'Maria drank' }], 'events'));
  apply(setField(state(), 'notes', 'Mustermann was calm', 'remarks'));
  const place = { minutes: { fromS: 0, toS: 60 }, seconds: { fromS: 0, toS: 10 }, rows: [] };
  const bookmark = { ...place, id: 1, note: 'where PAT-4711 talks' };
  apply(setField(state(), 'bookmarks', [bookmark], 'bookmark'));
  analysis.setState({ recording: NAMED, findings: { ...signature(4).findings } });
  return { ...stores, shell: createShellStore(null) };
}

const NAMES = /maria|mustermann|4711|beispiel|ward 7|2024|\.edf/i;

describe('a copy for the room', () => {
  it('holds no text that says whose study it is', () => {
    const { session, analysis, view, shell } = copyReview(namedReview());
    const all = [session, analysis, view, shell].map((store) => store.getState());
    expect(JSON.stringify(all)).not.toMatch(NAMES);
  });

  it('holds the same beats, spans, phases and places', () => {
    const review = namedReview();
    const real = review.session.getState().session;
    const copy = copyReview(review).session.getState().session;
    expect(copy?.state.beats).toBe(real?.state.beats);
    expect(copy?.state.phases).toMatchObject([{ fromS: 0, toS: 300, name: '… fed' }]);
    expect(copy?.state.bookmarks).toMatchObject([{ seconds: { fromS: 0, toS: 10 } }]);
    expect(copy?.log).toEqual([]);
  });

  it('is edited without the review noticing', () => {
    const review = namedReview();
    const before = review.session.getState().session;
    const copy = copyReview(review);
    const state = copy.session.getState().session?.state;
    if (!state) throw new Error('no copy');
    copy.session.getState().apply(deleteBeats(state, [state.beats.ticks[5]], RATE_HZ));
    expect(copy.session.getState().session?.state.beats.ticks.length).toBe(598);
    expect(review.session.getState().session).toBe(before);
    copy.view.setState({ cursorS: 3 });
    expect(review.view.getState().cursorS).toBeNull();
  });

  it('takes nothing from a page without a study', () => {
    const { stores } = paneStudy();
    expect(() => copyReview({ ...stores, shell: createShellStore(null) })).toThrow(/no review/);
  });
});

describe('labels of channels', () => {
  it('stay where they say what is measured', () => {
    for (const label of ['EGG', 'EGG 1', 'ECG', 'E1', 'Lead 2-3', 'abdomen_4', 'Resp', 'aVF', '12'])
      expect(plainLabel(label, 0), label).toBe(label);
  });

  it('give way to a number where they may be a name', () => {
    for (const label of ['Mustermann', 'ECG Maria', 'M. M.', 'EGG/Müller', '', 'W', 'Ward 7'])
      expect(plainLabel(label, 2), label).toBe('channel 3');
  });
});

describe('texts of an identity', () => {
  it('are taken out of words whatever their case, name by name', () => {
    const { session } = namedReview();
    const open = session.getState().session;
    if (!open) throw new Error('no session');
    const texts = identityTexts(NAMED, open);
    expect(without('MARIA at 3 cpm, see maria_mustermann_2024.EDF', texts)).toBe(
      '… at 3 cpm, see …',
    );
    expect(stateWithout(open.state, texts).study).toMatchObject({ code: '', quickKey: '' });
    expect(recordingWithout(NAMED).durationS).toBe(600);
  });

  it('that are shorter than three letters are no names', () => {
    const { session } = namedReview();
    const open = session.getState().session;
    if (!open) throw new Error('no session');
    expect(identityTexts(recordingOf(600), open)).not.toContain('X');
  });
});
