import { gaussNodes, gaussWeights } from './gauss-legendre.ts';
import { NoConvergence } from './no-convergence.ts';
import { devianceTerm, stirlingError } from './stirling.ts';

/** From this shape on the integrand is so nearly Gaussian that 20 nodes carry all digits. */
const large = 5000;
/** The same for shapes that are not whole, where the sum does not end. */
const largeBetween = 200;

/** ln of the gamma density in ln(mean): ln(mean^a e^-mean / Gamma(a)), saddle-point form; a and mean above 0. */
export function lnGammaDensity(a: number, mean: number): number {
  return 0.5 * Math.log(a / (2 * Math.PI)) - stirlingError(a) - mean * devianceTerm((a - mean) / mean);
}

/**
 * Upper tail of a gamma distribution over its density in ln(mean): Gamma(a, mean) e^mean / mean^a.
 * For whole a it is P(X < a) of a Poisson count over that density.
 *
 * @param a shape, above 0
 * @param mean above 0; meant for means on the far side of a, where the tail is the smaller one
 * @returns above 0; relative error about 1e-14
 * @source DLMF 8.4.10 (sum), 8.9.2 (continued fraction); integral: own derivation
 */
export function gammaUpperRatio(a: number, mean: number): number {
  if (Number.isInteger(a)) return a < large ? sumDownwards(a, mean) : integrated(a, mean, 1);
  return a < largeBetween ? continued(a, mean) : integrated(a, mean, 1);
}

/**
 * Lower tail of a gamma distribution over its density in ln(mean); for whole a it is P(X >= a) of a
 * Poisson count over that density. Ranges as of `gammaUpperRatio`, meant for means below a.
 *
 * @source DLMF 8.7.1 (series); integral: own derivation
 */
export function gammaLowerRatio(a: number, mean: number): number {
  if (a >= large) return integrated(a, mean, -1);
  let term = 1;
  let sum = 1;
  for (let above = a + 1; term > 1e-17 * sum || above < mean; above += 1) {
    term *= mean / above;
    sum += term;
  }
  return sum / a;
}

/**
 * P(G > mean) of a gamma distribution of shape a; for a chi-square value c with f degrees of freedom
 * take a = f/2 and mean = c/2.
 *
 * @param a above 0
 * @param mean 0 or more
 */
export function gammaUpperTail(a: number, mean: number): number {
  if (mean === 0) return 1;
  const density = Math.exp(lnGammaDensity(a, mean));
  return mean < a ? 1 - density * gammaLowerRatio(a, mean) : density * gammaUpperRatio(a, mean);
}

function sumDownwards(a: number, mean: number): number {
  let term = 1;
  let sum = 1;
  for (let left = a - 1; left > 0; left -= 1) {
    term *= left / mean;
    sum += term;
    if (term < 1e-17 * sum && left < mean) break;
  }
  return sum / mean;
}

function integrated(a: number, mean: number, side: 1 | -1): number {
  const slope = side * (mean - a);
  const reach = 80 / (slope + Math.sqrt(slope * slope + 80 * mean));
  let sum = 0;
  for (let i = 0; i < gaussNodes.length; i++) {
    const u = side * reach * (gaussNodes[i] ?? 0);
    sum += (gaussWeights[i] ?? 0) * Math.exp(a * u - mean * Math.expm1(u));
  }
  return sum * reach;
}

function continued(a: number, mean: number): number {
  let b = mean + 1 - a;
  let c = Infinity;
  let d = 1 / b;
  let value = d;
  for (let i = 1; i < 20_000; i++) {
    const top = -i * (i - a);
    b += 2;
    d = 1 / (top * d + b);
    c = b + top / c;
    const factor = c * d;
    value *= factor;
    if (Math.abs(factor - 1) < 4e-16) return value;
  }
  throw new NoConvergence(`gamma tail at shape ${a}, mean ${mean}`);
}
