import type { Epoch } from '../recording/rhythm';

/** One point of the DF line. */
export interface DfPoint {
  readonly atS: number;
  readonly dfCpm: number;
  /** A flag other than `filled`, or a mixed epoch: drawn with a hollow mark. */
  readonly flagged: boolean;
}

const hasRhythm = (epoch: Epoch): boolean =>
  epoch.kept &&
  epoch.dfCpm !== null &&
  epoch.rhythm !== null &&
  epoch.rhythm !== 'none' &&
  epoch.rhythm !== 'undecided';

/**
 * The DF line over the spectrogram as unbroken pieces: kept epochs with a rhythm, stamped at their centre, joined where they
 * belong to one phase and follow each other within one and a half steps.
 */
export function dfPieces(epochs: readonly Epoch[], stepS: number): readonly (readonly DfPoint[])[] {
  const pieces: DfPoint[][] = [];
  let phase = '';
  for (const epoch of epochs) {
    if (!hasRhythm(epoch) || epoch.dfCpm === null) continue;
    const atS = (epoch.fromS + epoch.toS) / 2;
    const flagged = epoch.rhythm === 'mixed' || epoch.flags.some((flag) => flag !== 'filled');
    const point = { atS, dfCpm: epoch.dfCpm, flagged };
    const piece = pieces[pieces.length - 1];
    const last = piece?.[piece.length - 1];
    if (piece && last && phase === epoch.phase && atS - last.atS <= 1.5 * stepS) piece.push(point);
    else pieces.push([point]);
    phase = epoch.phase;
  }
  return pieces;
}
