import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { tQuantileOfTail, tTail } from '../../../core/numerics/student-t.ts';

const relative = (got: number, wanted: number): number => Math.abs(got / wanted - 1);

/** t, degrees of freedom, upper tail; mpmath 1.3, 50 digits: half the regularized incomplete beta function. */
const tails: readonly (readonly [number, number, number])[] = [
  [24.268861339181004, 2, 0.0008467727358660374],
  [24.110083294588048, 3, 7.819185737881123e-05],
  [34574.07349852549, 1, 9.20660639275276e-06],
  [5.207662612951706, 5, 0.001722507890052886],
  [27.19780949692683, 674.8052176485243, 7.484745413447404e-111],
  [281.88347013333754, 4.256977437651076, 1.479714978178341e-10],
  [23.189521710137537, 3, 8.78345955278665e-05],
  [4514.912907025343, 103.99088349348987, 2.603734128156648e-277],
  [0.7842798517674207, 2, 0.2575080439654009],
  [22.631093529394864, 5, 1.5656821241030105e-06],
  [2.2782272107572794, 3.203487801721152, 0.050746003611793565],
  [2.7558901016670063, 1, 0.11079870811731542],
  [0.7941579221934195, 1, 0.2863604202733367],
  [2.2198399911621016, 17.121525448652054, 0.020107225806530127],
];

describe('Student t', () => {
  it.each(tails)('tail beyond %d with %d degrees of freedom, and back', (t, df, tail) => {
    expect(relative(tTail(t, df), tail)).toBeLessThan(1e-13);
    expect(relative(tQuantileOfTail(tail, df), t)).toBeLessThan(1e-14);
    expect(tTail(-t, df)).toBe(1 - tTail(t, df));
  });

  it('closed forms: one degree of freedom is an arc tangent, two a square root', () => {
    // Cauchy: tail = 1/2 - atan(t)/pi, t = cot(pi tail); two degrees: t = (1 - 2a) / sqrt(2a(1 - a))
    for (const tail of [0.4999, 0.3, 0.1, 0.01, 1e-6]) {
      expect(relative(tQuantileOfTail(tail, 1), 1 / Math.tan(Math.PI * tail))).toBeLessThan(2e-12);
      expect(relative(tQuantileOfTail(tail, 2), (1 - 2 * tail) / Math.sqrt(2 * tail * (1 - tail)))).toBeLessThan(2e-12);
    }
    expect(relative(tQuantileOfTail(1e-300, 1), 1e300 / Math.PI)).toBeLessThan(1e-13);
  });

  it('is the same function read from either side, over the whole range', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -700, max: -0.7, noNaN: true }),
        fc.double({ min: 0, max: Math.log(1e12), noNaN: true }),
        (logTail, logDf) => {
          const [tail, df] = [Math.exp(logTail), Math.min(1e12, Math.max(1, Math.exp(logDf)))];
          const t = tQuantileOfTail(tail, df);
          expect(t).toBeGreaterThan(0);
          if (t < 1e300) expect(relative(tTail(t, df), tail)).toBeLessThan(1e-12 * (1 - logTail));
          expect(tQuantileOfTail(tail * 0.999, df)).toBeGreaterThan(t);
          expect(tQuantileOfTail(tail, Math.min(1e12, df * 1.001))).toBeLessThanOrEqual(t * (1 + 1e-14));
        },
      ),
      { seed: 11, numRuns: 2000 },
    );
  });

  it('answers the ends and refuses what is outside its range', () => {
    expect(tQuantileOfTail(0.5, 3)).toBe(0);
    expect(tQuantileOfTail(5e-324, 1)).toBe(Infinity);
    expect(tTail(Infinity, 3)).toBe(0);
    expect(tTail(-Infinity, 3)).toBe(1);
    for (const [tail, df] of [[0, 3], [1, 3], [NaN, 3], [0.1, 0.5], [0.1, 2e12], [0.1, NaN]] as const) {
      expect(tQuantileOfTail(tail, df)).toBeNaN();
    }
    for (const [t, df] of [[NaN, 3], [1, 0.9], [1, 2e12], [1, NaN]] as const) expect(tTail(t, df)).toBeNaN();
  });
});
