import type { Channel } from '../recording/channel';
import { type Lead, type LeadUse, leadFault, leadKey, sameLead } from '../recording/lead';
import type { Roles } from '../recording/roles';

/** A lead as it is being chosen: channel numbers from 0; `minus` null for the channel itself, `plus` null for no lead. */
export interface LeadDraft {
  readonly id: number;
  readonly plus: number | null;
  readonly minus: number | null;
}

export interface RolesDraft {
  readonly slow: readonly LeadDraft[];
  /** Id of the slow-wave row whose figures are reported. */
  readonly reported: number;
  readonly heart: LeadDraft;
  readonly breath: LeadDraft;
  readonly reason: string;
}

export interface RolesErrors {
  /** By row id of the slow-wave leads. */
  readonly slow: Readonly<Record<number, string>>;
  readonly heart: string | null;
  readonly breath: string | null;
  readonly reason: string | null;
}

export const HEART_ID = -1;
export const BREATH_ID = -2;

const draftOf = (lead: Lead | null, id: number): LeadDraft => {
  if (!lead) return { id, plus: null, minus: null };
  return lead.kind === 'channel'
    ? { id, plus: lead.channel, minus: null }
    : { id, plus: lead.plus, minus: lead.minus };
};

export const rolesDraft = (roles: Roles): RolesDraft => ({
  slow: roles.slow.map(draftOf),
  reported: roles.reported,
  heart: draftOf(roles.heart, HEART_ID),
  breath: draftOf(roles.breath, BREATH_ID),
  reason: '',
});

/** A slow-wave row more, on the first channel that can serve and that no row uses alone. */
export function addSlowLead(draft: RolesDraft, channels: readonly Channel[]): RolesDraft {
  const id = 1 + Math.max(0, ...draft.slow.map((row) => row.id));
  const used = new Set(draft.slow.filter((row) => row.minus === null).map((row) => row.plus));
  const free =
    channels.find(({ index }) => !used.has(index) && canServe(index, channels, 'slow-wave'))
      ?.index ?? 0;
  return { ...draft, slow: [...draft.slow, { id, plus: free, minus: null }] };
}

/** The slow-wave rows without one; the first takes over where the reported one goes. */
export function removeSlowLead(draft: RolesDraft, id: number): RolesDraft {
  const slow = draft.slow.filter((row) => row.id !== id);
  const reported = draft.reported === id ? (slow[0]?.id ?? 0) : draft.reported;
  return { ...draft, slow, reported };
}

/** Whether a channel alone can serve. */
export const canServe = (channel: number, channels: readonly Channel[], use: LeadUse): boolean =>
  leadFault({ kind: 'channel', channel }, channels, use) === null;

type ReadLead = { readonly lead: Lead | null; readonly error: string | null };

function readLead(
  { plus, minus }: LeadDraft,
  channels: readonly Channel[],
  use: LeadUse,
): ReadLead {
  if (plus === null) return { lead: null, error: null };
  const lead: Lead =
    minus === null ? { kind: 'channel', channel: plus } : { kind: 'difference', plus, minus };
  const error = leadFault(lead, channels, use);
  return { lead: error === null ? lead : null, error };
}

/**
 * Why a lead stands in a row: the program's reason where it is the very lead the program proposed, else that a person chose
 * it. `proposed` and `reasons` go together by place; `reasons` is null where the program's are not known any more.
 */
export function leadReason(
  row: LeadDraft,
  proposed: readonly (Lead | null)[],
  reasons: readonly string[] | null,
): string {
  const place = proposed.findIndex((lead) => {
    const one = draftOf(lead, row.id);
    return one.plus === row.plus && one.minus === row.minus;
  });
  return place < 0 ? CHOSEN_BY_HAND : (reasons?.[place] ?? PROPOSED);
}

const CHOSEN_BY_HAND = 'chosen by hand';
const PROPOSED = 'proposed by the program';

const reportedOf = (roles: Roles): Lead | undefined => roles.slow[roles.reported];

/** True where the reported slow-wave lead is another one than before. */
export function reportedChanged(before: Roles, after: Roles): boolean {
  const [a, b] = [reportedOf(before), reportedOf(after)];
  return !(a && b && sameLead(a, b));
}

/** Reads what was chosen: roles (null while something is wrong) and what is wrong. */
export function readRoles(
  draft: RolesDraft,
  before: Roles,
  channels: readonly Channel[],
): { readonly roles: Roles | null; readonly errors: RolesErrors } {
  const slowErrors: Record<number, string> = {};
  const slow: Lead[] = [];
  for (const row of draft.slow) {
    const { lead, error } = readLead(row, channels, 'slow-wave');
    if (error) slowErrors[row.id] = error;
    else if (!lead) slowErrors[row.id] = 'Choose a channel.';
    else if (slow.some((other) => leadKey(other) === leadKey(lead)))
      slowErrors[row.id] = 'This lead is in the list already.';
    else slow.push(lead);
  }
  const heart = readLead(draft.heart, channels, 'heart');
  const breath = readLead(draft.breath, channels, 'breathing');
  const place = draft.slow.findIndex((row) => row.id === draft.reported);
  const roles: Roles = {
    slow,
    reported: Math.max(0, place),
    heart: heart.lead,
    breath: breath.lead,
  };
  const leadsGood = Object.keys(slowErrors).length === 0 && slow.length > 0;
  const wantsReason = leadsGood && reportedChanged(before, roles) && draft.reason.trim() === '';
  const errors: RolesErrors = {
    slow: slowErrors,
    heart: heart.error,
    breath: breath.error,
    reason: wantsReason ? 'Say why another lead is reported.' : null,
  };
  const good = leadsGood && !heart.error && !breath.error && !wantsReason;
  return { roles: good ? roles : null, errors };
}
