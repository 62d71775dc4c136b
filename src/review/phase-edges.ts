import type { Phase } from '../recording/phase';
import { nearestWithin } from './hit';
import type { Moved, PhaseDraft } from './view-store';

/** A border of one phase, or of two that touch, that can be dragged. */
export interface PhaseEdge {
  readonly atS: number;
  /** Place in the list of the phase that ends here, of the one that begins here; null: none does. */
  readonly ends: number | null;
  readonly begins: number | null;
}

const TOUCH_S = 0.5;
const LEAST_PHASE_S = 10;
const EDGE_PX = 6;

/** Borders of phases in ascending time; the end of one and the beginning of the next are one border where they touch. */
export function phaseEdges(phases: readonly Phase[]): readonly PhaseEdge[] {
  const edges: PhaseEdge[] = [];
  phases.forEach((phase, index) => {
    const shared = edges.findIndex(
      (edge) => edge.begins === null && Math.abs(edge.atS - phase.fromS) < TOUCH_S,
    );
    if (shared >= 0) edges[shared] = { ...edges[shared], begins: index };
    else edges.push({ atS: phase.fromS, ends: null, begins: index });
    edges.push({ atS: phase.toS, ends: index, begins: null });
  });
  return edges.sort((a, b) => a.atS - b.atS);
}

/**
 * Phases with one border moved to a time, kept inside the study, clear of the other phases, and so that no phase is shorter than
 * 10 s. What it was snapped to is told only where it got there.
 */
export function movePhaseEdge(
  phases: readonly Phase[],
  edge: PhaseEdge,
  { atS, snap }: Moved,
  durationS: number,
): PhaseDraft {
  let least = 0;
  let most = durationS;
  phases.forEach((phase, index) => {
    if (index === edge.ends) least = Math.max(least, phase.fromS + LEAST_PHASE_S);
    else if (phase.toS <= edge.atS + TOUCH_S) least = Math.max(least, phase.toS);
    if (index === edge.begins) most = Math.min(most, phase.toS - LEAST_PHASE_S);
    else if (phase.fromS >= edge.atS - TOUCH_S && index !== edge.ends)
      most = Math.min(most, phase.fromS);
  });
  const place = Math.min(Math.max(atS, least), Math.max(least, most));
  return {
    phases: phases.map((phase, index) => {
      if (index === edge.ends) return { ...phase, toS: place };
      if (index === edge.begins) return { ...phase, fromS: place };
      return phase;
    }),
    moved: { atS: place, snap: place === atS ? snap : null },
  };
}

/** The border of a phase within 6 px of a place, or null; of several, the nearest. */
export function edgeNear(
  phases: readonly Phase[],
  x: number,
  xOf: (atS: number) => number,
): PhaseEdge | null {
  const edges = phaseEdges(phases);
  const found = nearestWithin(
    x,
    edges.map((edge) => xOf(edge.atS)),
    EDGE_PX,
  );
  return found === null ? null : edges[found];
}
