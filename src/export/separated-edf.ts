import type { Hertz } from '../units/rate';
import type { Seconds } from '../units/time';
import { type EdfPlusContents, type EdfPlusSignal, writeEdfPlus } from './edf-plus';
import { fitHeaderNumber } from './edf-plus-header';
import { type AnnotatedReview, reviewAnnotations } from './review-annotations';

/** One separated signal in uV, NaN where there is none. */
export interface SeparatedSignal {
  readonly label: string;
  readonly rateHz: Hertz;
  readonly samples: Float64Array | Float32Array;
  readonly prefilter: string;
}

export interface SeparatedInput extends AnnotatedReview {
  readonly code: string;
  /** Local start as the study's header has it; null where unknown. */
  readonly start: string | null;
  readonly durationS: Seconds;
  readonly program: string;
  readonly slow: readonly SeparatedSignal[];
  readonly heart: SeparatedSignal | null;
}

const MOST_DIGITAL = 32767;
/** Records are this long, or the fewest seconds that hold whole samples of every signal. */
const LONGEST_RECORD_S = 60;

/** Seconds of a record in which every rate has whole samples; null where none up to a minute has. */
function recordSeconds(rates: readonly Hertz[]): number | null {
  for (let seconds = 1; seconds <= LONGEST_RECORD_S; seconds += 1)
    if (rates.every((rate) => Math.abs(rate * seconds - Math.round(rate * seconds)) < 1e-6))
      return seconds;
  return null;
}

/** A signal in steps of its own greatest value over 32767; what is missing or NaN becomes 0. */
function digitised(signal: SeparatedSignal, recordS: number, records: number): EdfPlusSignal {
  const { samples, label, rateHz, prefilter } = signal;
  let most = 1;
  for (const value of samples) if (Math.abs(value) > most) most = Math.abs(value);
  const physicalMax = fitHeaderNumber(Math.ceil(most));
  const perRecord = Math.round(rateHz * recordS);
  const digital = new Int16Array(perRecord * records);
  for (let i = 0; i < Math.min(digital.length, samples.length); i += 1)
    if (!Number.isNaN(samples[i]))
      digital[i] = Math.round((samples[i] / physicalMax) * MOST_DIGITAL);
  return {
    label,
    transducer: 'computed from the study',
    unit: 'uV',
    physicalMin: -physicalMax,
    physicalMax,
    digitalMin: -MOST_DIGITAL,
    digitalMax: MOST_DIGITAL,
    prefilter,
    samplesPerRecord: perRecord,
    digital,
  };
}

/**
 * separated.edf of files.md: EDF+C (Kemp & Olivan 2003) with the slow wave of each lead and the heartbeat of the heart lead,
 * phases, spoiled spans, events, symptoms and beats as annotations. Where there are no samples the signals are 0 and a span says so. A signal
 * whose rate has no whole number of samples in any record of up to a minute is left out. Identity is the study's code.
 */
export function separatedEdf(input: SeparatedInput): readonly Uint8Array<ArrayBuffer>[] {
  const all = input.heart ? [...input.slow, input.heart] : input.slow;
  const signals = all.filter(({ rateHz }) => recordSeconds([rateHz]) !== null);
  const recordS = recordSeconds(signals.map(({ rateHz }) => rateHz)) ?? LONGEST_RECORD_S;
  const records = Math.ceil(input.durationS / recordS - 1e-9);
  const contents: EdfPlusContents = {
    patient: { code: input.code, sex: null, birthDate: null, name: null },
    recordingFields: {
      investigation: null,
      technician: null,
      equipment: input.program,
      additional: ['separated signals'],
    },
    start: input.start,
    recordDurationS: recordS,
    recordCount: records,
    signals: signals.map((signal) => digitised(signal, recordS, records)),
    annotations: reviewAnnotations(input),
  };
  return writeEdfPlus(contents);
}
