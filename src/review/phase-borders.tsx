import { type KeyboardEvent, useEffect, useRef, useState } from 'react';
import { useStore } from 'zustand';
import type { Phase } from '../recording/phase';
import { timeText } from '../units/typed-time';
import { acrossStrip } from './across-strip';
import { leftInWords } from './left-while-moving';
import type { PaneProps } from './pane-props';
import { changePhases } from './phase-commands';
import { movePhaseEdge, type PhaseEdge, phaseEdges } from './phase-edges';
import { placesOf } from './pointed-time';
import { nextPlace } from './snap';
import type { Moved, PhaseDraft } from './view-store';

type BordersProps = Pick<PaneProps, 'stores' | 'act'>;
const NO_PHASES: readonly Phase[] = [];

/** "end of fasting, start of meal". */
function edgeWords({ ends, begins }: PhaseEdge, phases: readonly Phase[]): string {
  const words = [
    ends === null ? '' : `end of ${phases[ends].name}`,
    begins === null ? '' : `start of ${phases[begins].name}`,
  ];
  return words.filter((one) => one !== '').join(', ');
}

const STEPS_S: Readonly<Record<string, number>> = {
  ArrowLeft: -1,
  ArrowDown: -1,
  ArrowRight: 1,
  ArrowUp: 1,
  PageDown: -60,
  PageUp: 60,
};

/** Where a key takes a border; null where it takes it nowhere. */
function keyedTo(event: KeyboardEvent, atS: number, stores: BordersProps['stores']): Moved | null {
  const step = STEPS_S[event.key];
  if (step === undefined) return null;
  if (!event.ctrlKey && !event.metaKey)
    return { atS: atS + step * (event.shiftKey ? 10 : 1), snap: null };
  const place = nextPlace(placesOf(stores), atS, step > 0 ? 1 : -1);
  return place && { atS: place.atS, snap: place.text };
}

/**
 * The borders of phases as handles for the keys, over Whole study: arrows move by 1 s, with Shift by 10 s, with Ctrl to the next
 * annotation or event; Enter or going on keeps the place, Escape takes it back. Gone once the focus is elsewhere.
 */
export function PhaseBorders({ stores, act }: BordersProps) {
  const phases = useStore(stores.session, (now) => now.session?.state.phases ?? NO_PHASES);
  const durationS = useStore(stores.view, (state) => state.durationS);
  const draft = useStore(stores.view, (state) => state.phaseDraft);
  const [moving, setMoving] = useState<number | null>(null);
  const group = useFocusNearest(stores);
  const edges = phaseEdges(phases);
  const setDraft = (index: number | null, phaseDraft: PhaseDraft | null) => {
    setMoving(index);
    stores.view.setState({ phaseDraft });
  };
  const keep = () => {
    const now = stores.view.getState().phaseDraft;
    setDraft(null, null);
    if (now) changePhases(stores, act, now.phases);
  };
  const leave = () => stores.view.setState({ bordersShown: false, phaseDraft: null });
  const onKey = (event: KeyboardEvent, index: number) => {
    const atS = moving === index && draft ? draft.moved.atS : edges[index].atS;
    const to = keyedTo(event, atS, stores);
    if (to) {
      const next = movePhaseEdge(phases, edges[index], to, durationS);
      setDraft(next.moved.atS === edges[index].atS ? null : index, next);
    } else if (event.key === 'Enter') keep();
    else if (event.key === 'Escape' && draft) setDraft(null, null);
    else if (event.key === 'Escape') leave();
    else {
      if (event.ctrlKey || event.metaKey) keep();
      return;
    }
    event.preventDefault();
    event.stopPropagation();
  };
  return (
    <fieldset
      ref={group}
      className="border-handles"
      aria-label="Borders of phases: arrows move by 1 s, with Shift by 10 s, with Ctrl to the next annotation or event"
      data-own-arrows
      onBlur={(event) => {
        if (moving !== null) keep();
        if (!event.currentTarget.contains(event.relatedTarget)) leave();
      }}
    >
      {edges.map((edge, i) => {
        const atS = moving === i && draft ? draft.moved.atS : edge.atS;
        const left = moving === i && draft ? `; ${leftInWords(stores, draft)}` : '';
        const snap = moving === i && draft?.moved.snap ? `, at ${draft.moved.snap}` : '';
        return (
          <div
            key={edgeWords(edge, phases)}
            className="border-handle"
            role="slider"
            tabIndex={0}
            aria-label={edgeWords(edge, phases)}
            aria-valuemin={0}
            aria-valuemax={durationS}
            aria-valuenow={atS}
            aria-valuetext={`${timeText(atS)}${snap}${left}`}
            style={{ left: `calc(${acrossStrip(atS, durationS)})` }}
            onKeyDown={(event) => onKey(event, i)}
          />
        );
      })}
    </fieldset>
  );
}

/** Puts the focus on the border nearest to the middle of Seconds at the beginning. */
function useFocusNearest({ view, session }: BordersProps['stores']) {
  const group = useRef<HTMLFieldSetElement>(null);
  useEffect(() => {
    const { seconds } = view.getState();
    const middle = (seconds.fromS + seconds.toS) / 2;
    const edges = phaseEdges(session.getState().session?.state.phases ?? []);
    const away = edges.map(({ atS }) => Math.abs(atS - middle));
    const nearest = away.indexOf(Math.min(...away));
    group.current?.querySelectorAll<HTMLElement>('[role="slider"]')[nearest]?.focus();
  }, [view, session]);
  return group;
}
