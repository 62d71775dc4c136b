import type { FoundInFile } from '../recording/recording';
import { fieldInteger, fieldNumber, fieldText } from './edf-fields';
import { type SignalField, signalField, signalFieldOffset } from './edf-layout';
import { quoted, refusal } from './refusals';

/** Physical value of a digital one: (digital - digitalMin) * gain + physicalMin, in the file's unit. */
export interface Calibration {
  readonly digitalMin: number;
  readonly digitalMax: number;
  readonly physicalMin: number;
  readonly physicalMax: number;
}

/** One signal of the header. */
export interface EdfSignal {
  readonly label: string;
  readonly transducer: string;
  readonly dimension: string;
  readonly prefilter: string;
  readonly samplesPerRecord: number;
  /** Place of its first sample within a record, in samples. */
  readonly firstSample: number;
  /** True where its bytes are annotations and no samples. */
  readonly annotations: boolean;
  /** Null where the header gives no usable scale; then samples stay digital numbers. */
  readonly calibration: Calibration | null;
}

/** Physical value of a digital one in the file's unit (Kemp 1992). */
export function physicalValue(digital: number, scale: Calibration): number {
  const gain = (scale.physicalMax - scale.physicalMin) / (scale.digitalMax - scale.digitalMin);
  return (digital - scale.digitalMin) * gain + scale.physicalMin;
}

/** More samples than any real record holds; the field has 8 characters. */
const MOST_SAMPLES = 1e8;

/**
 * Reads the signal part of a header of at least 256 (count + 1) bytes. Throws a Refusal where a count of samples cannot be;
 * a scale that cannot be used is named in `found`.
 */
export function readSignals(
  header: Uint8Array,
  count: number,
  fileName: string,
  found: FoundInFile[],
): readonly EdfSignal[] {
  const signals: EdfSignal[] = [];
  let firstSample = 0;
  for (let index = 0; index < count; index += 1) {
    const text = (name: SignalField) => fieldText(signalField(header, name, index, count));
    const place = (name: SignalField, words: string) =>
      `byte ${signalFieldOffset(name, index, count)}, ${words} of signal ${index + 1}`;
    const annotations = /^[EB]DF Annotations$/i.test(text('label'));
    const samplesPerRecord = fieldInteger(text('samplesPerRecord'));
    if (samplesPerRecord === null || samplesPerRecord < 1 || samplesPerRecord > MOST_SAMPLES)
      throw refusal('broken-format', fileName, {
        message: `signal ${index + 1} (${quoted(text('label'))}) has ${quoted(text('samplesPerRecord'))} samples in a record, which cannot be.`,
        place: place('samplesPerRecord', 'samples in a record'),
        remedy: 'Export the recording again; this is no usable EDF header.',
      });
    signals.push({
      label: text('label'),
      transducer: text('transducer'),
      dimension: text('dimension'),
      prefilter: text('prefilter'),
      samplesPerRecord,
      firstSample,
      annotations,
      calibration: annotations ? null : readCalibration(text, place, found),
    });
    firstSample += samplesPerRecord;
  }
  return signals;
}

function readCalibration(
  text: (name: SignalField) => string,
  place: (name: SignalField, words: string) => string,
  found: FoundInFile[],
): Calibration | null {
  const label = quoted(text('label'));
  const uncalibrated = (why: string, where: string): null => {
    found.push({
      severity: 'warning',
      what: `signal ${label}: ${why}; it is read in digital units and can serve as breathing lead only`,
      place: where,
    });
    return null;
  };
  const digitalMin = fieldInteger(text('digitalMin'));
  const digitalMax = fieldInteger(text('digitalMax'));
  if (digitalMin === null || digitalMax === null || digitalMin >= digitalMax)
    return uncalibrated(
      `its digital minimum ${quoted(text('digitalMin'))} is not below its digital maximum ${quoted(text('digitalMax'))}`,
      place('digitalMin', 'digital minimum'),
    );
  const low = fieldNumber(text('physicalMin'));
  const high = fieldNumber(text('physicalMax'));
  if (!low || !high || low.value === high.value)
    return uncalibrated(
      `its physical limits ${quoted(text('physicalMin'))} and ${quoted(text('physicalMax'))} give no scale`,
      place('physicalMin', 'physical minimum'),
    );
  if (low.comma || high.comma)
    found.push({
      severity: 'warning',
      what: `signal ${label}: the commas in its physical limits ${quoted(text('physicalMin'))} and ${quoted(text('physicalMax'))} were read as decimal points`,
      place: place('physicalMin', 'physical minimum'),
    });
  return { digitalMin, digitalMax, physicalMin: low.value, physicalMax: high.value };
}
