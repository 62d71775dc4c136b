import { describe, expect, it } from 'vitest';
import {
  addSlowLead,
  leadReason,
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

  it('in a unit that is no voltage are refused for stomach and heart, and serve for breathing', () => {
    const belt: Channel = { ...channel(2, 250), unit: { kind: 'unknown', text: 'cmH2O' } };
    const channels = [channel(0, 250), channel(1, 250), belt, channel(3, 250)];
    const on = { id: 5, plus: 2, minus: null };
    const read = (part: object) => readRoles({ ...rolesDraft(BEFORE), ...part }, BEFORE, channels);
    expect(read({ heart: on }).errors.heart).toMatch(/cmH2O/);
    expect(read({ slow: [on], reported: 5 }).errors.slow[5]).toMatch(/cmH2O/);
    expect(read({ heart: { ...on, plus: 0, minus: 2 } }).roles).toBeNull();
    expect(read({ breath: on }).roles?.breath).toEqual({ kind: 'channel', channel: 2 });
    expect(addSlowLead(rolesDraft(BEFORE), channels).slow[2].plus).toBe(3);
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

describe('the reason beside a lead', () => {
  const reasons = ['quiet', 'restless'];
  const row = (plus: number | null, minus: number | null = null) => ({ id: 9, plus, minus });

  it('is the program’s only for the lead the program chose, wherever it stands', () => {
    expect(leadReason(row(0), BEFORE.slow, reasons)).toBe('quiet');
    expect(leadReason(row(1), BEFORE.slow, reasons)).toBe('restless');
    expect(leadReason(row(0, 1), BEFORE.slow, reasons)).toBe('chosen by hand');
    expect(leadReason(row(2), BEFORE.slow, reasons)).toBe('chosen by hand');
  });

  it('tells "none" by hand from "none" because no channel serves', () => {
    expect(leadReason(row(null), [BEFORE.heart], ['clearest heartbeat'])).toBe('chosen by hand');
    expect(leadReason(row(null), [null], ['no channel in volts'])).toBe('no channel in volts');
  });

  it('is at least told apart where the program’s words are not at hand, as after a reload', () => {
    expect(leadReason(row(0), BEFORE.slow, null)).toBe('proposed by the program');
    expect(leadReason(row(2), BEFORE.slow, null)).toBe('chosen by hand');
  });
});
