import { NoConvergence } from './no-convergence.ts';

/** A tail probability at one place of its parameter, in logarithms of both. */
export interface TailPoint {
  /** ln of the tail probability */
  lnTail: number;
  /** d lnTail / d ln parameter; not 0 */
  slope: number;
  /** second derivative, likewise */
  bend: number;
}

/** Writes the tail at a positive parameter into `point`; no object is made in the loop. */
export type TailCurve = (parameter: number, point: TailPoint) => void;

const mostSteps = 200;

/**
 * The positive parameter (a mean, or odds) at which a log-concave tail has the wanted size.
 * Halley's method on ln(tail) in ln(parameter); where its correction is large only part of it is
 * taken, and a plain Newton step on a concave curve cannot miss for good.
 *
 * @param lnTail ln of the wanted tail probability; finite
 * @param start above 0, any quality
 * @throws NoConvergence when the steps do not settle
 * @source Halley's method; the remaining error of a step is of the order of the cube of the gap
 */
export function rootOfTail(curve: TailCurve, lnTail: number, start: number): number {
  const point: TailPoint = { lnTail: 0, slope: 0, bend: 0 };
  let parameter = start;
  for (let i = 0; i < mostSteps; i++) {
    curve(parameter, point);
    const gap = point.lnTail - lnTail;
    const newton = -gap / point.slope;
    const correction = 1 + (0.5 * newton * point.bend) / point.slope;
    const step = newton / (correction > 0.5 ? (correction < 4 ? correction : 4) : 0.5);
    if (!Number.isFinite(step)) break;
    parameter *= Math.exp(step > 30 ? 30 : step < -30 ? -30 : step);
    const size = Math.abs(gap);
    if (size * size * size <= 1e-15 * Math.abs(point.slope) && size < 0.01) return parameter;
  }
  throw new NoConvergence(`the parameter with ln(tail) = ${lnTail}, from ${start}`);
}
