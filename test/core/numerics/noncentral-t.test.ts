import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { NoConvergence } from '../../../core/numerics/no-convergence.ts';
import { noncentralityOfTail, noncentralTQuantileOfTail } from '../../../core/numerics/noncentral-t-root.ts';
import { noncentralTUpper } from '../../../core/numerics/noncentral-t.ts';
import { logNormalCdf } from '../../../core/numerics/normal.ts';
import { tTail } from '../../../core/numerics/student-t.ts';

/** t, degrees of freedom, noncentrality, ln P(T > t); mpmath 1.3, 40 digits, trapezoid sum with a quarter of the step. */
const points: readonly (readonly [number, number, number, number])[] = [
  [0.6, 3, 0.332313616334338, -0.8786392744284268],
  [-14.142135623730951, 199, -17.206561102933854, -5.1000502665243275],
  [44.721359549995796, 19, 41.05968032635508, -1.064109674312378],
  [14.142135623730951, 199, 14.264712642899067, -0.6047418166767942],
  [0.0, 999, 1.0, -0.17275377902344988],
  [4.47213595499958, 4, 3.5367216083060944, -0.9897534831245681],
  [189.73665961010275, 999, 188.4283700314461, -0.948169012047317],
  [18.973665961010276, 9, 18.057150822019107, -0.7324871377217661],
  [13.416407864998739, 19, 6.230896126272788, -7.107236717916634],
  [-2.449489742783178, 5, -4.979311870917881, -3.959776804286883],
  [208.9119312442323, 999, 218.47099844758367, -0.022970232067298063],
  [28.284271247461902, 199, 24.814371968660698, -3.7691899816684376],
  [14.142135623730951, 1, 24.19201124485184, -0.09204804514000398],
  [-2.8284271247461903, 7, -3.079140392957394, -0.9524087242304974],
  [8.485281374238571, 7, 3.5283237819821505, -3.8730878957599866],
  [0.0, 1, 2.0, -0.02301290932896349],
  [5.656854249492381, 7, 7.469508183842312, -0.14193667233547314],
  [0.7348469228349533, 5, 0.426853416409899, -0.9276804964397342],
  [18.973665961010276, 9, 23.556241655966115, -0.1418463854136221],
  [2.8284271247461903, 7, 2.5777138565349866, -0.786280535902144],
  [7.1806245720728805, 4, 0.08630592881523302, -6.7345380026076995],
  [948.6832980505139, 99999, 949.8559067875241, -0.3683265531143978],
  [9.486832980505138, 9, 8.996935031948503, -0.7446630157044867],
  [-1.4142135623730951, 1, -3.252691193458119, -2.8083296267428604],
];

describe('noncentral t', () => {
  it.each(points)('ln P(T > %d), %d degrees of freedom, noncentrality %d', (t, df, noncentrality, logTail) => {
    expect(Math.abs(noncentralTUpper(t, df, noncentrality).logTail - logTail)).toBeLessThan(1e-13 + 1e-15 * Math.abs(noncentrality * t) / df);
  });

  it('is Student t without noncentrality, and the normal distribution at t = 0', () => {
    for (const df of [1, 2, 3, 7, 29, 1000, 1e6]) {
      for (const t of [-2, 0.3, 1, 4]) {
        expect(Math.abs(noncentralTUpper(t, df, 0).logTail - Math.log(tTail(t, df)))).toBeLessThan(2e-13);
      }
      expect(Math.abs(noncentralTUpper(0, df, -1.5).logTail - logNormalCdf(-1.5))).toBeLessThan(1e-13);
    }
  });

  it('the thin-layer form meets the other one where they change over', () => {
    for (const df of [2, 5, 30, 1000]) {
      const edge = Math.sqrt(200 * df);
      for (const share of [0.5, 0.9, 1]) {
        const below = noncentralTUpper(edge * (1 - 1e-13), df, edge * share + 40);
        const beyond = noncentralTUpper(edge * (1 + 1e-13), df, edge * share + 40);
        expect(Math.abs(below.logTail - beyond.logTail)).toBeLessThan(1e-13 + 4e-13 * Math.abs(edge * beyond.byT));
        expect(Math.abs(below.byNoncentrality / beyond.byNoncentrality - 1)).toBeLessThan(1e-9);
        expect(Math.abs(below.byT / beyond.byT - 1)).toBeLessThan(1e-9);
      }
    }
  });

  it('slopes are those of the function', () => {
    for (const [t, df, d] of [[3, 4, 1], [20, 19, 15], [-5, 9, -8], [2, 1, 0.5], [3000, 9, 2500]] as const) {
      const at = noncentralTUpper(t, df, d);
      const step = 1e-4;
      const byD = (noncentralTUpper(t, df, d + step).logTail - noncentralTUpper(t, df, d - step).logTail) / (2 * step);
      const byT = (noncentralTUpper(t + step, df, d).logTail - noncentralTUpper(t - step, df, d).logTail) / (2 * step);
      expect(Math.abs(at.byNoncentrality - byD)).toBeLessThan(1e-6);
      expect(Math.abs(at.byT - byT)).toBeLessThan(1e-6);
      const byDTwice = noncentralTUpper(t, df, d + step).byNoncentrality - noncentralTUpper(t, df, d - step).byNoncentrality;
      expect(Math.abs(at.twiceByNoncentrality - at.byNoncentrality ** 2 - byDTwice / (2 * step))).toBeLessThan(1e-5);
      const byTTwice = noncentralTUpper(t + step, df, d).byT - noncentralTUpper(t - step, df, d).byT;
      expect(Math.abs(at.twiceByT - at.byT ** 2 - byTTwice / (2 * step))).toBeLessThan(1e-5);
    }
  });

  const tail = fc.oneof(
    fc.double({ min: 1e-6, max: 1 - 1e-6, noNaN: true }),
    fc.double({ min: -200, max: -14, noNaN: true }).map(Math.exp),
  );
  const df = fc.oneof(fc.integer({ min: 1, max: 60 }), fc.double({ min: 0, max: 20, noNaN: true }).map((x) => Math.ceil(Math.exp(x))));

  it('solved for the noncentrality it gives the tail again', () => {
    fc.assert(
      fc.property(tail, df, fc.double({ min: -8, max: 8, noNaN: true }), fc.constantFrom(1, 100, 1e5), (p, v, k, scale) => {
        const t = k * scale * Math.sqrt(v + 1);
        const d = noncentralityOfTail(p, v, t);
        const at = p > 0.5 ? noncentralTUpper(-t, v, -d) : noncentralTUpper(t, v, d);
        const noise = 4e-15 * (Math.abs(at.byNoncentrality * d) + Math.abs(at.byT * t));
        expect(Math.abs(at.logTail - Math.log(p > 0.5 ? 1 - p : p))).toBeLessThan(5e-12 + noise);
      }),
      { seed: 12, numRuns: 3000 },
    );
  });

  it('solved for t it gives the tail again, or says that it does not converge', () => {
    fc.assert(
      fc.property(tail, df, fc.double({ min: -6, max: 6, noNaN: true }), (p, v, z) => {
        const d = z * Math.sqrt(v + 1);
        const t = noncentralTQuantileOfTail(p, v, d);
        const at = p > 0.5 ? noncentralTUpper(-t, v, -d) : noncentralTUpper(t, v, d);
        const noise = 4e-15 * (Math.abs(at.byNoncentrality * d) + Math.abs(at.byT * t));
        expect(Math.abs(at.logTail - Math.log(p > 0.5 ? 1 - p : p))).toBeLessThan(5e-12 + noise);
      }),
      { seed: 13, numRuns: 2000 },
    );
    for (const p of [1e-300, 5e-324]) {
      try {
        expect(noncentralTQuantileOfTail(p, 500, -60)).not.toBeNaN();
      } catch (cause) {
        expect(cause).toBeInstanceOf(NoConvergence);
      }
    }
  });
});
