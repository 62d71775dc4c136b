import { type RefObject, useEffect, useMemo, useRef } from 'react';
import { type PaneCommands, paneCommands } from './pane-commands';
import { paneDom } from './pane-dom';
import type { PaneProps } from './pane-props';
import { type PaneKind, PaneView } from './pane-view';
import type { Row } from './rows';
import { listenToStage, type StageActs } from './stage';
import { THEMES } from './theme-tokens';

/** What is set up when a pane's drawing begins, and how it ends. */
export interface PaneSetup {
  readonly kind: PaneKind;
  readonly acts: (view: PaneView) => StageActs;
  readonly stop?: () => void;
}

/**
 * Begins the drawing of a pane once its rows stand in the page, and again when the rows change; a change of theme only
 * redraws. `setUp` is called with the section and must be the same function between renders.
 */
export function usePane(
  props: PaneProps,
  rows: readonly Row[],
  setUp: (section: HTMLElement) => PaneSetup,
): RefObject<HTMLElement | null> {
  const { stores, signals, theme, scale } = props;
  const sectionRef = useRef<HTMLElement>(null);
  const viewRef = useRef<PaneView | null>(null);
  const themeRef = useRef(theme);
  themeRef.current = theme;
  useEffect(() => {
    const section = sectionRef.current;
    if (!section || rows.length === 0) return undefined;
    const setup = setUp(section);
    const dom = paneDom(section, rows);
    const view = new PaneView(
      dom,
      stores,
      signals,
      setup.kind,
      rows,
      THEMES[themeRef.current],
      scale,
    );
    const deafen = listenToStage(dom.stage, setup.acts(view), scale);
    viewRef.current = view;
    return () => {
      deafen();
      setup.stop?.();
      view.destroy();
      viewRef.current = null;
    };
  }, [stores, signals, rows, setUp, scale]);
  useEffect(() => viewRef.current?.retheme(THEMES[theme]), [theme]);
  return sectionRef;
}

/** The acts of the panes, made once. */
export function usePaneCommands({ stores, signals, act }: PaneProps): PaneCommands {
  return useMemo(() => paneCommands(stores, signals, act), [stores, signals, act]);
}
