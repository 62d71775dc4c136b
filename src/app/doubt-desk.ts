import { bringer, type DoubtParts, doubtActs } from '../review/doubt-acts';
import { followDoubts } from '../review/doubt-follow';
import type { PaneActs } from '../review/pane-acts';
import type { AppParts } from './app-context';
import { runDoubts } from './doubt-runner';
import { runEvidence } from './evidence-runner';

/** Begins to look for doubts and to act on them, and to compute the evidence, once for the life of the page. */
export function startDoubts(parts: AppParts, act: PaneActs): void {
  const { doubts, shell } = parts;
  if (doubts.getState().acts !== null) return;
  const own: DoubtParts = {
    stores: parts,
    doubts,
    act,
    openLookAlikes: (doubtId) => shell.getState().openDialog({ kind: 'look-alikes', doubtId }),
  };
  const bring = bringer(own);
  followDoubts(own, bring);
  doubts.setState({ acts: doubtActs(own, bring, runDoubts(parts)) });
  runEvidence(parts);
}
