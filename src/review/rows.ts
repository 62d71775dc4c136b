import { type Lead, leadKey, leadName } from '../recording/lead';
import type { Recording } from '../recording/recording';
import type { Roles } from '../recording/roles';
import type { RouteName } from '../recording/settings';

/** A row that shows one drawn signal of one lead. */
export interface SignalRow {
  readonly kind: 'signal';
  readonly key: string;
  readonly signal: 'recorded' | 'slow-wave' | 'heartbeat';
  readonly lead: Lead;
  readonly leadKey: string;
  readonly name: string;
  readonly note: string;
  readonly hue: 'ink' | 'quiet' | 'stomach' | 'heart';
  /** Drawn about its mean in view rather than about zero. */
  readonly centred: boolean;
  /** Share of the pane's height. */
  readonly weight: number;
}

/** A row that shows something computed. */
export interface ResultRow {
  readonly kind: 'spectrogram' | 'heart-rate' | 'breathing' | 'interval';
  readonly key: string;
  readonly leadKey: string | null;
  readonly name: string;
  readonly note: string;
  readonly hue: 'ink' | 'stomach' | 'heart' | 'breathing';
  readonly weight: number;
}

export type Row = SignalRow | ResultRow;

const MOST_RECORDED = 3;

const signalRow = (
  pane: string,
  lead: Lead,
  recording: Recording,
  parts: Pick<SignalRow, 'signal' | 'note' | 'hue' | 'centred' | 'weight'>,
): SignalRow => ({
  kind: 'signal',
  key: `${pane}:${parts.signal}:${leadKey(lead)}`,
  lead,
  leadKey: leadKey(lead),
  name: leadName(lead, recording.channels),
  ...parts,
});

/** Leads shown as recorded in Minutes: slow-wave leads and the heart lead, three at most, the heart lead always. */
export function recordedLeads(roles: Roles): readonly Lead[] {
  const { slow, heart } = roles;
  if (!heart || slow.some((lead) => leadKey(lead) === leadKey(heart))) {
    const heartAt = heart ? slow.findIndex((lead) => leadKey(lead) === leadKey(heart)) : -1;
    const shown = slow.slice(0, MOST_RECORDED);
    return heartAt >= MOST_RECORDED ? [...shown.slice(0, -1), slow[heartAt]] : shown;
  }
  return [...slow.slice(0, MOST_RECORDED - 1), heart];
}

/** The roles with the reported lead as the only one for the slow wave. */
export function reportedOnly(roles: Roles): Roles {
  return { ...roles, slow: roles.slow.slice(roles.reported, roles.reported + 1), reported: 0 };
}

/** Rows of the Minutes pane from top to bottom. */
export function minutesRows(
  roles: Roles,
  recording: Recording,
  has: { readonly breathing: boolean; readonly route: RouteName },
): readonly Row[] {
  const reported = roles.slow[roles.reported];
  const recorded = recordedLeads(roles).map((lead) =>
    signalRow('minutes', lead, recording, {
      signal: 'recorded',
      note: 'recorded',
      hue: 'quiet',
      centred: true,
      weight: 1,
    }),
  );
  const slow = roles.slow.map((lead, index) =>
    signalRow('minutes', lead, recording, {
      signal: 'slow-wave',
      note: has.route === 'band' ? 'slow wave' : `slow wave, ${has.route}`,
      hue: 'stomach',
      centred: false,
      weight: roles.slow.length > 1 && index !== roles.reported ? 1.1 : 1.6,
    }),
  );
  const spectrogram: Row = {
    kind: 'spectrogram',
    key: 'minutes:spectrogram',
    leadKey: reported ? leadKey(reported) : null,
    name: 'Spectrogram',
    note: reported && roles.slow.length > 1 ? leadName(reported, recording.channels) : '',
    hue: 'stomach',
    weight: 2.8,
  };
  return [...recorded, ...slow, spectrogram, ...rateRows(roles, has.breathing)];
}

function rateRows(roles: Roles, breathing: boolean): readonly Row[] {
  const rates: Row[] = [];
  if (roles.heart)
    rates.push({
      kind: 'heart-rate',
      key: 'minutes:heart-rate',
      leadKey: leadKey(roles.heart),
      name: 'Heart rate',
      note: '1/min',
      hue: 'heart',
      weight: 1.2,
    });
  if (breathing)
    rates.push({
      kind: 'breathing',
      key: 'minutes:breathing',
      leadKey: null,
      name: 'Breathing',
      note: '1/min',
      hue: 'breathing',
      weight: 0.9,
    });
  return rates;
}

/** Rows of the Seconds pane below the pins; none without a heart lead. */
export function secondsRows(roles: Roles, recording: Recording): readonly Row[] {
  const { heart } = roles;
  if (!heart) return [];
  return [
    {
      kind: 'interval',
      key: 'seconds:interval',
      leadKey: leadKey(heart),
      name: 'Interval',
      note: 'ms',
      hue: 'ink',
      weight: 0.9,
    },
    signalRow('seconds', heart, recording, {
      signal: 'recorded',
      note: 'recorded',
      hue: 'ink',
      centred: true,
      weight: 3,
    }),
    signalRow('seconds', heart, recording, {
      signal: 'heartbeat',
      note: 'heartbeat',
      hue: 'heart',
      centred: false,
      weight: 2,
    }),
  ];
}

/** Whether a spoiled span acts on what a row shows. */
export function spanActsOn(
  span: { readonly lead: string | null; readonly target: 'stomach' | 'heart' | 'both' },
  row: Row,
  heartLead: string | null,
): boolean {
  if (span.lead !== null && row.leadKey !== null && span.lead !== row.leadKey) return false;
  const heartRow =
    row.kind === 'heart-rate' ||
    row.kind === 'interval' ||
    row.kind === 'breathing' ||
    (row.kind === 'signal' && row.signal === 'heartbeat');
  const both = row.kind === 'signal' && row.signal === 'recorded';
  if (span.target === 'both') return true;
  if (both) return span.target === 'stomach' || row.leadKey === heartLead;
  return heartRow === (span.target === 'heart');
}
