import { expect, it } from 'vitest';
import { NO_BEATS } from '../../src/recording/beat';
import type { Lead } from '../../src/recording/lead';
import type { Roles } from '../../src/recording/roles';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import type { Given } from '../../workers/analysis-api';
import { proposalOf } from '../../workers/command-proposal';
import { startJob } from '../../workers/job';
import { inventedInput } from '../export/invented-input';

const { recording } = inventedInput();
const one = (channel: number): Lead => ({ kind: 'channel', channel });
/** The second lead is the better one, but that is known only once both were read. */
const unread: Roles = { slow: [one(0), one(1)], reported: 0, heart: one(0), breath: null };
const read: Roles = { ...unread, reported: 1 };
const pipeline = {
  firstRoles: async () => unread,
  propose: async ({ roles }: Given) => ({
    roles: roles ?? read,
    reasons: { slow: [], reported: 'best quality', heart: '', breath: '' },
    phases: [],
    phasesFrom: 'none' as const,
    spans: [],
    beats: NO_BEATS,
  }),
};
const proposed = (part: { readonly slow?: readonly string[]; readonly heart?: string }) =>
  proposalOf(
    pipeline,
    recording,
    { slow: [], heart: null, breath: null, phases: null, ...part },
    DEFAULT_SETTINGS,
    startJob(() => undefined).job,
  );

it('a slow-wave lead named on the command line is reported because it was named', async () => {
  const { roles, reasons } = await proposed({ slow: ['#1'] });
  expect(roles).toMatchObject({ slow: [one(0)], reported: 0 });
  expect(reasons.reported).toBe('named on the command line');
});

it('with the heart lead alone named, the reported lead is that of the best quality still', async () => {
  const { roles, reasons } = await proposed({ heart: '#2' });
  expect(roles).toEqual({ ...read, heart: one(1) });
  expect(reasons.reported).toBe('best quality');
  expect((await proposed({})).roles).toEqual(read);
});
