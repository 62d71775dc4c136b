import { describe, expect, it } from 'vitest';
import { figureStates } from '../../src/session/figure-states';
import { replay } from '../../src/session/log';
import { workedSession } from './worked-session';

describe('the states a session’s figures went through', () => {
  const session = workedSession();
  const inputsOf = ({ roles, phases, settings, beats, spans }: typeof session.state) => ({
    roles,
    phases,
    settings,
    beats,
    spans,
  });

  it('are those after each line that changed what figures are computed from, and no others', () => {
    const { start, together, along } = figureStates(session, 100);
    expect(start).toEqual({ edit: 0, state: session.start });
    expect(together).toBe(0);
    let before = inputsOf(session.start);
    const changing = session.log.flatMap(({ n }) => {
      const state = replay(session.start, session.log.slice(0, n));
      const now = inputsOf(state);
      const same = JSON.stringify(now) === JSON.stringify(before);
      before = now;
      return same ? [] : [{ edit: n, state }];
    });
    expect(changing.length).toBeGreaterThan(8);
    expect(along.map(({ edit }) => edit)).toEqual(changing.map(({ edit }) => edit));
    expect(along).toEqual(changing);
  });

  it('of a long log are the last ones, what went before them taken together', () => {
    const all = figureStates(session, 100).along;
    const { together, along } = figureStates(session, 3);
    expect(along.slice(1)).toEqual(all.slice(-3));
    expect(together).toBe(all[all.length - 3].edit - 1);
    expect(along[0]).toEqual({
      edit: together,
      state: replay(session.start, session.log.slice(0, together)),
    });
  });
});
