import { gaussNodes, gaussWeights } from './gauss-legendre.ts';
import { NoConvergence } from './no-convergence.ts';

/**
 * Lower tail of a beta distribution over its density in ln(p/q): I_p(a, b) B(a, b) / (p^a q^b).
 * With whole b it is a finite sum of binomial chances; large parameters are integrated, where the
 * integrand is nearly Gaussian; the rest goes by continued fraction. All are meant for the tail
 * that is the smaller one; on the other side they still hold but take longer.
 *
 * @param a above 0
 * @param b above 0
 * @param p above 0, below 1
 * @param q its complement 1 - p, carried along because neither can be had from the other when small
 * @returns above 0; relative error about 1e-14
 * @source DLMF 8.17.12 (sum), 8.17.22 (continued fraction); integral: own derivation with t = odds e^-u
 */
export function betaTailRatio(a: number, b: number, p: number, q: number): number {
  const least = a < b ? a : b;
  if (Number.isInteger(b)) return least < 5000 ? sumDownwards(a, b, p, q) : integrated(a, b, p, q);
  return least < 200 ? continued(a, b, p, q) : integrated(a, b, p, q);
}

function sumDownwards(a: number, b: number, p: number, q: number): number {
  const odds = p / q;
  let term = 1;
  let sum = 1;
  for (let above = a + 1, left = b - 1; left > 0; above += 1, left -= 1) {
    term *= (left * odds) / above;
    sum += term;
    if (term < 1e-17 * sum && left * odds < above) break;
  }
  return sum / (a * q);
}

function integrated(a: number, b: number, p: number, q: number): number {
  const total = a + b;
  const slope = p < q ? a - total * p : total * q - b;
  const reach = 80 / (slope + Math.sqrt(slope * slope + 80 * total * p * q));
  if (reach < 0.1) return nearlyGaussian(total, slope, p, q, reach);
  let sum = 0;
  for (let i = 0; i < gaussNodes.length; i++) {
    const u = reach * (gaussNodes[i] ?? 0);
    const exponent = p < q
      ? a * u + total * Math.log1p(p * Math.expm1(-u))
      : total * Math.log1p(q * Math.expm1(u)) - b * u;
    sum += (gaussWeights[i] ?? 0) * Math.exp(-exponent);
  }
  return sum * reach;
}

/** The even part of the continued fraction, in which the small difference of a and (a + b) p stands alone. */
/**
 * The same integral where u stays below 0.1: ln(q + p e^-u) as its series in u, whose coefficients are
 * the cumulants of a single verdict over factorials. What is left out is below 1e-14 of the exponent.
 */
function nearlyGaussian(total: number, slope: number, p: number, q: number, reach: number): number {
  const v = p * q;
  const scale = total * v;
  const skew = scale * (q - p);
  const c2 = scale / 2;
  const c3 = -skew / 6;
  const c4 = (scale / 24) * (1 - 6 * v);
  const c5 = (-skew / 120) * (1 - 12 * v);
  const c6 = (scale / 720) * (1 - v * (30 - 120 * v));
  const c7 = (-skew / 5040) * (1 - v * (60 - 360 * v));
  const c8 = (scale / 40_320) * (1 - v * (126 - v * (1680 - 5040 * v)));
  const c9 = (-skew / 362_880) * (1 - v * (252 - v * (5040 - 20_160 * v)));
  const c10 = (scale / 3_628_800) * (1 - v * (510 - v * (17_640 - v * (151_200 - 362_880 * v))));
  let sum = 0;
  for (let i = 0; i < gaussNodes.length; i++) {
    const u = reach * (gaussNodes[i] ?? 0);
    const high = c6 + u * (c7 + u * (c8 + u * (c9 + u * c10)));
    sum += (gaussWeights[i] ?? 0) * Math.exp(-u * (slope + u * (c2 + u * (c3 + u * (c4 + u * (c5 + u * high))))));
  }
  return sum * reach;
}

function continued(a: number, b: number, p: number, q: number): number {
  const slope = a * q - b * p;
  let c = (1 + slope) / (a + 1);
  let d = 0;
  let value = c;
  for (let m = 1; m < 20_000; m++) {
    const middle = a + 2 * m;
    const pull = (m * (b - m) * p) / (middle - 1);
    const top = (((a + m - 1) / (middle - 2)) * ((a + b + m - 1) / (middle - 1)) * pull * p) / middle;
    const own = (a + (a * m * (2 + q) + m * (2 + m * (3 + q))) + (a + m) * slope) / (middle * (middle + 1));
    const bottom = own + pull / middle;
    d = 1 / (bottom + top * d);
    c = bottom + top / c;
    const factor = c * d;
    value *= factor;
    if (Math.abs(factor - 1) < 4e-16) return 1 / (a * value);
  }
  throw new NoConvergence(`beta tail at a = ${a}, b = ${b}, p = ${p}, q = ${q}`);
}
