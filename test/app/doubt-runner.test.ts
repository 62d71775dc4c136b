import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { runDoubts } from '../../src/app/doubt-runner';
import type { Doubt } from '../../src/recording/doubt';
import type { Reply } from '../../src/recording/failure';
import type { Findings } from '../../src/recording/findings';
import { createDoubtStore } from '../../src/review/doubt-store';
import { keepDoubts } from '../../src/session/edits';
import type { DoubtList } from '../../workers/analysis-api';
import { paneStudy, RATE_HZ } from '../review/pane-study';

const findingsOf = (edit: number): Findings => ({
  edit,
  phases: [],
  changes: [],
  seen: [],
  warnings: [],
});

const DOUBT: Doubt = {
  id: 'low-beat 1',
  kind: 'low-beat',
  fromS: 1,
  toS: 2,
  tick: RATE_HZ * 64,
  lead: null,
  why: 'It is low.',
  mend: null,
  effect: null,
};

interface Asked {
  readonly edit: number;
  readonly settled: readonly string[];
  readonly signal: AbortSignal | undefined;
  readonly answer: (reply: Reply<DoubtList>) => void;
}

/** A runner over a worker that answers when the test says so. */
function running() {
  const study = paneStudy();
  const { session, analysis } = study.stores;
  const doubts = createDoubtStore();
  const asked: Asked[] = [];
  const doubtAccess: Parameters<typeof runDoubts>[0]['doubtAccess'] = {
    doubts: (inputs, settled, options) =>
      new Promise((answer) => {
        const ids = settled.map(({ id }) => id);
        asked.push({ edit: inputs.edit, settled: ids, signal: options?.signal, answer });
      }),
    lookAlikes: async () => {
      throw new Error('nobody asks for look-alikes here');
    },
  };
  const lookAgain = runDoubts({ session, analysis, doubts, doubtAccess });
  const figures = (edit: number) => analysis.setState({ findings: findingsOf(edit), edit });
  const classBeat = (s: number) => {
    study.commands.selectBeat(s * RATE_HZ * 64, false);
    study.commands.classSelected('V');
  };
  return { ...study, doubts, asked, lookAgain, figures, classBeat };
}

const found = (edit: number, open: readonly Doubt[] = [DOUBT]): Reply<DoubtList> => ({
  ok: true,
  value: { edit, open },
});

describe('the search for doubts', () => {
  beforeEach(() => void vi.useFakeTimers());
  afterEach(() => void vi.useRealTimers());
  const later = () => vi.advanceTimersByTimeAsync(1000);

  it('waits for the figures of the last edit', async () => {
    const { asked, figures, doubts } = running();
    await later();
    expect(asked).toEqual([]);
    expect(doubts.getState().search.kind).toBe('waiting');
    figures(0);
    await later();
    expect(asked).toHaveLength(1);
    expect(doubts.getState().search.kind).toBe('looking');
    asked[0].answer(found(0));
    await later();
    expect(doubts.getState()).toMatchObject({
      listed: [DOUBT],
      edit: 0,
      search: { kind: 'there' },
    });
  });

  it('is given up and begun again where an edit makes it useless, and the old list stands meanwhile', async () => {
    const { asked, figures, classBeat, doubts } = running();
    figures(0);
    await later();
    asked[0].answer(found(0));
    await later();
    classBeat(10);
    figures(1);
    await later();
    classBeat(20);
    expect(asked[1].signal?.aborted).toBe(true);
    asked[1].answer(found(1, []));
    await later();
    expect(doubts.getState()).toMatchObject({ listed: [DOUBT], edit: 0 });
    figures(2);
    await later();
    expect(asked.map(({ edit }) => edit)).toEqual([0, 1, 2]);
    asked[2].answer(found(2, []));
    await later();
    expect(doubts.getState()).toMatchObject({ listed: [], edit: 2 });
  });

  it('is not needed when a doubt is kept, but when one settled before it is opened again', async () => {
    const { asked, figures, stores, classBeat, doubts } = running();
    const { session } = stores;
    figures(0);
    await later();
    asked[0].answer(found(0));
    await later();
    session.getState().apply(keepDoubts([DOUBT]));
    figures(1);
    await later();
    expect(asked).toHaveLength(1);
    expect(doubts.getState().edit).toBe(1);
    classBeat(10);
    figures(2);
    await later();
    expect(asked[1].settled).toEqual([DOUBT.id]);
    asked[1].answer(found(2, []));
    await later();
    session.getState().undo();
    figures(3);
    await later();
    asked[2].answer(found(3, []));
    await later();
    session.getState().undo();
    figures(4);
    await later();
    expect(asked[3].settled).toEqual([]);
  });

  it('says why it failed and is begun again only when asked', async () => {
    const { asked, figures, doubts, lookAgain } = running();
    const failure = { kind: 'crashed', message: 'It stopped.', place: null, remedy: '' } as const;
    figures(0);
    await later();
    asked[0].answer({ ok: false, failure });
    await later();
    figures(0);
    await later();
    expect(asked).toHaveLength(1);
    expect(doubts.getState().search).toEqual({ kind: 'failed', failure });
    lookAgain();
    await later();
    expect(asked).toHaveLength(2);
  });

  it('ends with the study', async () => {
    const { asked, figures, stores, doubts } = running();
    figures(0);
    await later();
    stores.session.getState().close();
    expect(asked[0].signal?.aborted).toBe(true);
    asked[0].answer(found(0));
    await later();
    expect(doubts.getState().listed).toBeNull();
  });
});
