import type { WithinRequest } from '../../workers/analysis-api';
import type { Channel } from '../recording/channel';
import { type Lead, leadFault, leadKey, leadName, sameLead } from '../recording/lead';
import type { Roles } from '../recording/roles';

/** How beats are to be looked for again, as chosen. */
export interface FindChoices {
  /** Key of the lead. */
  readonly lead: string;
  readonly polarity: WithinRequest['polarity'];
  readonly eager: WithinRequest['eager'];
}

export const POLARITIES: readonly (readonly [WithinRequest['polarity'], string])[] = [
  ['dominant', 'the larger extreme'],
  ['upright', 'upright'],
  ['inverted', 'inverted'],
];

export const EAGERNESS: readonly (readonly [WithinRequest['eager'], string])[] = [
  ['less', 'less eagerly'],
  ['usual', 'as usual'],
  ['more', 'more eagerly'],
];

/** Leads beats can be looked for in: the heart lead, those of the other roles, every channel in volts. */
export function leadsToLookIn(roles: Roles, channels: readonly Channel[]): readonly Lead[] {
  const all: readonly Lead[] = [
    ...(roles.heart ? [roles.heart] : []),
    ...roles.slow,
    ...channels.map(({ index }): Lead => ({ kind: 'channel', channel: index })),
  ];
  return all.filter(
    (lead, i) =>
      leadFault(lead, channels, 'heart') === null &&
      all.findIndex((one) => sameLead(one, lead)) === i,
  );
}

/** The choices that differ from how the study's beats are found, for the name of the step. */
export function choiceWords(
  { lead, polarity, eager }: FindChoices,
  heartLead: Lead,
  channels: readonly Channel[],
  leads: readonly Lead[],
): readonly string[] {
  const other = leads.find((one) => leadKey(one) === lead);
  return [
    other && !sameLead(other, heartLead) ? `in ${leadName(other, channels)}` : '',
    polarity === 'dominant' ? '' : polarity,
    eager === 'usual' ? '' : `${eager} eagerly`,
  ].filter((part) => part !== '');
}
