/** What was done around the recording, as people typed it; null or '' where not stated. */
export interface Protocol {
  readonly meal: string;
  readonly kcal: number | null;
  readonly ml: number | null;
  readonly minutes: number | null;
  readonly partEatenPercent: number | null;
  readonly fastHours: number | null;
  readonly posture: string;
  readonly medicines: string;
  readonly implants: string;
}

export const EMPTY_PROTOCOL: Protocol = {
  meal: '',
  kcal: null,
  ml: null,
  minutes: null,
  partEatenPercent: null,
  fastHours: null,
  posture: '',
  medicines: '',
  implants: '',
};
