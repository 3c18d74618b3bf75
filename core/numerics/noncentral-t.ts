import { layeredNoncentralT } from './noncentral-t-layered.ts';
import type { NoncentralTail } from './noncentral-tail.ts';
import { logNormalCdf, millsRatio, normalFromMiddle } from './normal.ts';
import { logSpreadDensity, spreadExponent } from './spread-density.ts';

const peakDensity = 0.3989422804014327;
/** Below this many degrees of freedom the integrand falls slowly to the left, and its left end is drawn in. */
const fewDegrees = 12;
const drawIn = 0.25;
/** Where the integrand is below exp(-45) of its peak it is not seen in a double. */
const negligible = 45;
/** No sum needs as many; a sum that does is refused. */
const mostNodes = 20_000;

/** Density over upper tail of the normal distribution, at any z. */
function hazard(z: number): number {
  if (z >= 0.4) return 1 / millsRatio(z);
  return (peakDensity * Math.exp(-0.5 * z * z)) / (0.5 - normalFromMiddle(z));
}

/** The u = ln(s/sigma) near the one peak of the integrand, which is log-concave in s/sigma. */
function peakOf(t: number, df: number, noncentrality: number): number {
  let low = t > 0 ? -750 : 0;
  let high = t > 0 ? 0 : Math.log1p((-t * (1 + Math.max(0, -noncentrality))) / df);
  let u = t > 0 ? Math.min(0, Math.log((Math.max(0, noncentrality) + 1) / (t + 1))) : 0;
  for (let round = 0; round < 200; round++) {
    const w = Math.exp(u);
    const y = t * w - noncentrality;
    const pull = t * w * hazard(y);
    const rise = -df * Math.expm1(2 * u) - pull;
    const bend = 2 * df * w * w + Math.max(0, pull) + t * w * pull * Math.max(0, hazard(y) - y);
    if (rise * rise < 1e-4 * bend) return u;
    if (rise > 0) low = u;
    else high = u;
    const newton = u + rise / bend;
    u = newton > low && newton < high ? newton : 0.5 * (low + high);
  }
  return u;
}

/** A step in u at which the trapezoid sum has 1e-15; from the widths of both factors (measured against 40 digits). */
function stepOf(t: number, df: number, noncentrality: number, peak: number, top: number): number {
  const w = Math.exp(peak);
  const crossing = noncentrality / t;
  const felt = crossing > 0 && top + df * spreadExponent(Math.log(crossing), crossing) < negligible;
  const layer = felt ? Math.abs(noncentrality) : 0;
  const flank = t * w > noncentrality ? Math.abs(t * w) : 0;
  const steepest = Math.sqrt(2 * df * w * w + Math.max(layer, flank) ** 2);
  if (df >= 30) return Math.min(0.13, 0.6 / steepest);
  return Math.min(df < fewDegrees ? 0.08 : 0.1, 0.4 / steepest);
}

/**
 * Upper tail of the noncentral t distribution, P(T > t), in logarithms, for tails of any size.
 * Absolute error of ln P about 1e-14, and what a relative change of 1e-16 in t or the noncentrality makes.
 *
 * @param t             any finite number
 * @param df            degrees of freedom, 1 to 1e12
 * @param noncentrality any finite number
 * @source P(T > t) = E[Phi(noncentrality - t S)] with S^2 = chi-square/df (the definition), summed by the trapezoid
 *   rule in ln S, which converges faster than any power of its step here; own arrangement
 */
export function noncentralTUpper(t: number, df: number, noncentrality: number): NoncentralTail {
  if (noncentrality / t > 0 && Math.abs(noncentrality) > 40 && t * t > 200 * df) {
    return layeredNoncentralT(t, df, noncentrality);
  }
  const peak = peakOf(t, df, noncentrality);
  const curl = df < fewDegrees ? drawIn : 0;
  const peakSpread = Math.exp(peak);
  const top = logNormalCdf(noncentrality - t * peakSpread) - df * spreadExponent(peak, peakSpread);
  const h = stepOf(t, df, noncentrality, peak, top);
  let sum = 0;
  let first = 0;
  let second = 0;
  let firstT = 0;
  let secondT = 0;
  for (let side = 1; side >= -1; side -= 2) {
    for (let i = side > 0 ? 0 : 1; ; i++) {
      const v = side * i * h;
      const drawn = curl > 0 ? curl * Math.exp(-v) : 0;
      const u = peak + v + curl - drawn;
      const w = Math.exp(u);
      const y = t * w - noncentrality;
      const exponent = -df * spreadExponent(u, w) - top;
      let density: number;
      let value: number;
      if (y >= 0.4) {
        density = (1 + drawn) * peakDensity * Math.exp(exponent - 0.5 * y * y);
        value = density * millsRatio(y);
      } else {
        const height = (1 + drawn) * Math.exp(exponent);
        density = height * peakDensity * Math.exp(-0.5 * y * y);
        value = y > -0.4 ? height * (0.5 - normalFromMiddle(y)) : height - density * millsRatio(-y);
      }
      sum += value;
      first += density;
      second += density * y;
      firstT += density * w;
      secondT += density * y * w * w;
      if (!(value > 1e-17 * sum)) break;
      if (i > mostNodes) sum = NaN;
    }
  }
  return {
    logTail: top + logSpreadDensity(df) + Math.log(h * sum),
    byNoncentrality: first / sum,
    twiceByNoncentrality: second / sum,
    byT: -firstT / sum,
    twiceByT: secondT / sum,
  };
}
