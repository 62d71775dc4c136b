/** A piece of a signal: work on [from, to), believe [coreFrom, coreTo). */
export interface Piece {
  readonly from: number;
  readonly to: number;
  readonly coreFrom: number;
  readonly coreTo: number;
}

/**
 * A signal worked on piece by piece, so that others get their turn in between: cores of `core` samples side by side over
 * [0, length), each with up to `margin` samples more on either side. Yields the part that is done.
 */
export function* inPieces(
  length: number,
  core: number,
  margin: number,
  work: (piece: Piece) => void,
): Generator<number, void> {
  for (let coreFrom = 0; coreFrom < length; coreFrom += core) {
    const coreTo = Math.min(length, coreFrom + core);
    const [from, to] = [Math.max(0, coreFrom - margin), Math.min(length, coreTo + margin)];
    work({ from, to, coreFrom, coreTo });
    yield coreTo / length;
  }
}
