import { betaTailRatio } from './beta-tail.ts';
import { deviance, gaussianPeak, stirlingGap } from './beta-density.ts';
import { gammaLowerStart, gammaUpperStart } from './gamma-start.ts';
import { rootOfTail, writePoint, type TailPoint } from './tail-root.ts';

/**
 * The odds p/(1 - p) at which a beta distribution has the wanted lower tail: I_p(a, b) = tail.
 * Odds carry p and 1 - p with full precision both: p = w/(1 + w), 1 - p = 1/(1 + w).
 *
 * @param a above 0
 * @param b above 0
 * @param tail lower tail probability, above 0, below 1
 * @returns above 0, possibly below the smallest double (then 0)
 * @throws NoConvergence
 * @source Newton-Halley iteration on ln(tail); density by saddle point (C. Loader 2000, memory)
 */
export function betaOdds(a: number, b: number, tail: number): number {
  if (a === 1) return Math.expm1(-Math.log1p(-tail) / b);
  if (b === 1) return 1 / Math.expm1(-Math.log(tail) / a);
  if (tail > 0.5) return 1 / smallerTailOdds(b, a, 1 - tail);
  return smallerTailOdds(a, b, tail);
}

function smallerTailOdds(a: number, b: number, tail: number): number {
  const lnTail = Math.log(tail);
  const total = a + b;
  const peak = gaussianPeak(a, b);
  const gap = stirlingGap(a, b);
  const leading = lnTail < -30 * a ? leadingOdds(a, b, lnTail, Math.log(peak) + gap) : undefined;
  if (leading !== undefined) return leading;
  const curve = (odds: number, point: TailPoint): void => {
    const q = 1 / (1 + odds);
    const p = odds * q;
    const ratio = betaTailRatio(a, b, p, q);
    const excess = p < q ? a - total * p : total * q - b;
    const spread = total * p * q;
    const lnTailHere = gap - deviance(total, p, q, excess) + Math.log(peak * ratio);
    writePoint(point, lnTailHere, 1 / ratio, excess, -spread, -spread * (q - p));
  };
  return rootOfTail(curve, lnTail, oddsStart(a, b, lnTail));
}

/** p from tail = p^a/(a B(a, b)), where (a + b) p is so far below 1 that nothing is missing; else undefined. */
export function leadingOdds(a: number, b: number, lnTail: number, peak: number): number | undefined {
  if (lnTail > -30 * a) return undefined;
  const share = a / (a + b);
  const odds = Math.exp((lnTail + Math.log(a) - peak) / a + Math.log(share) + (b / a) * Math.log1p(-share));
  return odds * (a + b) < 1e-17 ? odds : undefined;
}

/** A first value for `betaOdds` from the gamma quantile of the smaller parameter (L. N. Bolshev 1963, memory). */
export function oddsStart(a: number, b: number, lnTail: number): number {
  if (a <= b) {
    const mean = gammaLowerStart(a, lnTail);
    return (2 * mean) / Math.max(a + 2 * b - 1 - mean, b / 2);
  }
  const mean = gammaUpperStart(b, lnTail);
  return Math.max(b + 2 * a - 1 - mean, a / 1e3) / (2 * mean);
}
