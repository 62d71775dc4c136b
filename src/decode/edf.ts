import type { Channel, ChannelUnit } from '../recording/channel';
import type { Annotation, FoundInFile, Recording, SignalSource } from '../recording/recording';
import { microvoltsPerUnit } from '../units/voltage';
import { type EdfHeader, readEdfHeader } from './edf-header';
import { readIdentity, readStart, saysInvented } from './edf-identity';
import { EdfRecords } from './edf-records';
import { type ChannelLayout, EdfSamples, rateOf } from './edf-samples';
import { type EdfSignal, physicalValue } from './edf-signals';
import { type FileTimes, readFileTimes } from './edf-times';
import type { EdfVariant } from './edf-variant';
import { uniqueLabels } from './labels';
import { readPrefilter } from './prefilter';
import { gapsBetween, lengthOf, placesOf } from './record-runs';
import { quoted, refusal } from './refusals';

/**
 * Opens an EDF or EDF+ file (Kemp 1992; Kemp & Olivan 2003), or the same with 24-bit samples (BDF, BDF+). Gaps between records
 * stay gaps. Throws a Refusal where the header cannot be used, or where no signal is in V, mV, uV or nV. Samples are read when
 * they are asked for.
 */
export async function openEdf(
  file: Blob,
  fileName: string,
  variant: EdfVariant,
): Promise<SignalSource> {
  const header = await readEdfHeader(file, fileName, variant.sampleBytes);
  const found: FoundInFile[] = [...header.found];
  const ordinary = withoutTriggers(header, found);
  const labelled = ordinary.length > 0 ? channelsOf(ordinary, header, found) : [];
  refuseWithoutVoltage(fileName, ordinary, labelled);
  const records = new EdfRecords(file, fileName, header);
  const times = await readFileTimes({ header, records, variant }, found);
  const { runs } = times;
  const { recordDurationS } = header;
  const samples = new EdfSamples(records, ordinary.map(layoutOf), runs);
  const recording: Recording = {
    format: variant.name,
    fileName,
    sizeBytes: file.size,
    identity: readIdentity(header),
    start: readStart(header, times.firstOnsetS, found),
    durationS: lengthOf(runs, recordDurationS),
    channels: labelled.map((channel, i) => ({
      ...channel,
      sampleCount: placesOf(runs, ordinary[i].samplesPerRecord, recordDurationS),
    })),
    annotations: fromFirstSample(times),
    found,
    gaps: gapsBetween(runs, recordDurationS),
    invented: saysInvented(header),
  };
  return {
    recording,
    read: (channel, from, to) => samples.read(channel, from, to),
    blocks: (wanted) => samples.blocks(wanted),
  };
}

/** Annotations on the recording's clock, in order of time. */
function fromFirstSample({ annotations, firstOnsetS }: FileTimes): readonly Annotation[] {
  const shifted =
    firstOnsetS === 0
      ? [...annotations]
      : annotations.map((one) => ({ ...one, onsetS: one.onsetS - firstOnsetS }));
  return shifted.sort((a, b) => a.onsetS - b.onsetS);
}

/**
 * The signals that hold samples. The trigger words of 24-bit recorders, labelled Status, are no signal: they are never drawn
 * or filtered.
 */
function withoutTriggers(header: EdfHeader, found: FoundInFile[]): readonly EdfSignal[] {
  const isTrigger = ({ label }: EdfSignal) => header.sampleBytes === 3 && /^status$/i.test(label);
  if (header.signals.some(isTrigger))
    found.push({
      severity: 'note',
      what: 'the signal “Status” holds trigger words and was left out',
      place: `signal ${header.signals.findIndex(isTrigger) + 1}`,
    });
  return header.signals.filter((signal) => !signal.annotations && !isTrigger(signal));
}

function unitOf(signal: EdfSignal): ChannelUnit {
  if (!signal.calibration) return { kind: 'unknown', text: 'digital units' };
  const factor = microvoltsPerUnit(signal.dimension);
  return factor === null
    ? { kind: 'unknown', text: signal.dimension }
    : { kind: 'voltage', text: signal.dimension, microvoltsPerUnit: factor };
}

/** Scale of a signal: uV where its unit is a voltage, else the file's own unit or digital numbers. */
function layoutOf(signal: EdfSignal): ChannelLayout {
  const { firstSample, samplesPerRecord, calibration } = signal;
  if (!calibration) return { firstSample, samplesPerRecord, digitalMin: 0, valueAtMin: 0, step: 1 };
  const unit = unitOf(signal);
  const factor = unit.kind === 'voltage' ? unit.microvoltsPerUnit : 1;
  const { digitalMin, digitalMax, physicalMin, physicalMax } = calibration;
  const step = ((physicalMax - physicalMin) / (digitalMax - digitalMin)) * factor;
  return { firstSample, samplesPerRecord, digitalMin, valueAtMin: physicalMin * factor, step };
}

function channelsOf(
  signals: readonly EdfSignal[],
  header: EdfHeader,
  found: FoundInFile[],
): readonly Channel[] {
  const labels = uniqueLabels(signals.map((signal) => signal.label));
  return signals.map((signal, index): Channel => {
    const unit = unitOf(signal);
    const layout = layoutOf(signal);
    if (labels[index] !== signal.label)
      found.push({
        severity: 'note',
        what: `signal ${index + 1}, labelled ${quoted(signal.label)} in the file as others are or not at all, is called “${labels[index]}” here`,
        place: `signal ${index + 1}`,
      });
    if (unit.kind === 'unknown' && signal.calibration)
      found.push({
        severity: 'warning',
        what: `signal “${labels[index]}” is in ${quoted(unit.text)}, no unit of voltage known here; it can serve as breathing lead only`,
        place: `signal ${index + 1}`,
      });
    return {
      index,
      label: labels[index],
      rateHz: rateOf(signal.samplesPerRecord, header.recordDurationS),
      sampleCount: signal.samplesPerRecord * header.recordCount,
      unit,
      stepUv: unit.kind === 'voltage' ? Math.abs(layout.step) : 0,
      railsUv: railsOf(signal, unit),
      transducer: signal.transducer,
      prefilter: readPrefilter(signal.prefilter),
    };
  });
}

function railsOf(signal: EdfSignal, unit: ChannelUnit): readonly [number, number] | null {
  const { calibration } = signal;
  if (unit.kind !== 'voltage' || !calibration) return null;
  const atMin = physicalValue(calibration.digitalMin, calibration) * unit.microvoltsPerUnit;
  const atMax = physicalValue(calibration.digitalMax, calibration) * unit.microvoltsPerUnit;
  return [Math.min(atMin, atMax), Math.max(atMin, atMax)];
}

function refuseWithoutVoltage(
  fileName: string,
  signals: readonly EdfSignal[],
  channels: readonly Channel[],
): void {
  if (channels.some((channel) => channel.unit.kind === 'voltage')) return;
  if (signals.length === 0)
    throw refusal('wrong-input', fileName, {
      message: 'the file holds annotations only and no signal.',
      place: null,
      remedy: 'Choose the file that holds the recording itself.',
    });
  const units = [...new Set(channels.map((channel) => quoted(channel.unit.text)))].join(', ');
  throw refusal('wrong-input', fileName, {
    message: `no signal is in V, mV, uV or nV; the units found are: ${units}.`,
    place: 'physical dimension of the signals',
    remedy: 'Export the recording with its signals calibrated in uV or mV.',
  });
}
