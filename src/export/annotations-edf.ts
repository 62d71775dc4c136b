import type { Seconds } from '../units/time';
import { writeEdfPlus } from './edf-plus';
import { type AnnotatedReview, reviewAnnotations } from './review-annotations';

export interface AnnotationsInput extends AnnotatedReview {
  readonly code: string;
  /** Local start as the study's header has it; null where unknown. */
  readonly start: string | null;
  readonly durationS: Seconds;
  readonly program: string;
}

const RECORD_S = 10;

/**
 * annotations.edf: an EDF+ file of annotations alone (Kemp & Olivan 2003), to lie beside the recording: phases, spoiled spans,
 * events, symptoms and beats on the recording's own clock. Identity is the study's code.
 */
export function annotationsEdf(input: AnnotationsInput): readonly Uint8Array<ArrayBuffer>[] {
  return writeEdfPlus({
    patient: { code: input.code, sex: null, birthDate: null, name: null },
    recordingFields: {
      investigation: null,
      technician: null,
      equipment: input.program,
      additional: ['annotations'],
    },
    start: input.start,
    recordDurationS: RECORD_S,
    recordCount: Math.max(1, Math.ceil(input.durationS / RECORD_S - 1e-9)),
    signals: [],
    annotations: reviewAnnotations(input),
  });
}
