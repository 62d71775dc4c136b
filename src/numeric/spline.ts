/** Values of a curve at the places asked for. */
export type CurveValues = (at: Float64Array) => Float64Array;

function checkKnots(x: Float64Array, y: Float64Array): void {
  if (x.length !== y.length || x.length < 2)
    throw new Error(`a spline needs two knots or more: ${x.length} places, ${y.length} values`);
  for (let i = 1; i < x.length; i++)
    if (!(x[i] > x[i - 1])) throw new Error(`knot ${i} does not lie after the one before it`);
}

/** Solves a tridiagonal system in place (Thomas); the solution is left in `right`. */
function solveTridiagonal(
  below: Float64Array,
  main: Float64Array,
  above: Float64Array,
  right: Float64Array,
): void {
  const n = main.length;
  for (let i = 1; i < n; i++) {
    const factor = below[i] / main[i - 1];
    main[i] -= factor * above[i - 1];
    right[i] -= factor * right[i - 1];
  }
  right[n - 1] /= main[n - 1];
  for (let i = n - 2; i >= 0; i--) right[i] = (right[i] - above[i] * right[i + 1]) / main[i];
}

/** Slopes at the knots for not-a-knot ends (de Boor 1978, chapter IV); four knots or more. */
function notAKnotSlopes(h: Float64Array, rise: Float64Array): Float64Array {
  const n = h.length + 1;
  const below = new Float64Array(n);
  const main = new Float64Array(n);
  const above = new Float64Array(n);
  const slopes = new Float64Array(n);
  for (let i = 1; i < n - 1; i++) {
    below[i] = h[i];
    main[i] = 2 * (h[i - 1] + h[i]);
    above[i] = h[i - 1];
    slopes[i] = 3 * (h[i] * rise[i - 1] + h[i - 1] * rise[i]);
  }
  const first = h[0] + h[1];
  main[0] = h[1];
  above[0] = first;
  slopes[0] = ((h[0] + 2 * first) * h[1] * rise[0] + h[0] * h[0] * rise[1]) / first;
  const last = h[n - 2] + h[n - 3];
  main[n - 1] = h[n - 3];
  below[n - 1] = last;
  slopes[n - 1] =
    (h[n - 2] * h[n - 2] * rise[n - 3] + (2 * last + h[n - 2]) * h[n - 3] * rise[n - 2]) / last;
  solveTridiagonal(below, main, above, slopes);
  return slopes;
}

/** Slopes at two or three knots: those of the line or parabola through them. */
function fewKnotSlopes(h: Float64Array, rise: Float64Array): Float64Array {
  if (h.length === 1) return Float64Array.of(rise[0], rise[0]);
  const bend = (rise[1] - rise[0]) / (h[0] + h[1]);
  return Float64Array.of(rise[0] - bend * h[0], rise[0] + bend * h[0], rise[1] + bend * h[1]);
}

/** The interval of ascending x that holds `place`; the first or last where it lies outside. */
function intervalOf(x: Float64Array, place: number, guess: number): number {
  let low = 0;
  let high = x.length - 2;
  if (place >= x[guess] && (guess === high || place < x[guess + 1])) return guess;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if (x[middle] <= place) low = middle;
    else high = middle - 1;
  }
  return low;
}

/**
 * Cubic spline through (x, y) with not-a-knot ends (de Boor 1978; scipy's CubicSpline), x strictly
 * ascending, two points or more (two give a line, three a parabola). Outside x the end pieces go
 * on. Throws where x does not ascend or the lengths differ.
 */
export function cubicSpline(x: Float64Array, y: Float64Array): CurveValues {
  checkKnots(x, y);
  const h = new Float64Array(x.length - 1);
  const rise = new Float64Array(x.length - 1);
  for (let i = 0; i < h.length; i++) {
    h[i] = x[i + 1] - x[i];
    rise[i] = (y[i + 1] - y[i]) / h[i];
  }
  const slopes = x.length < 4 ? fewKnotSlopes(h, rise) : notAKnotSlopes(h, rise);
  return (at) => {
    const values = new Float64Array(at.length);
    let i = 0;
    for (let k = 0; k < at.length; k++) {
      i = intervalOf(x, at[k], i);
      const u = at[k] - x[i];
      const third = (slopes[i] + slopes[i + 1] - 2 * rise[i]) / h[i];
      const second = (rise[i] - slopes[i]) / h[i] - third;
      values[k] = y[i] + u * (slopes[i] + u * (second + (u * third) / h[i]));
    }
    return values;
  };
}
