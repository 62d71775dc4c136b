/** Two-sided 95 % points for 1 to 12 degrees of freedom (Student 1908; values of scipy). */
const POINTS = [
  12.706204736174694, 4.302652729749462, 3.1824463052837078, 2.7764451051977934, 2.5705818356363146,
  2.4469118511449786, 2.364624251592784, 2.306004135204166, 2.262157162798205, 2.228138851986274,
  2.200985160091639, 2.1788128296672284,
];
const Z = 1.959963984540054;

/** From this many degrees on the four terms about the normal point are right to a millionth. */
const BY_TERMS_FROM = POINTS.length;

/**
 * Two-sided 95 % point of Student's t for degrees of freedom from 1 on; from 12 on by four terms about the normal point
 * (Abramowitz and Stegun 1964, 26.7.5), between whole ones below it along 1 / degrees (at most 1 % too wide from 2 on).
 */
export function studentT95(degrees: number): number {
  if (!(degrees >= 1)) throw new Error(`t needs degrees of freedom from 1 on, not ${degrees}`);
  if (degrees >= BY_TERMS_FROM) return byTerms(1 / degrees);
  const whole = Math.floor(degrees);
  const [less, more] = [POINTS[whole - 1], POINTS[whole]];
  return more + ((1 / degrees - 1 / (whole + 1)) / (1 / whole - 1 / (whole + 1))) * (less - more);
}

function byTerms(d: number): number {
  const z2 = Z * Z;
  const g1 = (z2 + 1) / 4;
  const g2 = ((5 * z2 + 16) * z2 + 3) / 96;
  const g3 = (((3 * z2 + 19) * z2 + 17) * z2 - 15) / 384;
  const g4 = ((((79 * z2 + 776) * z2 + 1482) * z2 - 1920) * z2 - 945) / 92160;
  return Z * (1 + d * (g1 + d * (g2 + d * (g3 + d * g4))));
}
