import type { DoubtEnding } from '../recording/doubt';
import type { Edit, LogLine, Session } from '../session/document';
import { openBeats } from './beat-commands';
import { type BringInFront, type DoubtParts, openNow } from './doubt-acts';
import { type DoubtOutcome, NO_DOUBTS } from './doubt-store';
import { doubtMark, inSight } from './doubt-travel';
import { effectLine, placeWords } from './doubt-words';
import { doubtInFront, openDoubts } from './open-doubts';

/** The edit that a line of the log does, does again or takes back. */
function editOf({ act }: LogLine, { log }: Session): Edit | null {
  if (act.kind === 'edit') return act.edit;
  const line = log[act.of - 1];
  return line?.act.kind === 'edit' ? line.act.edit : null;
}

const settledBy = (edit: Edit) =>
  edit.changes.flatMap((change) => (change.kind === 'doubts' ? change.added : []));

const OUTCOME_WORDS: Readonly<Record<DoubtEnding, string>> = { kept: 'Kept', mended: 'Mended' };

/**
 * Keeps the doubts on the page in step with the session: a settled one makes room for the next, one that is taken back comes
 * to the front again, and the panes draw the one in front. Holds as long as the page lives.
 */
export function followDoubts(parts: DoubtParts, bring: BringInFront): void {
  const { stores, doubts } = parts;
  const { session, view } = stores;

  function settled(edit: Edit, before: Session): void {
    const ids = settledBy(edit).map(({ id }) => id);
    const ending = settledBy(edit)[0].ending;
    const { listed, frontId } = doubts.getState();
    const was = openDoubts(listed ?? [], before.state);
    const front = doubtInFront(was, frontId);
    const one = ids.length === 1 ? was.find(({ id }) => id === ids[0]) : undefined;
    const effect = ending === 'mended' ? (one?.effect ?? null) : null;
    const what = ending === 'mended' ? edit.name : 'as it is';
    const place = one ? placeWords(one, openBeats(stores)?.rateHz ?? null) : `${ids.length} places`;
    doubts.setState({ outcome: { ending, words: `${what}, ${place}`, effect } });
    if (!front || !ids.includes(front.id)) return;
    const open = openNow(parts);
    const after = was.slice(was.indexOf(front) + 1);
    const next = after.find((doubt) => open.includes(doubt)) ?? open[0];
    if (next) bring(next);
    else doubts.setState({ frontId: null, spoken: 'No open doubts are left.' });
  }

  function grown(now: Session, before: Session): void {
    const line = now.log[now.log.length - 1];
    const edit = editOf(line, now);
    if (!edit || settledBy(edit).length === 0) {
      doubts.setState({ outcome: null });
      return;
    }
    if (line.act.kind !== 'undo') {
      settled(edit, before);
      return;
    }
    doubts.setState({ outcome: null });
    const [first] = settledBy(edit);
    const again = openNow(parts).find(({ id }) => id === first.id);
    if (again) bring(again);
    else doubts.setState({ frontId: first.id });
  }

  function draw(): void {
    const front = doubtInFront(openNow(parts), doubts.getState().frontId);
    const mark = front && doubtMark(front, stores);
    if (JSON.stringify(mark) !== JSON.stringify(view.getState().doubt))
      view.setState({ doubt: mark });
  }

  session.subscribe((now, before) => {
    if (now.session === before.session) return;
    const same = now.session?.start === before.session?.start;
    if (!same) doubts.setState(NO_DOUBTS);
    else if (now.session && before.session && now.session.log.length > before.session.log.length)
      grown(now.session, before.session);
    draw();
  });
  doubts.subscribe((now, before) => {
    if (now.listed === before.listed) return;
    const open = openNow(parts);
    const gone = now.frontId !== null && !open.some(({ id }) => id === now.frontId);
    if (gone) {
      const [first] = open;
      const going = now.outcome !== null && before.listed !== null && first !== undefined;
      if (going && !inSight(view, first)) bring(first);
      else doubts.setState({ frontId: null });
    }
    draw();
  });
  stores.analysis.subscribe((now, before) => {
    if (now.recording !== before.recording) draw();
  });
}

/** What was settled last, above the next doubt: "Mended: insert beat, 0:12:31.2; RMSSD, fed 38.2 to 31.4 ms". */
export function outcomeWords({ ending, words, effect }: DoubtOutcome): string {
  const line = effect === null ? '' : effectLine(effect);
  return `${OUTCOME_WORDS[ending]}: ${words}${line === '' ? '' : `; ${line}`}`;
}
