/**
 * The normal quantile to 1e-6 from the logarithm of its upper tail, for a first value: five times as
 * fast as `normalQuantileOfTail`, which would take half the time of a whole bound.
 *
 * @param lnTail below 0; down to ln 1e-320
 * @returns z with P(Z > z) about exp(lnTail)
 * @source own rational fit by weighted least squares in sqrt(-2 lnTail)
 */
export function normalStart(lnTail: number): number {
  if (lnTail > -0.6931) return -normalStart(Math.log(-Math.expm1(lnTail)));
  const r = Math.sqrt(-2 * lnTail);
  const top = -3.0561969 + r * (-5.01942644 + r * (3.20326338 + r * (2.52513805 + r * 0.21013078)));
  return top / (1 + r * (4.16670163 + r * (2.53033937 + r * 0.21009846)));
}
