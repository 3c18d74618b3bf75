import { gaussNodes, gaussWeights } from './gauss-legendre.ts';
import type { NoncentralTail } from './noncentral-tail.ts';
import { normalDensity, normalTail } from './normal.ts';
import { logSpreadDensity, spreadExponent } from './spread-density.ts';

/** Standard deviations of the normal layer on either side; what lies beyond is below 1e-22. */
const reach = 10;
const pureStep = 1 / 12;

/** Integral of the spread's density from the layer's edge away from the layer, over exp(top). */
function purePart(edge: number, away: number, df: number, top: number): number {
  const w = Math.exp(edge);
  const scale = 1 / (df * Math.abs(w * w - 1) + Math.sqrt(2 * df) * w);
  let sum = 0;
  for (let side = 1; side >= -1; side -= 2) {
    for (let i = side > 0 ? 0 : 1; ; i++) {
      const v = side * i * pureStep;
      const curl = Math.exp(-v);
      const x = scale * Math.exp(v - curl);
      const u = edge + away * x;
      const value = x * (1 + curl) * Math.exp(-df * spreadExponent(u, Math.exp(u)) - top);
      sum += value;
      if (!(value > 1e-18 * sum) && i > 20) break;
    }
  }
  return pureStep * sum;
}

/**
 * The upper tail of the noncentral t distribution where t is so large against the root of its degrees of freedom
 * that the normal factor is a thin layer: the spread's density alone up to the layer, and the layer by itself.
 *
 * @param t             finite; same sign as the noncentrality, t^2 > 200 df
 * @param df            degrees of freedom, 1 to 1e12
 * @param noncentrality finite, beyond 40 on either side
 * @source own arrangement; the first part by a double exponential rule, the layer by Gauss-Legendre nodes
 */
export function layeredNoncentralT(t: number, df: number, noncentrality: number): NoncentralTail {
  const away = t > 0 ? -1 : 1;
  const middle = Math.abs(noncentrality);
  const edge = Math.log((middle + away * reach) / Math.abs(t));
  const end = Math.log((middle - away * reach) / Math.abs(t));
  const best = away < 0 ? Math.min(0, end) : Math.max(0, end);
  const top = -df * spreadExponent(best, Math.exp(best));
  const bulkIsPure = edge * away < 0;
  let sum = bulkIsPure ? Math.exp(-logSpreadDensity(df)) - purePart(edge, -away, df, top) : purePart(edge, away, df, top);
  let first = 0;
  let second = 0;
  let firstT = 0;
  let secondT = 0;
  const half = 0.5 * Math.abs(end - edge);
  for (let panel = 0; panel < 2; panel++) {
    for (let i = 0; i < gaussNodes.length; i++) {
      const u = Math.min(edge, end) + half * (panel + (gaussNodes[i] ?? NaN));
      const w = Math.exp(u);
      const y = t * w - noncentrality;
      const height = half * (gaussWeights[i] ?? NaN) * Math.exp(-df * spreadExponent(u, w) - top);
      const density = height * normalDensity(y);
      sum += height * normalTail(y);
      first += density;
      second += density * y;
      firstT += density * w;
      secondT += density * y * w * w;
    }
  }
  return {
    logTail: top + logSpreadDensity(df) + Math.log(sum),
    byNoncentrality: first / sum,
    twiceByNoncentrality: second / sum,
    byT: -firstT / sum,
    twiceByT: secondT / sum,
  };
}
