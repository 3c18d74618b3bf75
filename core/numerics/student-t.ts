import { normalQuantileOfTail } from './normal.ts';
import { stirlingError } from './stirling.ts';

const halfLogTwoPi = 0.9189385332046727;
/** Beyond this t the tail is summed from outside, below it the share from the middle. */
const outer = 1.5;

/** ln{Gamma((df+1)/2) / [Gamma(df/2) sqrt(df/2)]}; -> 0 as df grows. */
function logGammaHalfStep(df: number): number {
  if (df < 2) return logGammaHalfStep(df + 2) + 0.5 * Math.log1p(2 / df) - Math.log1p(1 / df);
  const a = df / 2;
  return a * Math.log1p(-0.5 / a) + 0.5 + stirlingError(a - 0.5) - stirlingError(a);
}

function logDensity(t: number, df: number): number {
  const logSpread = t > 1e150 ? 2 * Math.log(t) - Math.log(df) : Math.log1p((t * t) / df);
  return logGammaHalfStep(df) - halfLogTwoPi - 0.5 * (df + 1) * logSpread;
}

/** Share between 0 and t >= 0 over the density at t; every term of the series is positive. */
function centralOverDensity(t: number, df: number): number {
  const y = (t * t) / (df + t * t);
  let term = t;
  let sum = t;
  for (let n = 0; term > sum * 1e-17; n++) {
    term *= ((0.5 * (df + 1) + n) / (1.5 + n)) * y;
    sum += term;
  }
  return sum;
}

/** Upper tail over the density at t > 1: the continued fraction of the incomplete beta function with b = 1/2. */
function tailOverDensity(t: number, df: number): number {
  const a = df / 2;
  const square = Math.min(t * t, Number.MAX_VALUE);
  const x = df / (df + square);
  const lambda = (a / (df + square)) * (square - 1);
  let bottomBefore = (a + 1) / (a * (lambda + 1));
  let topBefore = 0;
  let value = bottomBefore;
  for (let n = 1; n < 1000; n++) {
    const d = a + 2 * n - 1;
    const alpha = ((a + n - 1) / d) * ((a + n - 0.5) / d) * n * (0.5 - n) * x * x;
    const beta = n + (n * (0.5 - n) * x) / d + ((a + n) / (d + 2)) * (lambda + 1 + n * (2 - x));
    const bottom = beta + alpha * bottomBefore;
    const next = (beta * value + alpha * topBefore) / bottom;
    topBefore = value / bottom;
    bottomBefore = 1 / bottom;
    if (Math.abs(next - value) <= 1e-16 * next) return 0.5 * t * next;
    value = next;
  }
  return NaN;
}

/**
 * Upper tail of Student's t distribution, P(T > t); relative error below 1e-13 for tails above 1e-300.
 *
 * @param t  any real number, infinities included
 * @param df degrees of freedom, real, 1 to 1e12
 * @returns a probability in [0, 1]; 0 only where it is below the smallest double; NaN for arguments outside their range
 * @source incomplete beta function: series NIST DLMF 8.17.8 with 15.8.1; continued fraction of A. R. DiDonato,
 *   A. H. Morris, ACM Trans. Math. Software 18 (1992) (from memory, checked against 50 digits)
 */
export function tTail(t: number, df: number): number {
  if (!(df >= 1 && df <= 1e12) || Number.isNaN(t)) return NaN;
  if (t < 0) return 1 - tTail(-t, df);
  if (t === Infinity) return 0;
  const logHeight = logDensity(t, df);
  if (t < outer) return 0.5 - Math.exp(logHeight) * centralOverDensity(t, df);
  return Math.exp(logHeight + Math.log(tailOverDensity(t, df)));
}

/** The t with this share between 0 and t. */
function quantileFromMiddle(share: number, df: number, start: number): number {
  let t = start;
  for (let round = 0; round < 50; round++) {
    const newton = centralOverDensity(t, df) - share / Math.exp(logDensity(t, df));
    const step = newton / (1 + (0.5 * newton * (df + 1) * t) / (df + t * t));
    t -= step;
    if (Math.abs(step) < 1e-6 * t) return t;
  }
  return NaN;
}

/** The t with this upper tail: Halley's method on ln(tail) against ln(t), where both ends are close to straight. */
function quantileFromOutside(tail: number, df: number, start: number): number {
  const logTail = Math.log(tail);
  let logT = Math.log(start);
  for (let round = 0; round < 50; round++) {
    const t = Math.exp(logT);
    const width = tailOverDensity(t, df);
    const excess = logDensity(t, df) + Math.log(width) - logTail;
    const slope = t / width;
    const bend = slope * (1 + slope - ((df + 1) * t) / (df / t + t));
    const step = excess / slope / Math.max(0.5, 1 + (0.5 * excess * bend) / (slope * slope));
    logT = Math.max(0.01, logT + step);
    if (Math.abs(step) < 1e-6) return t * Math.exp(logT - Math.log(t));
  }
  return NaN;
}

/** Starting value. @source D. L. Wallace, Ann. Math. Statist. 30 (1959), from memory; far out the leading power. */
function startOf(tail: number, df: number): number {
  const z = normalQuantileOfTail(tail) * ((8 * df + 3) / (8 * df + 1));
  if ((z * z) / df < 2) return Math.sqrt(df * Math.expm1((z * z) / df));
  const far = logGammaHalfStep(df) - halfLogTwoPi + 0.5 * (df - 1) * Math.log(df) - Math.log(tail);
  return Math.max(2, Math.exp(far / df));
}

/**
 * The t with P(T > t) = tail for Student's t; relative error below 1e-13.
 *
 * @param tail probability above 0, below 1; the complement of a confidence level
 * @param df   degrees of freedom, real, 1 to 1e12
 * @returns any real number; negative when tail > 1/2; Infinity where t exceeds the largest double (df near 1,
 *   tail below 1e-308); NaN for arguments outside their range
 * @source root of tTail by Halley's method, own arrangement
 */
export function tQuantileOfTail(tail: number, df: number): number {
  if (!(tail > 0 && tail < 1 && df >= 1 && df <= 1e12)) return NaN;
  if (tail > 0.5) return -tQuantileOfTail(1 - tail, df);
  if (tail === 0.5) return 0;
  const start = startOf(tail, df);
  if (start === Infinity) return Infinity;
  return start < outer ? quantileFromMiddle(0.5 - tail, df, start) : quantileFromOutside(tail, df, start);
}
