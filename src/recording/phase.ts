import type { Seconds } from '../units/time';

/** A stretch of the protocol: fasting, meal, fed; meal-2, fed-2 in a long study; `whole` where none is marked. */
export interface Phase {
  readonly name: string;
  readonly fromS: Seconds;
  readonly toS: Seconds;
}

export const WHOLE_STUDY_PHASE = 'whole';

/** The phases of a study; one over all of it where none is marked. */
export function phasesOrWhole(phases: readonly Phase[], durationS: Seconds): readonly Phase[] {
  return phases.length > 0 ? phases : [{ name: WHOLE_STUDY_PHASE, fromS: 0, toS: durationS }];
}

export const isMeal = (phase: Phase): boolean => /^meal(-\d+)?$/.test(phase.name);
export const isFed = (phase: Phase): boolean => /^fed(-\d+)?$/.test(phase.name);
export const isFasting = (phase: Phase): boolean => phase.name === 'fasting';

/** Time after a meal before the fed phase is proposed to begin (common practice, no single source). */
export const FED_AFTER_MEAL_S: Seconds = 120;
