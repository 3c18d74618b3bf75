import { NoConvergence } from '../numerics/no-convergence.ts';

/** Farthest place looked at on either side of the start; far beyond any logarithm of odds. */
const farthest = 1e6;

/**
 * Where a curve that rises through zero crosses it: walks from `start` in growing steps to the far
 * side, then closes in by inverse quadratic steps guarded by halving.
 *
 * @param curve continuous; below 0 far on the left of the crossing, 0 or more on its right
 * @param start any finite place, the nearer the fewer steps
 * @returns the crossing, to within two units in the last place (absolute 1e-15 near 0)
 * @throws NoConvergence where there is no crossing within 1e6 of the start, or the curve is NaN
 * @source T. R. Chandrupatla, Adv. Eng. Software 28 (1997) (from memory)
 */
export function crossingPoint(curve: (place: number) => number, start: number): number {
  let near = start;
  let atNear = curve(near);
  const direction = atNear < 0 ? 1 : -1;
  for (let step = 0.5; step < farthest; step *= 2) {
    const far = near + direction * step;
    const atFar = curve(far);
    if (Number.isNaN(atFar)) break;
    if (atFar >= 0 === direction > 0) return closeIn(curve, far, atFar, near, atNear);
    near = far;
    atNear = atFar;
  }
  throw new NoConvergence(`a crossing from ${start}`);
}

function closeIn(curve: (place: number) => number, first: number, atFirst: number, second: number, atSecond: number): number {
  let [a, fa, b, fb] = [first, atFirst, second, atSecond];
  let share = 0.5;
  for (let round = 0; round < 200; round++) {
    const x = a + share * (b - a);
    const fx = curve(x);
    if (Number.isNaN(fx)) break;
    const same = fx >= 0 === fa >= 0;
    const [c, fc] = same ? [a, fa] : [b, fb];
    if (!same) [b, fb] = [a, fa];
    [a, fa] = [x, fx];
    const best = Math.abs(fa) < Math.abs(fb) ? a : b;
    const least = (4e-16 * Math.abs(best) + 1e-15) / Math.abs(b - a);
    if (fx === 0 || least > 0.5) return best;
    share = Math.min(1 - least, Math.max(least, shareOf(a, fa, b, fb, c, fc)));
  }
  throw new NoConvergence(`a crossing between ${first} and ${second}`);
}

/** Next place as a share of the way from a to b: inverse quadratic where it can be trusted, else the middle. */
function shareOf(a: number, fa: number, b: number, fb: number, c: number, fc: number): number {
  const xi = (a - b) / (c - b);
  const phi = (fa - fb) / (fc - fb);
  if (!(phi * phi < xi && (1 - phi) * (1 - phi) < 1 - xi)) return 0.5;
  return (fa / (fb - fa)) * (fc / (fb - fc)) + ((c - a) / (b - a)) * (fa / (fc - fa)) * (fb / (fc - fb));
}
