import type { Doubt, DoubtEnding, Mend, SettledDoubt } from '../recording/doubt';
import type { Change, Edit, Session } from './document';
import { addSpans, removeSpans } from './span-edits';

const settled = ({ id, tick }: Doubt, ending: DoubtEnding): SettledDoubt => ({ id, ending, tick });

function settledChange(doubts: readonly Doubt[], ending: DoubtEnding): Change {
  return { kind: 'doubts', removed: [], added: doubts.map((one) => settled(one, ending)) };
}

const counted = (count: number, one: string, many: string) =>
  count === 1 ? one : `${count} ${many}`;

/** Doubts left as they stand, as one undo step: the figures stay, the places are open no more. */
export function keepDoubts(doubts: readonly Doubt[]): Edit {
  const name = `keep ${counted(doubts.length, 'what is doubted', 'doubted places')}`;
  return { name, changes: doubts.length > 0 ? [settledChange(doubts, 'kept')] : [] };
}

/**
 * Doubts settled by what each proposes, as one undo step. Throws Error where one proposes nothing; RangeError as the changes
 * themselves do where a beat or span is not there any more.
 */
export function mendDoubts(session: Session, doubts: readonly Doubt[]): Edit {
  const mends = doubts.map(({ id, mend }) => {
    if (mend === null) throw new Error(`doubt ${id} proposes nothing`);
    return mend;
  });
  const [first] = mends;
  if (!first) return { name: 'mend', changes: [] };
  const name = mends.length === 1 ? first.words : `${first.words} (${mends.length} times)`;
  return { name, changes: [...changesOf(session, mends), settledChange(doubts, 'mended')] };
}

function changesOf(session: Session, mends: readonly Mend[]): readonly Change[] {
  const beats = mends.flatMap((one) => (one.kind === 'beats' ? [one] : []));
  const spans = mends.flatMap((one) => (one.kind === 'exclude' ? [one.span] : []));
  const freed = mends.flatMap((one) => (one.kind === 'include' ? [one.spanId] : []));
  return [
    ...(beats.length > 0
      ? [
          {
            kind: 'beats' as const,
            removed: beats.flatMap((one) => one.removed),
            added: beats.flatMap((one) => one.added),
          },
        ]
      : []),
    ...addSpans(session, spans, '').changes,
    ...removeSpans(session.state, freed).changes,
  ];
}
