import type { Channel } from './channel';

/** A channel, or the difference of two channels of the same rate, given a role. Numbers are channel indexes from 0. */
export type Lead =
  | { readonly kind: 'channel'; readonly channel: number }
  | { readonly kind: 'difference'; readonly plus: number; readonly minus: number };

/** The lead as files and the command line write it: "#2", or "#2~#3" for a difference. */
export function leadKey(lead: Lead): string {
  return lead.kind === 'channel' ? `#${lead.channel + 1}` : `#${lead.plus + 1}~#${lead.minus + 1}`;
}

/** The lead as people read it, from the channels' labels. */
export function leadName(lead: Lead, channels: readonly Pick<Channel, 'label'>[]): string {
  const label = (index: number) => channels[index]?.label ?? `channel ${index + 1}`;
  return lead.kind === 'channel'
    ? label(lead.channel)
    : `${label(lead.plus)} − ${label(lead.minus)}`;
}

/** The channels a lead is made of. */
export function leadChannels(lead: Lead): readonly number[] {
  return lead.kind === 'channel' ? [lead.channel] : [lead.plus, lead.minus];
}

/**
 * Reads a lead written as a label, "#N", or a difference "A~B" of either ("#2~#3"). Null where a part names no channel.
 */
export function parseLead(text: string, channels: readonly Pick<Channel, 'label'>[]): Lead | null {
  const find = (part: string): number | null => {
    const trimmed = part.trim();
    const byNumber = /^#(\d+)$/.exec(trimmed);
    const index = byNumber
      ? Number(byNumber[1]) - 1
      : channels.findIndex((channel) => channel.label === trimmed);
    return index >= 0 && index < channels.length ? index : null;
  };
  const whole = find(text);
  if (whole !== null) return { kind: 'channel', channel: whole };
  const parts = text.split('~');
  if (parts.length !== 2) return null;
  const [plus, minus] = parts.map(find);
  if (plus === null || minus === null || plus === minus) return null;
  return { kind: 'difference', plus, minus };
}

/** What a lead serves; a breathing lead may be in any unit, since only the rate of its signal counts. */
export type LeadUse = 'slow-wave' | 'heart' | 'breathing';

/** Why a lead cannot serve, in words for the person; null where it can. */
export function leadFault(lead: Lead, channels: readonly Channel[], use: LeadUse): string | null {
  const numbers = leadChannels(lead);
  const missing = numbers.find((index) => channels[index] === undefined);
  if (missing !== undefined) return `There is no channel #${missing + 1}.`;
  if (new Set(numbers).size < numbers.length) return 'A channel minus itself is nothing.';
  const parts = numbers.map((index) => channels[index]);
  const rates = [...new Set(parts.map(({ rateHz }) => rateHz))];
  if (rates.length > 1) return `Rates differ: ${rates.join(' and ')} Hz.`;
  const strange = parts.find(({ unit }) => unit.kind === 'unknown');
  return strange && use !== 'breathing'
    ? `${strange.label} is in "${strange.unit.text}", no unit of volts: it can serve as breathing lead only.`
    : null;
}

export function sameLead(a: Lead, b: Lead): boolean {
  return leadKey(a) === leadKey(b);
}
