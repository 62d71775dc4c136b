import { describe, expect, it } from 'vitest';
import {
  addSlowLead,
  readRoles,
  removeSlowLead,
  reportedChanged,
  rolesDraft,
} from '../../src/app/roles-draft';
import type { Channel } from '../../src/recording/channel';
import type { Roles } from '../../src/recording/roles';

const channel = (index: number, rateHz: number): Channel => ({
  index,
  label: `lead ${index + 1}`,
  rateHz,
  sampleCount: 1,
  unit: { kind: 'voltage', text: 'uV', microvoltsPerUnit: 1 },
  stepUv: 1,
  railsUv: null,
  transducer: '',
  prefilter: { kind: 'unknown', text: '' },
});
const CHANNELS = [channel(0, 250), channel(1, 250), channel(2, 25)];
const BEFORE: Roles = {
  slow: [
    { kind: 'channel', channel: 0 },
    { kind: 'channel', channel: 1 },
  ],
  reported: 0,
  heart: { kind: 'difference', plus: 0, minus: 1 },
  breath: null,
};

describe('leads and their roles', () => {
  it('come back unchanged where nothing was chosen', () => {
    expect(readRoles(rolesDraft(BEFORE), BEFORE, CHANNELS).roles).toEqual(BEFORE);
  });

  it('want a reason where another lead is reported, and only there', () => {
    const draft = { ...rolesDraft(BEFORE), reported: 1 };
    const silent = readRoles(draft, BEFORE, CHANNELS);
    expect(silent.roles).toBeNull();
    expect(silent.errors.reason).toMatch(/why/);
    const said = readRoles({ ...draft, reason: 'electrode 1 came off' }, BEFORE, CHANNELS);
    expect(said.roles?.reported).toBe(1);
  });

  it('see a change of the reported lead in what it is made of, not in its place', () => {
    const moved = removeSlowLead({ ...rolesDraft(BEFORE), reported: 1, reason: 'x' }, 0);
    const { roles } = readRoles(moved, BEFORE, CHANNELS);
    expect(roles?.slow).toEqual([{ kind: 'channel', channel: 1 }]);
    expect(roles && reportedChanged(BEFORE, roles)).toBe(true);
    const swapped: Roles = { ...BEFORE, slow: [BEFORE.slow[1], BEFORE.slow[0]], reported: 1 };
    expect(reportedChanged(BEFORE, swapped)).toBe(false);
  });

  it('are refused where channels of different rates, or a channel and itself, are subtracted', () => {
    const heart = (plus: number, minus: number) =>
      readRoles({ ...rolesDraft(BEFORE), heart: { id: -1, plus, minus } }, BEFORE, CHANNELS).errors
        .heart;
    expect(heart(0, 2)).toMatch(/250 and 25 Hz/);
    expect(heart(1, 1)).toMatch(/itself/);
    expect(heart(1, 0)).toBeNull();
  });

  it('do not hold the same slow-wave lead twice', () => {
    const draft = rolesDraft(BEFORE);
    const twice = { ...draft, slow: [...draft.slow, { id: 7, plus: 0, minus: null }] };
    const { roles, errors } = readRoles(twice, BEFORE, CHANNELS);
    expect(roles).toBeNull();
    expect(errors.slow[7]).toMatch(/already/);
    const grown = addSlowLead(draft, CHANNELS);
    expect(grown.slow[2].plus).toBe(2);
  });
});
