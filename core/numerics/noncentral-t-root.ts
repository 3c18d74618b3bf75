import { gammaOfLowerTail, gammaOfUpperTail } from './gamma-quantile.ts';
import { NoConvergence } from './no-convergence.ts';
import { noncentralTUpper } from './noncentral-t.ts';
import { normalDensity, normalQuantileOfLogTail, normalQuantileOfTail, normalTail } from './normal.ts';
import { tQuantileOfTail } from './student-t.ts';

/** ln of a tail at one place, with first and second derivative of the tail over the tail. */
type TailAt = (x: number) => { readonly logTail: number; readonly slope: number; readonly bend: number };

/** Density over tail where the tail is that of the normal distribution beyond z. */
function densityOverTail(z: number): number {
  return z < 37 ? normalDensity(z) / normalTail(z) : z + 1 / z;
}

/**
 * The x at which a tail has the wanted size: Halley's method on the normal quantile of the tail, which is nearly
 * straight in x; halving of the bracket where a step would leave it.
 */
function rootOf(tailAt: TailAt, tail: number, start: number, rising: boolean): number {
  const wanted = normalQuantileOfTail(tail);
  let low = -Infinity;
  let high = Infinity;
  let x = start;
  for (let round = 0; round < 200; round++) {
    const { logTail, slope, bend } = tailAt(x);
    const z = logTail < -1.2 ? normalQuantileOfLogTail(logTail) : normalQuantileOfTail(Math.exp(logTail));
    const tailTooLarge = logTail > -0.6 || z < wanted;
    if (tailTooLarge === rising) high = x;
    else low = x;
    const hazard = densityOverTail(z);
    const speed = -slope / hazard;
    const newton = (wanted - z) / speed;
    const turn = (0.5 * newton * (z * speed * speed - bend / hazard)) / speed;
    const next = x + newton / Math.min(2, Math.max(0.5, 1 + turn));
    if (Math.abs(wanted - z) < 2e-6 && Number.isFinite(next)) return next;
    x = next > low && next < high ? next : within(low, high, x);
  }
  throw new NoConvergence('noncentral t');
}

/** A place inside the bracket, or farther out on its open side. */
function within(low: number, high: number, x: number): number {
  if (low === -Infinity) return x - 2 * (1 + Math.abs(x));
  return high === Infinity ? x + 2 * (1 + Math.abs(x)) : 0.5 * (low + high);
}

/** Where the normal approximation of the noncentral t has this tail; far out, where chi-square alone decides, that. */
function noncentralityStart(tail: number, df: number, t: number): number {
  if (t * t < 30 * df) return t * (1 - 0.25 / df) - normalQuantileOfTail(tail) * Math.sqrt(1 + (t * t) / (2 * df));
  const halfSquare = t > 0 ? gammaOfLowerTail(df / 2, tail) : gammaOfUpperTail(df / 2, tail);
  return t * Math.sqrt(halfSquare / (df / 2));
}

/**
 * The noncentrality at which the noncentral t distribution has this upper tail beyond t.
 *
 * @param tail P(T > t), above 0, below 1
 * @param df   degrees of freedom, 1 to 1e12
 * @param t    any finite number
 * @throws NoConvergence
 * @source root of noncentralTUpper; start from the normal approximation in M. Abramowitz, I. A. Stegun (eds), Handbook of
 *   Mathematical Functions, 26.7.10 (from memory)
 */
export function noncentralityOfTail(tail: number, df: number, t: number): number {
  if (tail > 0.5) return -noncentralityOfTail(1 - tail, df, -t);
  return rootOf(
    (noncentrality) => {
      const at = noncentralTUpper(t, df, noncentrality);
      return { logTail: at.logTail, slope: at.byNoncentrality, bend: at.twiceByNoncentrality };
    },
    tail,
    noncentralityStart(tail, df, t),
    true,
  );
}

/** Where the normal approximation of the noncentral t has this tail; with few degrees of freedom a widened Student t. */
function quantileStart(tail: number, df: number, noncentrality: number): number {
  const z = normalQuantileOfTail(tail);
  const shrink = 1 - 0.25 / df;
  const widening = (z * z) / (2 * df);
  const lead = shrink * shrink - widening;
  const root = noncentrality * noncentrality * widening + z * z * lead;
  if (lead > 0.3 && root >= 0) return (shrink * noncentrality + Math.sqrt(root)) / lead;
  return tQuantileOfTail(tail, df) * Math.sqrt(1 + (noncentrality * noncentrality) / (2 * df)) + noncentrality;
}

/**
 * The t beyond which the noncentral t distribution has this upper tail.
 *
 * @param tail          P(T > t), above 0, below 1
 * @param df            degrees of freedom, 1 to 1e12
 * @param noncentrality any finite number
 * @throws NoConvergence
 * @source root of noncentralTUpper in arsinh(t)
 */
export function noncentralTQuantileOfTail(tail: number, df: number, noncentrality: number): number {
  if (tail > 0.5) return -noncentralTQuantileOfTail(1 - tail, df, -noncentrality);
  const place = rootOf(
    (s) => {
      const t = Math.sinh(s);
      const at = noncentralTUpper(t, df, noncentrality);
      const speed = Math.cosh(s);
      return { logTail: at.logTail, slope: at.byT * speed, bend: at.twiceByT * speed * speed + at.byT * t };
    },
    tail,
    Math.asinh(quantileStart(tail, df, noncentrality)),
    false,
  );
  return Math.sinh(place);
}
