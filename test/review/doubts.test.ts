import { beforeEach, describe, expect, it } from 'vitest';
import type { Beat } from '../../src/recording/beat';
import type { Doubt, Mend } from '../../src/recording/doubt';
import { numberFigure, withheld } from '../../src/recording/figure';
import { bringer, doubtActs, openNow } from '../../src/review/doubt-acts';
import { followDoubts, outcomeWords } from '../../src/review/doubt-follow';
import { createDoubtStore } from '../../src/review/doubt-store';
import { inSight } from '../../src/review/doubt-travel';
import { effectLine, mendWords, tabWords } from '../../src/review/doubt-words';
import { doubtInFront, mendableTogether, mendFits, openDoubts } from '../../src/review/open-doubts';
import { lookAtSeconds } from '../../src/review/view-store';
import { paneStudy, RATE_HZ } from './pane-study';

const tickAt = (s: number) => s * RATE_HZ * 64;
const beatN = (s: number): Beat => ({ tick: tickAt(s), beatClass: 'N', origin: 'detected' });

const insertAt = (s: number): Mend => ({
  kind: 'beats',
  words: 'insert beat',
  removed: [],
  added: [{ ...beatN(s), origin: 'added' }],
});
const removeAt = (s: number): Mend => ({
  kind: 'beats',
  words: 'remove beat',
  removed: [beatN(s)],
  added: [],
});
const classV = (s: number): Mend => ({
  kind: 'beats',
  words: 'class beat V',
  removed: [beatN(s)],
  added: [{ ...beatN(s), beatClass: 'V' }],
});

const doubt = (s: number, mend: Mend | null): Doubt => ({
  id: `extra-beat ${tickAt(s)}`,
  kind: 'extra-beat',
  fromS: s - 1,
  toS: s + 1,
  tick: tickAt(s),
  lead: null,
  why: 'It halves an interval.',
  mend,
  effect: {
    figure: 'rmssd_ms',
    phase: 'fed',
    before: numberFigure(38.24),
    after: numberFigure(31.36),
    weight: 2,
  },
});

/** A study with doubts at 100, 200 and 300 s, Seconds far from all of them. */
function desk(list: readonly Doubt[] = [100, 200, 300].map((s) => doubt(s, removeAt(s)))) {
  const study = paneStudy();
  const { session, view } = study.stores;
  const doubts = createDoubtStore();
  const opened: string[] = [];
  const parts = {
    stores: study.stores,
    doubts,
    act: {
      edit: (edit: Parameters<ReturnType<typeof session.getState>['apply']>[0]) =>
        session.getState().apply(edit),
      say: (text: string) => void study.said.push(text),
      reportError: (text: string) => void study.errors.push(text),
    },
    openLookAlikes: (id: string) => void opened.push(id),
  };
  const bring = bringer(parts);
  followDoubts(parts, bring);
  doubts.setState({ listed: list, search: { kind: 'there' } });
  const acts = doubtActs(parts, bring, () => undefined);
  lookAtSeconds(view, 500);
  const middle = () => (view.getState().seconds.fromS + view.getState().seconds.toS) / 2;
  return { ...study, doubts, acts, opened, middle, open: () => openNow(parts) };
}

describe('settling doubts one after another', () => {
  let at: ReturnType<typeof desk>;
  beforeEach(() => {
    at = desk();
  });

  it('takes three keys a person presses for three doubts, and one to come to the first', () => {
    at.acts.next();
    expect(at.middle()).toBe(100);
    at.acts.mend();
    expect(at.middle()).toBe(200);
    at.acts.keep();
    expect(at.middle()).toBe(300);
    at.acts.mend();
    expect(at.open()).toEqual([]);
    expect(at.doubts.getState().spoken).toBe('No open doubts are left.');
    const { beats, doubts } = at.state();
    expect([100, 200, 300].map((s) => beats.ticks.includes(tickAt(s)))).toEqual([
      false,
      true,
      false,
    ]);
    expect(doubts.map(({ ending }) => ending)).toEqual(['mended', 'kept', 'mended']);
  });

  it('settles nothing that is out of sight: the panes go there first', () => {
    at.acts.mend();
    expect(at.state().doubts).toEqual([]);
    expect(at.middle()).toBe(100);
    lookAtSeconds(at.stores.view, 400);
    at.acts.keep();
    expect(at.state().doubts).toEqual([]);
    expect(at.middle()).toBe(100);
    at.acts.keep();
    expect(at.state().doubts).toHaveLength(1);
  });

  it('is read out: where, why, what the mend would do to which figure', () => {
    at.acts.next();
    expect(at.doubts.getState().spoken).toBe(
      'Doubt 1 of 3, 0:01:40.0, extra beat? It halves an interval. Remove the beat: RMSSD, fed 38.2 to 31.4 ms.',
    );
  });

  it('says what was done with what it did, until something else is done', () => {
    at.acts.next();
    at.acts.mend();
    const { outcome } = at.doubts.getState();
    expect(outcome && outcomeWords(outcome)).toBe(
      'Mended: remove beat, 0:01:40.0; RMSSD, fed 38.2 to 31.4 ms',
    );
    at.commands.selectBeat(tickAt(50), false);
    at.commands.classSelected('V');
    expect(at.doubts.getState().outcome).toBeNull();
  });

  it('goes round: after the last comes the first, before the first the last', () => {
    at.acts.next();
    at.acts.previous();
    expect(at.middle()).toBe(300);
    at.acts.next();
    expect(at.middle()).toBe(100);
  });

  it('is taken back by undo, which brings the doubt to the front again', () => {
    at.acts.next();
    at.acts.mend();
    at.stores.session.getState().undo();
    expect(at.open().map(({ tick }) => tick)).toEqual([100, 200, 300].map(tickAt));
    expect(at.middle()).toBe(100);
    expect(at.doubts.getState().frontId).toBe(`extra-beat ${tickAt(100)}`);
    at.stores.session.getState().redo();
    expect(at.middle()).toBe(200);
  });

  it('picks out the beat that a mend would take, and draws the act where it is proposed', () => {
    at.acts.next();
    const { selection, doubt: mark } = at.stores.view.getState();
    expect(selection).toEqual({ kind: 'beats', ticks: [tickAt(100)] });
    expect(mark).toMatchObject({ words: 'remove?', atS: [100] });
  });

  it('leaves the panes where they are when an edit elsewhere removes the reason', () => {
    at.acts.next();
    lookAtSeconds(at.stores.view, 400);
    at.commands.selectBeat(tickAt(100), false);
    at.commands.deleteSelectedBeats();
    at.doubts.setState({ listed: [doubt(200, removeAt(200))] });
    expect(at.middle()).toBe(400);
    expect(at.stores.view.getState().doubt?.atS).toEqual([200]);
  });
});

describe('what cannot be mended', () => {
  it('is said where nothing is proposed', () => {
    const at = desk([doubt(100, null)]);
    at.acts.next();
    at.acts.mend();
    expect(at.state().doubts).toEqual([]);
    expect(at.said.at(-1)).toMatch(/^Nothing is proposed here/);
  });

  it('leaves the list at once where its beats are not there any more', () => {
    const at = desk([doubt(100, removeAt(100)), doubt(101, classV(100))]);
    at.acts.next();
    at.acts.mend();
    expect(at.open()).toEqual([]);
  });

  it('has no look-alikes where it is a stretch', () => {
    const at = desk([{ ...doubt(100, null), kind: 'span', tick: null }]);
    at.acts.next();
    at.acts.lookAlikes();
    expect(at.opened).toEqual([]);
    expect(at.said.at(-1)).toMatch(/^Only beats/);
  });
});

describe('a mend fits the study', () => {
  const { state } = paneStudy();
  it('where its beats stand as it says and its places are free', () => {
    expect(mendFits(state(), removeAt(100))).toBe(true);
    expect(mendFits(state(), removeAt(100.5))).toBe(false);
    expect(mendFits(state(), insertAt(100.5))).toBe(true);
    expect(mendFits(state(), insertAt(100))).toBe(false);
    expect(mendFits(state(), classV(100))).toBe(true);
    expect(mendFits(state(), { kind: 'include', words: 'include', spanId: 7 })).toBe(false);
  });

  it('and what was settled is open no more, whatever list it stands in', () => {
    const list = [doubt(100, null), doubt(200, null)];
    const settled = [{ id: list[0].id, ending: 'kept', tick: null } as const];
    expect(openDoubts(list, { ...state(), doubts: settled })).toEqual([list[1]]);
  });

  it('as one step with others only where no two touch the same beat', () => {
    const list = [doubt(100, removeAt(100)), doubt(101, classV(100)), doubt(200, classV(200))];
    expect(mendableTogether(list).map(({ tick }) => tick)).toEqual([tickAt(100), tickAt(200)]);
  });
});

describe('the doubt in front', () => {
  const at = (id: string): Doubt => ({ ...doubt(1, null), id });
  const open = [at('missed-beat-100'), at('odd-shape-300'), at('span-#1-40')];

  it('stays at its beat when a new list doubts that for another reason', () => {
    expect(doubtInFront(open, 'odd-shape-300')).toBe(open[1]);
    expect(doubtInFront(open, 'early-beat-300')).toBe(open[1]);
  });

  it('is the first where its place is in doubt no more, and none where no doubt is open', () => {
    expect(doubtInFront(open, 'early-beat-200')).toBe(open[0]);
    expect(doubtInFront(open, null)).toBe(open[0]);
    expect(doubtInFront([], 'early-beat-200')).toBeNull();
  });
});

describe('words', () => {
  it('name what a mend does', () => {
    expect(mendWords(doubt(752, insertAt(751.204)), RATE_HZ)).toBe('Insert a beat at 0:12:31.204');
    expect(mendWords(doubt(60, removeAt(60)), RATE_HZ)).toBe('Remove the beat');
    expect(mendWords(doubt(61, removeAt(60)), RATE_HZ)).toBe('Remove the beat at 0:01:00.000');
    expect(mendWords(doubt(60, classV(60)), RATE_HZ)).toBe('Class the beat V');
    const both: Mend = {
      kind: 'beats',
      words: 'insert beats',
      removed: [],
      added: [beatN(60), beatN(61)],
    };
    const words = mendWords(doubt(62, both), RATE_HZ);
    expect(words).toBe('Insert 2 beats at 0:01:00.000 and 0:01:01.000');
    expect([insertAt(1), removeAt(1), classV(1)].map((one) => tabWords(doubt(1, one)))).toEqual([
      'insert?',
      'remove?',
      'class V?',
    ]);
  });

  it('say of a figure that it is withheld', () => {
    const effect = {
      figure: 'hf_ms2',
      phase: 'fasting',
      before: numberFigure(512),
      after: withheld('too few NN'),
      weight: Number.POSITIVE_INFINITY,
    };
    expect(effectLine(effect)).toBe('HF, fasting 512 ms² to withheld');
    expect(effectLine({ ...effect, after: numberFigure(512.3) })).toBe('HF, fasting stays 512 ms²');
    expect(effectLine({ ...effect, before: effect.after, after: effect.before })).toBe(
      'HF, fasting withheld to 512 ms²',
    );
  });
});

describe('in sight', () => {
  const { stores } = paneStudy();
  it('is a short stretch by its middle in Seconds, a long one by any of it', () => {
    lookAtSeconds(stores.view, 100, 10);
    expect(inSight(stores.view, doubt(104, null))).toBe(true);
    expect(inSight(stores.view, doubt(106, null))).toBe(false);
    expect(inSight(stores.view, { ...doubt(1, null), fromS: 104, toS: 344 })).toBe(true);
    expect(inSight(stores.view, { ...doubt(1, null), fromS: 106, toS: 344 })).toBe(false);
  });
});
