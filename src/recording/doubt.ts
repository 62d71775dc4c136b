import type { Seconds } from '../units/time';
import type { Beat } from './beat';
import type { FigureValue } from './figure';
import type { Span } from './span';

/** Why a place is doubted. */
export const DOUBT_KINDS = [
  'missed-beat',
  'extra-beat',
  'early-beat',
  'odd-shape',
  'low-beat',
  'tall-wave',
  'two-candidates',
  'sign-change',
  'span',
  'epoch',
] as const;
export type DoubtKind = (typeof DOUBT_KINDS)[number];

/** What would settle a doubt otherwise than by keeping what is there. */
export type Mend =
  | {
      readonly kind: 'beats';
      /** What it does, as undo shows it: "insert beat", "class beat V". */
      readonly words: string;
      readonly removed: readonly Beat[];
      readonly added: readonly Beat[];
    }
  | { readonly kind: 'exclude'; readonly words: string; readonly span: Omit<Span, 'id'> }
  | { readonly kind: 'include'; readonly words: string; readonly spanId: number };

/** What a mend does to the figure it moves most. */
export interface DoubtEffect {
  /** Key of the figure catalogue, and the name of the phase or part of it. */
  readonly figure: string;
  readonly phase: string;
  /** As things stand, and after the mend. */
  readonly before: FigureValue;
  readonly after: FigureValue;
  /** Change over half the width of the figure's range; Infinity where a figure comes or goes. */
  readonly weight: number;
}

/** One place where the program is unsure and a person should look. */
export interface Doubt {
  /** The same for the same place and reason, however often doubts are listed: a settled doubt is known by it. */
  readonly id: string;
  readonly kind: DoubtKind;
  /** What the panes travel to. */
  readonly fromS: Seconds;
  readonly toS: Seconds;
  /** The beat it stands at (of a missed beat: the beat after the gap); null where it stands at a span or an epoch. */
  readonly tick: number | null;
  /** Key of the lead a span or epoch belongs to; null for beats. */
  readonly lead: string | null;
  /** Why it is listed, a plain sentence. */
  readonly why: string;
  readonly mend: Mend | null;
  /** Null where neither keeping nor mending moves a figure. */
  readonly effect: DoubtEffect | null;
}

/** What a person decided of a doubt. */
export const DOUBT_ENDINGS = ['kept', 'mended'] as const;
export type DoubtEnding = (typeof DOUBT_ENDINGS)[number];

/** A doubt that is open no more; `tick` as in the doubt, so that the beat's row can carry it. */
export interface SettledDoubt {
  readonly id: string;
  readonly ending: DoubtEnding;
  readonly tick: number | null;
}

/** What is said beside figures while doubts are open. */
export const openDoubtsWords = (open: number): string =>
  `${open === 1 ? 'One doubt is' : `${open} doubts are`} open: beats, spans and epochs in doubt count as they stand.`;
