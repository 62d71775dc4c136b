import { describe, expect, it } from 'vitest';
import type { Channel } from '../../src/recording/channel';
import type { Lead } from '../../src/recording/lead';
import type { Recording } from '../../src/recording/recording';
import { checkRoles, codeOf, phasesWithin, rolesWith } from '../../workers/command-choices';
import { WrongArguments } from '../../workers/command-line';
import { inventedInput } from '../export/invented-input';

const { recording: invented } = inventedInput();
const channel = (index: number, label: string, parts: Partial<Channel> = {}): Channel => ({
  ...invented.channels[0],
  index,
  label,
  ...parts,
});
const recording: Recording = {
  ...invented,
  fileName: 'study.edf',
  durationS: 5399.98,
  channels: [
    channel(0, 'EGG 1'),
    channel(1, 'EGG 2'),
    channel(2, 'Resp', { unit: { kind: 'unknown', text: 'cmH2O' } }),
    channel(3, 'Slow', { rateHz: 25 }),
  ],
};
const one = (index: number): Lead => ({ kind: 'channel', channel: index });
const proposed = { slow: [one(0), one(1)], reported: 1, heart: one(0), breath: null };
const named = (slow: string[], heart: string | null = null, breath: string | null = null) =>
  rolesWith(proposed, { slow, heart, breath }, recording);

describe('leads named on the command line', () => {
  it('stand in the place of the proposed ones, the first slow one reported; the others stay', () => {
    expect(named(['#2~#1'], null, 'Resp')).toEqual({
      slow: [{ kind: 'difference', plus: 1, minus: 0 }],
      reported: 0,
      heart: one(0),
      breath: one(2),
    });
    expect(named([], 'EGG 2')).toEqual({ ...proposed, heart: one(1) });
    expect(() => named(['EGG 9'])).toThrow(/names no lead of study\.edf; it has #1 EGG 1/);
  });

  it.each([
    [named(['Resp']), 'slow-wave lead of study.edf: Resp is in "cmH2O"'],
    [named([], '#3'), 'heart lead of study.edf: Resp is in "cmH2O"'],
    [named(['#1~#4']), 'Rates differ: 250 and 25 Hz'],
    [{ ...proposed, heart: one(7) }, 'There is no channel #8'],
  ])('are refused where they cannot serve (%#)', (roles, words) => {
    expect(() => checkRoles(roles, recording)).toThrow(WrongArguments);
    expect(() => checkRoles(roles, recording)).toThrow(words);
  });

  it('may be in any unit for breathing', () => {
    expect(() => checkRoles(named([], null, 'Resp'), recording)).not.toThrow();
  });
});

describe('phases', () => {
  const fed = (fromS: number, toS: number) =>
    phasesWithin([{ name: 'fed', fromS, toS }], recording);

  it('that reach past the recording are refused with its end', () => {
    expect(() => fed(2400, 9000)).toThrow(WrongArguments);
    expect(() => fed(2400, 9000)).toThrow(/phase fed .* study\.edf ends at 5399\.98 s/);
    expect(() => fed(6000, 9000)).toThrow(WrongArguments);
  });

  it('typed to the whole second end with the recording', () => {
    expect(fed(2400, 5400)).toEqual([{ name: 'fed', fromS: 2400, toS: 5399.98 }]);
    expect(fed(2400, 5000)).toEqual([{ name: 'fed', fromS: 2400, toS: 5000 }]);
  });
});

it('a study without a code in its header is called by its hash, never by its file', () => {
  const nameless = { ...recording, identity: { ...recording.identity, code: null } };
  const sha256 = '0123456789abcdef'.repeat(4);
  expect(codeOf(null, nameless, sha256)).toBe('study-01234567');
  expect(codeOf(null, recording, sha256)).toBe('INV-7');
  expect(codeOf('P-12', recording, sha256)).toBe('P-12');
});
