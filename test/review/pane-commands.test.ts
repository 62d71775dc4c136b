import { describe, expect, it, vi } from 'vitest';
import { BEAT_CLASSES, BEAT_ORIGINS, firstBeatAt } from '../../src/recording/beat';
import type { Span } from '../../src/recording/span';
import { rowsNow } from '../../src/review/gain-commands';
import { isIdle } from '../../src/review/idle';
import { type PaneStudy, paneStudy, RATE_HZ } from './pane-study';

const SECOND = RATE_HZ * 64;
const idle = () => vi.waitFor(() => expect(isIdle()).toBe(true));
const chosen = ({ stores }: PaneStudy) => {
  const { selection } = stores.view.getState();
  return selection.kind === 'beats' ? selection.ticks.map((tick) => tick / SECOND) : selection;
};
const beatOf = (study: PaneStudy, tick: number) => {
  const { ticks, classes, origins } = study.state().beats;
  const index = firstBeatAt(study.state().beats, tick);
  return ticks[index] === tick
    ? [BEAT_CLASSES[classes[index]], BEAT_ORIGINS[origins[index]]]
    : null;
};

describe('choosing beats', () => {
  it('steps to the next and the beat before, from the middle of Seconds', () => {
    const study = paneStudy();
    study.commands.goTo(100.5);
    study.commands.selectNextBeat();
    expect(chosen(study)).toEqual([101]);
    study.commands.selectPreviousBeat();
    study.commands.selectPreviousBeat();
    expect(chosen(study)).toEqual([99]);
    expect(study.said.at(-1)).toBe('beat N at 0:01:39.000, interval 1000 ms');
  });

  it('brings a beat outside the window in sight', () => {
    const study = paneStudy();
    study.commands.goTo(100);
    study.commands.selectBeat(200 * SECOND, false);
    study.commands.selectNextBeat();
    const { fromS, toS } = study.stores.view.getState().seconds;
    expect(fromS).toBeLessThan(201);
    expect(toS).toBeGreaterThan(201);
  });

  it('extends from what is selected over all beats between', () => {
    const study = paneStudy();
    study.commands.selectBeat(50 * SECOND, false);
    study.commands.selectBeat(47 * SECOND, true);
    expect(chosen(study)).toEqual([47, 48, 49, 50]);
    study.commands.selectBeat(52 * SECOND, true);
    expect(chosen(study)).toEqual([47, 48, 49, 50, 51, 52]);
  });

  it('grows and shrinks at the loose end, the end it began with staying', () => {
    const study = paneStudy();
    study.commands.selectBeat(50 * SECOND, false);
    study.commands.extendToNextBeat();
    study.commands.extendToNextBeat();
    expect(chosen(study)).toEqual([50, 51, 52]);
    expect(study.said.at(-1)).toBe('3 beats from 0:00:50.0 to 0:00:52.0 selected');
    study.commands.extendToPreviousBeat();
    expect(chosen(study)).toEqual([50, 51]);
    study.commands.extendToPreviousBeat();
    study.commands.extendToPreviousBeat();
    expect(chosen(study)).toEqual([49, 50]);
    study.commands.extendToNextBeat();
    expect(chosen(study)).toEqual([50]);
  });

  it('begins with the next beat where none is selected', () => {
    const study = paneStudy();
    study.commands.goTo(100.5);
    study.commands.extendToNextBeat();
    expect(chosen(study)).toEqual([101]);
  });

  it('takes all beats of a stretch, both ends included', () => {
    const study = paneStudy();
    study.commands.selectBeatsWithin({ fromS: 7, toS: 9.5 });
    expect(chosen(study)).toEqual([7, 8, 9]);
    study.commands.selectBeatsWithin({ fromS: 9.2, toS: 9.8 });
    expect(chosen(study)).toEqual([]);
    expect(study.said.at(-1)).toBe('No beat selected');
  });

  it('says so at the ends', () => {
    const study = paneStudy();
    study.commands.selectBeat(599 * SECOND, false);
    study.commands.selectNextBeat();
    expect(study.said.at(-1)).toBe('No beat after this');
    expect(chosen(study)).toEqual([599]);
  });
});

describe('mending beats', () => {
  it('classes many beats in one undo step', () => {
    const study = paneStudy();
    study.commands.selectBeat(10 * SECOND, false);
    study.commands.selectBeat(12 * SECOND, true);
    study.commands.classSelected('V');
    expect(study.edits).toHaveLength(1);
    expect(beatOf(study, 11 * SECOND)).toEqual(['V', 'detected']);
    study.stores.session.getState().undo();
    expect(beatOf(study, 11 * SECOND)).toEqual(['N', 'detected']);
  });

  it('deletes many beats in one undo step', () => {
    const study = paneStudy();
    study.commands.selectBeatsWithin({ fromS: 10, toS: 14 });
    study.commands.deleteSelected();
    expect(study.edits).toEqual(['delete 5 beats 0:00:10.0-0:00:14.0']);
    expect(study.state().beats.ticks.length).toBe(594);
    study.stores.session.getState().undo();
    expect(study.state().beats.ticks.length).toBe(599);
  });

  it('is no edit where nothing would change', () => {
    const study = paneStudy();
    study.commands.selectBeat(10 * SECOND, false);
    study.commands.classSelected('N');
    study.commands.moveSelected(0);
    expect(study.edits).toEqual([]);
  });

  it('moves a beat by one sample of its lead, or by milliseconds, and keeps it selected', async () => {
    const study = paneStudy({ placeBeat: async () => ({ tick: 10 * SECOND, visible: true }) });
    study.commands.selectBeat(10 * SECOND, false);
    study.commands.moveSelectedBySamples(1);
    await idle();
    expect(beatOf(study, 10 * SECOND + 64)).toEqual(['N', 'moved']);
    study.commands.moveSelected(-10);
    await idle();
    expect(beatOf(study, 10 * SECOND + 64 - 0.01 * SECOND)).toEqual(['N', 'moved']);
    expect(chosen(study)).toEqual([10 + 0.004 - 0.01]);
  });

  it('a beat moved away from its R peak is placed: its intervals are not NN', async () => {
    const study = paneStudy({ placeBeat: async () => ({ tick: 10 * SECOND, visible: true }) });
    study.commands.moveBeatTo(10 * SECOND, 10.3);
    await idle();
    expect(beatOf(study, 10.3 * SECOND)).toEqual(['N', 'placed']);
    expect(study.said.at(-1)).toMatch(/not NN/);
  });

  it('a beat never passes its neighbours, however far it is dragged', async () => {
    const study = paneStudy({ placeBeat: async (s) => ({ tick: s * SECOND, visible: true }) });
    study.commands.moveBeatTo(10 * SECOND, 3);
    await idle();
    expect(beatOf(study, 9.1 * SECOND)).toEqual(['N', 'moved']);
    expect(study.state().beats.ticks).toHaveLength(599);
  });

  it('deletes what is selected and goes on to the beat after it', () => {
    const study = paneStudy();
    study.commands.selectBeat(10 * SECOND, false);
    study.commands.selectBeat(12 * SECOND, true);
    study.commands.deleteSelected();
    expect(study.state().beats.ticks).toHaveLength(596);
    expect(chosen(study)).toEqual([13]);
  });

  it('adds a beat where the R peak is, at the cursor', async () => {
    const placeBeat = vi.fn(async () => ({ tick: 20.5 * SECOND, visible: true }));
    const study = paneStudy({ placeBeat });
    study.commands.goTo(20);
    study.stores.view.setState({ cursorS: 20.4 });
    study.commands.addBeatAtCursor();
    await idle();
    expect(placeBeat).toHaveBeenCalledWith(20.4);
    expect(beatOf(study, 20.5 * SECOND)).toEqual(['N', 'added']);
    expect(chosen(study)).toEqual([20.5]);
  });

  it('calls a beat without a visible peak placed, and says what that means', async () => {
    const study = paneStudy({ placeBeat: async (s) => ({ tick: s * SECOND, visible: false }) });
    study.commands.addBeatNear(30.25);
    await idle();
    expect(beatOf(study, 30.25 * SECOND)).toEqual(['N', 'placed']);
    expect(study.said.at(-1)).toMatch(/not NN/);
  });

  it('does not add a second beat to one that stands there, and selects that one', async () => {
    const study = paneStudy({ placeBeat: async () => ({ tick: 30.02 * SECOND, visible: true }) });
    study.commands.addBeatNear(30.1);
    await idle();
    expect(study.edits).toEqual([]);
    expect(study.errors[0]).toMatch(/stands at 0:00:30.000 already/);
    expect(chosen(study)).toEqual([30]);
  });

  it('tells when the recording could not be read there', async () => {
    const study = paneStudy();
    study.commands.addBeatNear(30.25);
    await idle();
    expect(study.edits).toEqual([]);
    expect(study.errors).toHaveLength(1);
  });
});

describe('spoiled spans', () => {
  const span = (id: number, fromS: number, parts: Partial<Span> = {}): Span => ({
    id,
    fromS,
    toS: fromS + 10,
    lead: null,
    target: 'both',
    cause: 'talk',
    origin: 'proposed',
    note: '',
    ...parts,
  });

  it('are drawn on all leads for both organs and selected at once', () => {
    const study = paneStudy();
    study.commands.excludeRange(100, 140);
    const [made] = study.state().spans;
    expect(made).toMatchObject({
      fromS: 100,
      toS: 140,
      lead: null,
      target: 'both',
      origin: 'drawn',
    });
    expect(chosen(study)).toEqual({ kind: 'span', id: made.id });
  });

  it('that the program proposed become the reviewer’s own when changed', () => {
    const study = paneStudy({}, { spans: [span(1, 50)] });
    study.commands.selectSpan(1);
    study.commands.changeSelectedSpan({ target: 'heart' });
    expect(study.state().spans[0]).toMatchObject({ id: 1, target: 'heart', origin: 'drawn' });
  });

  it('are taken away by the same key as beats', () => {
    const study = paneStudy({}, { spans: [span(1, 50), span(2, 90)] });
    study.commands.selectSpan(1);
    study.commands.deleteSelected();
    expect(study.state().spans.map((one) => one.id)).toEqual([2]);
    expect(study.state().beats.ticks).toHaveLength(599);
  });

  it('are gone through in the order of time', () => {
    const study = paneStudy({}, { spans: [span(2, 400), span(1, 50)] });
    study.commands.home();
    study.commands.selectNextSpan();
    expect(chosen(study)).toEqual({ kind: 'span', id: 1 });
    study.commands.selectNextSpan();
    expect(chosen(study)).toEqual({ kind: 'span', id: 2 });
    study.commands.selectNextSpan();
    expect(study.said.at(-1)).toBe('No spoiled span after this');
  });
});

describe('gains', () => {
  const rowKey = 'minutes:slow-wave:#1';

  it('stay until they are changed, step by step', () => {
    const study = paneStudy();
    study.stores.view.setState({ gainsUv: { [rowKey]: 200 }, selectedRow: rowKey });
    study.commands.gainUp();
    expect(study.stores.view.getState().gainsUv[rowKey]).toBe(150);
    study.commands.goTo(500);
    expect(study.stores.view.getState().gainsUv[rowKey]).toBe(150);
  });

  it('can be made the same for all rows of a pane', () => {
    const study = paneStudy();
    study.stores.view.setState({ gainsUv: { [rowKey]: 300, 'seconds:heartbeat:#2': 70 } });
    study.commands.gainSame(rowKey);
    const { gainsUv } = study.stores.view.getState();
    expect(gainsUv['minutes:recorded:#2']).toBe(300);
    expect(gainsUv['seconds:heartbeat:#2']).toBe(70);
  });

  it('fit what is in view', async () => {
    const study = paneStudy({
      columns: async (request) => ({
        request,
        timesS: Float64Array.of(1, 2),
        low: Float32Array.of(-60, -60),
        high: Float32Array.of(30, 20),
      }),
    });
    study.commands.gainFit(rowKey);
    await idle();
    expect(study.stores.view.getState().gainsUv[rowKey]).toBe(70);
  });

  it('of the spectrogram shift its level scale, the same for the whole study', () => {
    const study = paneStudy();
    study.stores.view.setState({ levelsDb: [10, 60] });
    study.commands.gainUp('minutes:spectrogram');
    expect(study.stores.view.getState().levelsDb).toEqual([5, 55]);
    study.commands.gainFit('minutes:spectrogram');
    expect(study.stores.view.getState().levelsDb).toBeNull();
  });

  it('act on rows in turn', () => {
    const study = paneStudy();
    const keys = rowsNow(study.stores)
      .filter((row) => row.kind === 'signal' || row.kind === 'spectrogram')
      .map((row) => row.key);
    const seen = keys.map(() => {
      study.commands.cycleRow();
      return study.stores.view.getState().selectedRow;
    });
    expect(seen).toEqual(keys);
  });
});

describe('without a heart lead or a study', () => {
  it('nothing acts and nothing fails', () => {
    const study = paneStudy(
      {},
      {
        roles: { slow: [{ kind: 'channel', channel: 0 }], reported: 0, heart: null, breath: null },
      },
    );
    study.commands.selectNextBeat();
    study.commands.addBeatAtCursor();
    study.commands.deleteSelected();
    study.stores.session.getState().close();
    study.commands.excludeRange(1, 2);
    study.commands.gainUp();
    study.commands.cycleRow();
    expect(study.edits).toEqual([]);
    expect(study.errors).toEqual([]);
  });
});
