import type { Doubt } from '../recording/doubt';
import { keepDoubts, mendDoubts } from '../session/edits';
import { openBeats } from './beat-commands';
import type { DoubtActs, DoubtStore } from './doubt-store';
import { doubtMark, doubtSelection, doubtTraveller, inSight } from './doubt-travel';
import { effectLine, KIND_WORDS, mendWords, placeWords } from './doubt-words';
import { doubtInFront, openDoubts } from './open-doubts';
import { type PaneActs, tryEdit } from './pane-acts';
import type { PaneStores } from './row-view';

export interface DoubtParts {
  readonly stores: PaneStores;
  readonly doubts: DoubtStore;
  readonly act: PaneActs;
  /** Opens the dialog of the beats most like a doubted one. */
  readonly openLookAlikes: (id: string) => void;
}

/** The open doubts of the study as it stands; none before they were looked for. */
export function openNow({
  stores,
  doubts,
}: Pick<DoubtParts, 'stores' | 'doubts'>): readonly Doubt[] {
  const { listed } = doubts.getState();
  const state = stores.session.getState().session?.state;
  return listed && state ? openDoubts(listed, state) : [];
}

/** A doubt in words as it is read out when the panes have come to it. */
export function doubtSpoken(doubt: Doubt, place: string, rateHz: number): string {
  const { kind, why, mend, effect } = doubt;
  const line = effect === null ? '' : effectLine(effect);
  const proposal = mend === null ? '' : ` ${mendWords(doubt, rateHz)}${line ? `: ${line}` : ''}.`;
  return `${place}, ${KIND_WORDS[kind]} ${why}${proposal}`;
}

/** Puts a doubt in front: the panes travel there, what it is about is picked out, and it is read out. */
export type BringInFront = (doubt: Doubt) => void;

export function bringer({ stores, doubts }: DoubtParts): BringInFront {
  const travel = doubtTraveller(stores.view);
  return (doubt) => {
    doubts.setState({ frontId: doubt.id });
    travel(doubt);
    const rateHz = openBeats(stores)?.rateHz ?? null;
    stores.view.setState({
      selection: doubtSelection(doubt, stores),
      doubt: doubtMark(doubt, stores),
    });
    const open = openNow({ stores, doubts });
    const at = open.findIndex(({ id }) => id === doubt.id) + 1;
    const place = `Doubt ${at} of ${open.length}, ${placeWords(doubt, rateHz)}`;
    doubts.setState({ spoken: doubtSpoken(doubt, place, rateHz ?? 1) });
  };
}

/** Makes the acts on doubts; what follows on a settled one is not theirs (doubt-follow.ts). */
export function doubtActs(
  parts: DoubtParts,
  bring: BringInFront,
  lookAgain: () => void,
): DoubtActs {
  const { stores, doubts, act } = parts;
  const front = () => doubtInFront(openNow(parts), doubts.getState().frontId);
  const settle: DoubtActs['settle'] = (settled, ending) =>
    void tryEdit(stores, act, (session) =>
      ending === 'kept' ? keepDoubts(settled) : mendDoubts(session, settled),
    );
  const step = (way: 1 | -1) => {
    const open = openNow(parts);
    const now = front();
    if (!now) act.say('No open doubts');
    else if (!inSight(stores.view, now)) bring(now);
    else bring(open[(open.indexOf(now) + way + open.length) % open.length]);
  };
  /** A doubt that nobody can have looked at is shown before it is settled. */
  const onceSeen = (then: (doubt: Doubt) => void) => {
    const now = front();
    if (!now) act.say('No open doubts');
    else if (!inSight(stores.view, now)) bring(now);
    else then(now);
  };
  return {
    next: () => step(1),
    previous: () => step(-1),
    goTo: (id) => {
      const wanted = openNow(parts).find((one) => one.id === id);
      if (wanted) bring(wanted);
    },
    keep: () => onceSeen((doubt) => settle([doubt], 'kept')),
    mend: () =>
      onceSeen((doubt) => {
        if (doubt.mend !== null) settle([doubt], 'mended');
        else act.say('Nothing is proposed here: keep it as it is, or mend it by hand.');
      }),
    lookAlikes: () =>
      onceSeen((doubt) => {
        if (doubt.tick !== null) parts.openLookAlikes(doubt.id);
        else act.say('Only beats have look-alikes: this doubt is about a stretch.');
      }),
    settle,
    lookAgain,
  };
}
