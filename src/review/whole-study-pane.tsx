import { lazy, Suspense, useEffect, useRef } from 'react';
import { useStore } from 'zustand';
import { asWork } from './idle';
import type { PaneProps } from './pane-props';
import { listenToStage } from './stage';
import { type StripDom, StripView, stripActs } from './strip-view';
import { THEMES } from './theme-tokens';
import { PhaseTable } from './twin-tables';

/** Fetched when an edge is moved first. */
const MovingParts = lazy(() =>
  asWork(import('./moving')).then((all) => ({ default: all.MovingParts })),
);

function stripDom(section: HTMLElement): StripDom {
  const part = (name: string) => {
    const found = section.querySelector(`[data-part="${name}"]`);
    if (!(found instanceof HTMLElement)) throw new Error(`the strip has no ${name}`);
    return found;
  };
  const canvas = part('canvas');
  if (!(canvas instanceof HTMLCanvasElement)) throw new Error('the strip has no canvas');
  return {
    stage: part('stage'),
    canvas,
    slot: part('slot'),
    innerSlot: part('inner-slot'),
    cursorLine: part('cursor-line'),
    summary: part('summary'),
  };
}

/** The thin strip over the full duration. */
export function WholeStudyPane({ stores, act, theme, scale }: PaneProps) {
  const moving = useStore(
    stores.view,
    ({ draft, phaseDraft, bordersShown }) => bordersShown || (draft ?? phaseDraft) !== null,
  );
  const sectionRef = useRef<HTMLElement>(null);
  const stripRef = useRef<StripView | null>(null);
  const themeRef = useRef(theme);
  themeRef.current = theme;
  useEffect(() => {
    const section = sectionRef.current;
    if (!section) return undefined;
    const dom = stripDom(section);
    const strip = new StripView(dom, stores, act, THEMES[themeRef.current], scale);
    const deafen = listenToStage(dom.stage, stripActs(strip, stores), scale);
    stripRef.current = strip;
    return () => {
      deafen();
      strip.destroy();
      stripRef.current = null;
    };
  }, [stores, act, scale]);
  useEffect(() => stripRef.current?.retheme(THEMES[theme]), [theme]);
  return (
    <section className="pane whole" aria-label="Whole study" ref={sectionRef}>
      <div className="strip-gutter">
        <h2 className="strip-title">Whole study</h2>
        <span className="strip-name hue-stomach">stomach row</span>
        <span className="strip-name hue-heart">heart rate</span>
      </div>
      <div className="strip-stage" data-part="stage">
        <canvas data-part="canvas" />
        <div className="slot inner" data-part="inner-slot" />
        <div className="slot" data-part="slot" />
        <div className="cursor-line" data-part="cursor-line" hidden />
      </div>
      <p className="visually-hidden" data-part="summary" />
      <PhaseTable stores={stores} />
      {moving ? (
        <Suspense fallback={null}>
          <MovingParts stores={stores} act={act} />
        </Suspense>
      ) : null}
    </section>
  );
}
