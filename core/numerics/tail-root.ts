import { NoConvergence } from './no-convergence.ts';

/** ln of a tail probability at one place of its parameter, and its derivatives in ln(parameter). */
export interface TailPoint {
  lnTail: number;
  /** first derivative; not 0 */
  slope: number;
  second: number;
  third: number;
  fourth: number;
}

/** Writes the tail at a positive parameter into `point`; no object is made in the loop. */
export type TailCurve = (parameter: number, point: TailPoint) => void;

/**
 * Fills a point from the tail, its slope (the density over the tail, signed) and the first three
 * derivatives of ln(density): all further derivatives of ln(tail) follow from these.
 */
export function writePoint(point: TailPoint, lnTail: number, slope: number, d1: number, d2: number, d3: number): void {
  const drift = d1 - slope;
  const second = slope * drift;
  const third = second * drift + slope * (d2 - second);
  point.lnTail = lnTail;
  point.slope = slope;
  point.second = second;
  point.third = third;
  point.fourth = third * drift + 2 * second * (d2 - second) + slope * (d3 - third);
}

const mostSteps = 200;

/**
 * The positive parameter (a mean, or odds) at which a log-concave tail has the wanted size.
 * Near the answer one step of the inverse series of order five is enough; far from it Halley's step
 * is taken, of whose correction only part is trusted: a plain Newton step on a concave curve cannot
 * miss for good.
 *
 * @param lnTail ln of the wanted tail probability; finite
 * @param start above 0, any quality
 * @throws NoConvergence when the steps do not settle
 * @source reversion of series (DLMF 3.3(v), 1.9(vi)); measured: a step leaves at most
 *   0.32 gap^5/(slope lnTail^4) of the parameter
 */
export function rootOfTail(curve: TailCurve, lnTail: number, start: number): number {
  const point: TailPoint = { lnTail: 0, slope: 0, second: 0, third: 0, fourth: 0 };
  const finest = 6e-15 * (lnTail * lnTail) * (lnTail * lnTail);
  let parameter = start;
  for (let i = 0; i < mostSteps; i++) {
    curve(parameter, point);
    const gap = point.lnTail - lnTail;
    const newton = -gap / point.slope;
    const bent = (0.5 * newton * point.second) / point.slope;
    const near = Math.abs(bent) < 0.1;
    const step = near ? reverted(newton, bent, point) : newton / (bent > -0.5 ? (bent < 3 ? 1 + bent : 4) : 0.5);
    if (!Number.isFinite(step)) break;
    parameter *= growthOf(step);
    const size = Math.abs(gap);
    if (near && size * (gap * gap) * (gap * gap) <= finest * Math.abs(point.slope)) return parameter;
  }
  throw new NoConvergence(`the parameter with ln(tail) = ${lnTail}, from ${start}`);
}

/** e^step, at most e^30 either way; the few terms that a small step needs. */
function growthOf(step: number): number {
  if (step < 3e-3 && step > -3e-3) return 1 + step * (1 + (step / 2) * (1 + (step / 3) * (1 + (step / 4) * (1 + step / 5))));
  return Math.exp(step > 30 ? 30 : step < -30 ? -30 : step);
}

function reverted(newton: number, bent: number, point: TailPoint): number {
  const third = ((newton * newton) / 6) * (point.third / point.slope);
  const fourth = ((newton * newton * newton) / 24) * (point.fourth / point.slope);
  return newton * (1 - bent + 2 * bent * bent - third + 5 * bent * (third - bent * bent) - fourth);
}
