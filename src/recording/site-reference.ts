import { type FigureValue, numberOf } from './figure';
import type { PhaseFindings } from './findings';
import { isFasting, isFed, isMeal, WHOLE_STUDY_PHASE } from './phase';
import type { Protocol } from './protocol';

/** Kinds of phase that a reference can be for: `fed-2` is `fed`, a part of a fed phase too. */
export const PHASE_KINDS = ['fasting', 'meal', 'fed', 'whole'] as const;
export type PhaseKind = (typeof PHASE_KINDS)[number];

/** A range that a site keeps for one figure, with what it holds for and where it comes from. */
export interface SiteRange {
  /** Key of the figure catalogue. */
  readonly figure: string;
  readonly phase: PhaseKind;
  /** Lengths of phase, or of a part of it, that it holds for. */
  readonly minMinutes: number;
  readonly maxMinutes: number;
  /** As in the study's protocol; '' where any will do. */
  readonly posture: string;
  readonly meal: string;
  /** In the figure's unit; null where the range is open on that side, never on both. */
  readonly low: number | null;
  readonly high: number | null;
  readonly population: string;
  readonly source: string;
}

/** Reference values of a site, in the order of its file. */
export interface SiteReference {
  readonly ranges: readonly SiteRange[];
}

/** A file of them as it is kept, with the name it was opened under. */
export interface KeptReference {
  readonly fileName: string;
  readonly reference: SiteReference;
}

/** The ranges that fit a figure of a phase or part; [] where there are none. */
export type RangesFor = (figure: string, part: PhaseFindings) => readonly SiteRange[];

/**
 * Finds the ranges beside the figures of a study: same figure, kind and length of phase, posture and meal as its protocol has
 * them (letter case and blanks aside). A figure that is withheld or given as a count has none.
 */
export function rangesOf(reference: SiteReference | null, protocol: Protocol): RangesFor {
  if (!reference) return () => [];
  return (figure, part) =>
    isNumber(part.figures[figure])
      ? reference.ranges.filter(
          (range) => range.figure === figure && fitsPart(range, part) && fitsStudy(range, protocol),
        )
      : [];
}

const isNumber = (value: FigureValue | undefined): boolean =>
  value?.kind === 'number' && Number.isFinite(numberOf(value));

/** A half second of slack, since phases are typed to the second. */
const SLACK_MIN = 0.5 / 60;

function fitsPart({ phase, minMinutes, maxMinutes }: SiteRange, part: PhaseFindings): boolean {
  const minutes = (part.toS - part.fromS) / 60;
  return (
    phase === kindOf(part) && minutes >= minMinutes - SLACK_MIN && minutes <= maxMinutes + SLACK_MIN
  );
}

function kindOf({ phase, fromS, toS }: PhaseFindings): PhaseKind | null {
  const whole = { name: phase, fromS, toS };
  if (isFasting(whole)) return 'fasting';
  if (isFed(whole)) return 'fed';
  if (isMeal(whole)) return 'meal';
  return phase === WHOLE_STUDY_PHASE ? 'whole' : null;
}

const plain = (text: string): string => text.trim().replaceAll(/\s+/g, ' ').toLowerCase();
const fitsStudy = ({ posture, meal }: SiteRange, protocol: Protocol): boolean =>
  (posture === '' || plain(posture) === plain(protocol.posture)) &&
  (meal === '' || plain(meal) === plain(protocol.meal));

/** The range without its unit: "2.5–3.75", "at least 70", "at most 30". */
export function rangeWords({ low, high }: Pick<SiteRange, 'low' | 'high'>): string {
  if (low === null) return `at most ${signed(high)}`;
  return high === null ? `at least ${signed(low)}` : `${signed(low)}–${signed(high)}`;
}

const signed = (value: number | null): string => String(value).replace('-', '−');

/** What a range holds for and where it comes from. */
export function rangeGrounds(range: SiteRange): string {
  const { phase, minMinutes, maxMinutes, posture, meal, population, source } = range;
  const minutes = minMinutes === maxMinutes ? `${minMinutes}` : `${minMinutes}–${maxMinutes}`;
  return [
    `${phase} of ${minutes} min`,
    ...(posture === '' ? [] : [posture]),
    ...(meal === '' ? [] : [`meal: ${meal}`]),
    ...(population === '' ? [] : [population]),
    `source: ${source}`,
  ].join('; ');
}

/** What such a range is called wherever it stands. */
export const SITE_REFERENCE = 'reference of this site';
