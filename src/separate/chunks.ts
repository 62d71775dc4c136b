/** Pieces of a signal that come one by one, kept in single precision. */
export interface Chunks {
  add(piece: Float64Array): void;
  joined(): Float32Array;
}

/** Collects pieces into one array of the length expected; longer or shorter signals are taken as they come. */
export function createChunks(expected: number): Chunks {
  let whole = new Float32Array(Math.max(1, expected));
  let length = 0;
  return {
    add(piece) {
      if (length + piece.length > whole.length) {
        const longer = new Float32Array(Math.max(length + piece.length, 2 * whole.length));
        longer.set(whole.subarray(0, length));
        whole = longer;
      }
      whole.set(piece, length);
      length += piece.length;
    },
    joined: () => (length === whole.length ? whole : whole.slice(0, length)),
  };
}
