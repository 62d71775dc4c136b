/** A point of a spectrum: logarithm of frequency and of density. */
export interface LogPoint {
  readonly x: number;
  readonly y: number;
}

/** A line y = meanY + slope (x - meanX), with the sum of squares of x about its mean and the number of points. */
export interface PowerLawLine {
  readonly meanX: number;
  readonly meanY: number;
  readonly slope: number;
  readonly squares: number;
  readonly count: number;
}

/** Exponents of a 1/f^b background that are believed. */
const LEAST_EXPONENT = 0;
const MOST_EXPONENT = 3;

/** The background 1/f^b, b from 0 to 3, through points of a spectrum: a line through logarithms by least squares. NaN of none. */
export function powerLawLine(points: readonly LogPoint[]): PowerLawLine {
  const count = points.length;
  const meanX = points.reduce((sum, point) => sum + point.x, 0) / count;
  const meanY = points.reduce((sum, point) => sum + point.y, 0) / count;
  let squares = 0;
  let product = 0;
  for (const { x, y } of points) {
    squares += (x - meanX) ** 2;
    product += (x - meanX) * (y - meanY);
  }
  const exponent = squares > 0 ? -product / squares : 0;
  const slope = -Math.min(MOST_EXPONENT, Math.max(LEAST_EXPONENT, exponent));
  return { meanX, meanY, slope, squares, count };
}

/** Value of a line at a logarithm of frequency. */
export const lineAt = ({ meanX, meanY, slope }: PowerLawLine, x: number): number =>
  meanY + slope * (x - meanX);
