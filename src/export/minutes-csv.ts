import { firstBeatAt } from '../recording/beat';
import type { Doubt } from '../recording/doubt';
import type { BreathingSeries } from '../recording/heart-series';
import { type Lead, leadChannels } from '../recording/lead';
import { phasesOrWhole } from '../recording/phase';
import type { Recording } from '../recording/recording';
import type { Epoch, SlowWaveRhythm } from '../recording/rhythm';
import { coveredSeconds, spansOf } from '../recording/span';
import type { Hertz } from '../units/rate';
import { secondsToTicks } from '../units/ticks';
import { type Cell, csvText, numberCell } from './csv';
import { DB_DECIMALS, DF_DECIMALS, SHARE_DECIMALS } from './epochs-csv';
import type { ExportInput } from './export-input';
import { minuteOfHeart } from './minute-of-heart';

const HEADER = [
  'minute',
  'lead',
  'phase',
  'df_cpm',
  'dp_db',
  'rhythm',
  'heart_rate_bpm',
  'breathing_bpm',
  'rmssd_ms',
  'beats',
  'open_doubts',
  'spoiled_fraction',
];

type Input = Pick<
  ExportInput,
  'recording' | 'state' | 'stomach' | 'heart' | 'breathing' | 'openDoubts'
>;

/**
 * minutes.csv: one row a minute and slow-wave lead, minute after minute; minute 0 begins with the recording and the last may
 * be cut short. Stomach: the epoch whose centre is nearest to the minute's start, at most half a minute away. Heart: the NN
 * intervals that end in the minute, for RMSSD only those outside irregular segments. Breathing: the window centred nearest to the minute's middle, at most half a minute away.
 * Spoiled: the share of the minute that spans for the stomach on the row's lead cover. Open doubts: those of beats and of the
 * row's lead that end in the minute.
 */
export function minutesCsv(input: Input): string {
  return csvText(HEADER, minuteRows(input));
}

function* minuteRows(input: Input): Generator<Cell[]> {
  const { recording, state, stomach, heart } = input;
  const series = input.breathing;
  const irregular = (heart?.segments ?? []).filter((one) => one.state === 'irregular');
  const phases = phasesOrWhole(state.phases, recording.durationS);
  const rateHz = leadRate(state.roles.heart, recording);
  const leads = stomach.map(({ lead, epochs }) => ({
    lead,
    epochs: byNearestMinute(epochs),
    spans: spansOf(state.spans, lead, 'stomach'),
  }));
  for (let minute = 0; minute * 60 < recording.durationS; minute += 1) {
    const fromS = minute * 60;
    const toS = Math.min(fromS + 60, recording.durationS);
    const phase = phases.find((one) => one.fromS <= fromS && fromS < one.toS)?.name ?? null;
    const beats = heart && minuteOfHeart(heart.rr, fromS, irregular);
    const breathing = series && breathingNear(series, fromS + 30);
    for (const { lead, epochs, spans } of leads) {
      const epoch = epochs.get(minute) ?? null;
      const spoiled = coveredSeconds(spans, fromS, toS) / (toS - fromS);
      yield [
        numberCell(minute, 0),
        lead,
        phase,
        numberCell(epoch?.dfCpm, DF_DECIMALS),
        numberCell(epoch?.dpDb, DB_DECIMALS),
        epoch?.rhythm ?? null,
        numberCell(beats?.heartRateBpm, 1),
        numberCell(breathing, 1),
        numberCell(beats?.rmssdMs, 1),
        numberCell(rateHz && beatsWithin(state.beats, fromS, toS, rateHz), 0),
        numberCell(openWithin(input.openDoubts, lead, fromS, fromS + 60), 0),
        numberCell(spoiled, SHARE_DECIMALS),
      ];
    }
  }
}

/** How many open doubts end in [fromS, toS), of beats and spans of all leads or of one lead. */
const openWithin = (open: readonly Doubt[], lead: string, fromS: number, toS: number): number =>
  open.filter(
    (one) => (one.lead === null || one.lead === lead) && one.toS >= fromS && one.toS < toS,
  ).length;

/** The heart lead's own rate, null where there is none. */
export function leadRate(lead: Lead | null, recording: Recording): Hertz | null {
  if (!lead) return null;
  const [channel] = leadChannels(lead);
  return recording.channels[channel]?.rateHz ?? null;
}

/** Epochs by the minute whose start is nearest to their centre; of two at the same minute the nearer, then the earlier. */
function byNearestMinute(epochs: SlowWaveRhythm['epochs']): ReadonlyMap<number, Epoch> {
  const nearest = new Map<number, Epoch>();
  const centre = (epoch: Epoch) => (epoch.fromS + epoch.toS) / 2;
  for (const epoch of epochs) {
    const minute = Math.round(centre(epoch) / 60);
    const away = (one: Epoch) => Math.abs(centre(one) - 60 * minute);
    const there = nearest.get(minute);
    if (!there || away(epoch) < away(there)) nearest.set(minute, epoch);
  }
  return nearest;
}

function breathingNear({ centresS, perMinute }: BreathingSeries, atS: number): number | null {
  let best = -1;
  for (let i = 0; i < centresS.length; i += 1) {
    const away = Math.abs(centresS[i] - atS);
    if (away <= 30 && (best < 0 || away < Math.abs(centresS[best] - atS))) best = i;
  }
  return best < 0 ? null : perMinute[best];
}

function beatsWithin(
  beats: ExportInput['state']['beats'],
  fromS: number,
  toS: number,
  rateHz: Hertz,
): number {
  return (
    firstBeatAt(beats, secondsToTicks(toS, rateHz)) -
    firstBeatAt(beats, secondsToTicks(fromS, rateHz))
  );
}
