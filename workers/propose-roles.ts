import type { Channel } from '../src/recording/channel';
import { type Lead, leadKey, leadName } from '../src/recording/lead';
import type { RoleReasons, Roles } from '../src/recording/roles';

/** Below this a heartbeat cannot be read (numbers.md). */
const LEAST_HEART_RATE_HZ = 50;
/** Candidates for the slow wave that are read and compared; more can be chosen by hand. */
const MOST_SLOW_LEADS = 3;

type Hint = 'stomach' | 'heart' | 'breathing' | 'other' | 'none';

const HINTS: readonly (readonly [Hint, RegExp])[] = [
  ['breathing', /resp|breath|belt|airflow|nasal|thorax/i],
  ['other', /trig|status|marker|event|acc|temp|spo2|sao2|pleth|gyro|press|light|batt/i],
  ['stomach', /egg|gastr|stomach|abdom|belly|antr|epig|slow/i],
  ['heart', /ecg|ekg|heart|cardi/i],
];

/** What a channel's label hints at; only a hint, since labels differ between laboratories. */
export function labelHint(label: string): Hint {
  return HINTS.find(([, pattern]) => pattern.test(label))?.[0] ?? 'none';
}

/** How clearly a heartbeat stands in one channel, measured on a few stretches of it. */
export interface QrsMeasure {
  readonly channel: number;
  readonly quality: number;
  readonly heightUv: number;
  readonly snrDb: number;
}

/** How fit a lead is for the slow wave, measured without looking at its rhythm. */
export interface SlowMeasure {
  /** 0 to 1. */
  readonly quality: number;
  readonly reason: string;
}

/** What the measures of quality are of. */
export interface MeasuredOn {
  /** One for each measure, in their order. */
  readonly leads: readonly Lead[];
  /** The part of the study that was measured; null where it is not said. */
  readonly over: 'fasting' | 'whole' | null;
}

const OVER = {
  fasting: ' in the fasting phase',
  whole: ' over the whole study, no fasting phase being known',
};

const leadOf = (channel: Channel): Lead => ({ kind: 'channel', channel: channel.index });
const isVoltage = (channel: Channel): boolean => channel.unit.kind === 'voltage';

/** Channels in which a heartbeat may be looked for. */
export function heartCandidates(channels: readonly Channel[]): readonly Channel[] {
  return channels.filter((one) => {
    const hint = labelHint(one.label);
    return (
      isVoltage(one) &&
      one.rateHz >= LEAST_HEART_RATE_HZ &&
      hint !== 'other' &&
      hint !== 'breathing'
    );
  });
}

/** Channels to compare for the slow wave: those whose label says stomach, else every unlabelled one, else what is left. */
export function slowCandidates(channels: readonly Channel[]): readonly Channel[] {
  const usable = channels.filter(isVoltage);
  const hinted = (hint: Hint) => usable.filter((one) => labelHint(one.label) === hint);
  const choices = [hinted('stomach'), hinted('none'), hinted('heart'), usable];
  return (choices.find((some) => some.length > 0) ?? []).slice(0, MOST_SLOW_LEADS);
}

/**
 * Roles from labels, rates, the measured heartbeat and the measured quality of slow-wave leads: those of `measured`, or
 * where that is left out the candidates in the order of `slowCandidates`. The candidates keep the file's order; the reported
 * lead is the one of best quality, the first of equals; one that was not measured is never put before one that was.
 */
export function proposeRoles(
  channels: readonly Channel[],
  qrs: readonly QrsMeasure[],
  slow: readonly SlowMeasure[],
  measured?: MeasuredOn,
): { readonly roles: Roles; readonly reasons: RoleReasons } {
  const candidates = slowCandidates(channels);
  const { leads, over } = measured ?? { leads: candidates.map(leadOf), over: null };
  const byLead = new Map(slow.map((one, i) => [leadKey(leads[i]), one]));
  const measures = candidates.map((one) => byLead.get(leadKey(leadOf(one))));
  const quality = (place: number) => measures[place]?.quality ?? Number.NEGATIVE_INFINITY;
  const reported = measures.reduce(
    (best, _, place) => (quality(place) > quality(best) ? place : best),
    0,
  );
  const heart = proposeHeart(channels, qrs);
  const breath = channels.find((one) => labelHint(one.label) === 'breathing');
  return {
    roles: {
      slow: candidates.map(leadOf),
      reported,
      heart: heart.lead,
      breath: breath ? leadOf(breath) : null,
    },
    reasons: {
      slow: candidates.map(
        (one, i) => `${slowReason(one)}; ${measures[i]?.reason ?? 'not measured'}`,
      ),
      reported:
        candidates.length > 1
          ? `best quality of ${candidates.length} leads${over === null ? '' : OVER[over]}, taken before any rhythm was looked at`
          : 'the only slow-wave lead',
      heart: heart.reason,
      breath: breath
        ? `its label reads "${breath.label}"`
        : 'no channel is labelled as breathing; the rate is derived from the heartbeat',
    },
  };
}

function slowReason(channel: Channel): string {
  return labelHint(channel.label) === 'stomach'
    ? `its label reads "${channel.label}"`
    : `a potential at ${channel.rateHz} Hz whose label says nothing else`;
}

function proposeHeart(
  channels: readonly Channel[],
  qrs: readonly QrsMeasure[],
): { readonly lead: Lead | null; readonly reason: string } {
  if (qrs.length === 0)
    return {
      lead: null,
      reason: `no channel in volts is sampled at ${LEAST_HEART_RATE_HZ} Hz or more: no heartbeat can be read in this recording`,
    };
  const best = qrs.reduce((a, b) => (b.quality > a.quality ? b : a));
  const lead: Lead = { kind: 'channel', channel: best.channel };
  const name = leadName(lead, channels);
  const measured = `QRS ${Math.round(best.heightUv)} µV, ${Math.round(best.snrDb)} dB over the noise`;
  return {
    lead,
    reason:
      qrs.length > 1
        ? `clearest heartbeat of ${qrs.length} channels: ${measured} on ${name}`
        : `${measured} on ${name}`,
  };
}
