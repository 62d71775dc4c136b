import type { Doubt, DoubtEffect, DoubtKind, Mend } from '../recording/doubt';
import { FIGURES } from '../recording/figure-catalogue';
import { figureWords } from '../recording/figure-words';
import type { SpanTarget } from '../recording/span';
import { ticksToSeconds } from '../units/ticks';
import { formatClock } from '../units/time';

/** What each kind of doubt asks, as its heading. */
export const KIND_WORDS: Readonly<Record<DoubtKind, string>> = {
  'missed-beat': 'missed beat?',
  'extra-beat': 'extra beat?',
  'early-beat': 'early beat?',
  'odd-shape': 'odd shape?',
  'low-beat': 'weak beat?',
  'tall-wave': 'tall wave?',
  'two-candidates': 'which of two?',
  'sign-change': 'turned over?',
  span: 'spoiled?',
  epoch: 'which rhythm?',
};

const TARGET_WORDS: Readonly<Record<SpanTarget, string>> = {
  stomach: 'the stomach',
  heart: 'the heart',
  both: 'both',
};

/** Time of a doubt as its heading shows it; of one at a beat to a tenth of a second. */
export const placeWords = ({ fromS, toS, tick }: Doubt, rateHz: number | null): string =>
  tick !== null && rateHz !== null
    ? formatClock(ticksToSeconds(tick, rateHz), 1)
    : `${formatClock(fromS)}–${formatClock(toS)}`;

/** What the mend of a doubt does, as a sentence without its stop: "Insert a beat at 0:12:31.204"; '' where it has none. */
export function mendWords({ mend, tick }: Doubt, rateHz: number): string {
  const at = (one: number) => formatClock(ticksToSeconds(one, rateHz), 3);
  switch (mend?.kind) {
    case undefined:
      return '';
    case 'beats':
      return beatsWords(mend, tick, at);
    case 'exclude': {
      const { fromS, toS, target } = mend.span;
      return `Exclude ${formatClock(fromS)}–${formatClock(toS)} for ${TARGET_WORDS[target]}`;
    }
    case 'include':
      return 'Let the excluded stretch count again';
  }
}

type BeatsMend = Extract<Mend, { kind: 'beats' }>;

/** The beats whose class alone a mend changes are those that it takes away and puts back at the same places. */
const classesOnly = ({ removed, added }: BeatsMend): boolean =>
  removed.length === added.length &&
  removed.every(({ tick }) => added.some((one) => one.tick === tick));

/** The beat that a doubt stands at needs no time beside the doubt's own. */
function beatsWords(
  mend: BeatsMend,
  standsAt: number | null,
  at: (tick: number) => string,
): string {
  const { removed, added } = mend;
  const [first] = added;
  const places = (beats: BeatsMend['added']) => listed(beats.map(({ tick }) => at(tick)));
  const some = removed.length === 1 ? 'the beat' : `${removed.length} beats`;
  const own = removed.length === 1 && removed[0].tick === standsAt;
  const where = own ? some : `${some} at ${places(removed)}`;
  if (classesOnly(mend)) return `Class ${where} ${first?.beatClass ?? ''}`;
  if (added.length === 0) return `Remove ${where}`;
  if (removed.length === 0)
    return `Insert ${added.length === 1 ? 'a beat' : `${added.length} beats`} at ${places(added)}`;
  return `Move the beat from ${places(removed)} to ${places(added)}`;
}

const listed = (parts: readonly string[]): string =>
  parts.length < 2 ? parts.join('') : `${parts.slice(0, -1).join(', ')} and ${parts.at(-1)}`;

/** The proposed act on its tab in the panes: "insert?". A doubt that proposes nothing asks by its kind. */
export function tabWords({ kind, mend }: Doubt): string {
  if (mend === null) return KIND_WORDS[kind];
  if (mend.kind !== 'beats') return mend.kind === 'exclude' ? 'exclude?' : 'count again?';
  const { removed, added } = mend;
  if (classesOnly(mend)) return `class ${added[0]?.beatClass ?? ''}?`;
  if (removed.length === 0) return 'insert?';
  return added.length === 0 ? 'remove?' : 'move?';
}

/** A figure before and after, as they stand beside each other. */
export interface EffectWords {
  /** "RMSSD, fasting". */
  readonly name: string;
  readonly unit: string;
  readonly before: string;
  readonly after: string;
  /** True where the change is too small for the figure's decimals. */
  readonly same: boolean;
  /** Why a side is withheld, '' where neither is. */
  readonly reason: string;
}

const WITHHELD = 'withheld';

/** An effect in words; null where the figure is none of the catalogue. */
export function effectWords({ figure, phase, before, after }: DoubtEffect): EffectWords | null {
  const definition = FIGURES.find(({ key }) => key === figure);
  if (!definition) return null;
  const sides = [before, after].map((one) =>
    one.kind === 'withheld' ? WITHHELD : figureWords(one, definition).large,
  );
  const reasons = [before, after].flatMap((one) => (one.kind === 'withheld' ? [one.reason] : []));
  return {
    name: `${definition.label}, ${phase}`,
    unit: definition.unit,
    before: sides[0],
    after: sides[1],
    same: reasons.length === 0 && sides[0] === sides[1],
    reason: reasons[0] ?? '',
  };
}

/** An effect in one line, as it is read out: "RMSSD, fed 38.2 to 31.4 ms". */
export function effectLine(effect: DoubtEffect): string {
  const words = effectWords(effect);
  if (!words) return '';
  const { name, before, after, same } = words;
  const unit = words.unit === '' ? '' : ` ${words.unit}`;
  if (same) return `${name} stays ${before}${unit}`;
  if (after === WITHHELD)
    return `${name} ${before === WITHHELD ? before : before + unit} to withheld`;
  return `${name} ${before} to ${after}${unit}`;
}
