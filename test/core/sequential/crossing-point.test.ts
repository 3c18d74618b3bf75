import { describe, expect, it } from 'vitest';
import { crossingPoint } from '../../../core/sequential/crossing-point.ts';

describe('where a rising curve crosses zero', () => {
  it.each([-300, -3, 0, 0.4, 2, 90])('is found from %d, on either side', (start) => {
    expect(crossingPoint((x) => x ** 3 - 2, start)).toBeCloseTo(Math.cbrt(2), 14);
    expect(crossingPoint((x) => Math.atan(x - 7), start)).toBeCloseTo(7, 13);
    expect(crossingPoint((x) => (x < 1 ? -1 : 1), start)).toBeCloseTo(1, 14);
  });

  it('is found in few steps on a smooth curve', () => {
    let steps = 0;
    crossingPoint((x) => {
      steps += 1;
      return Math.exp(x) - 5;
    }, 0);
    expect(steps).toBeLessThan(16);
  });

  it('is no answer where there is none', () => {
    expect(() => crossingPoint(() => -1, 0)).toThrow('no convergence');
    expect(() => crossingPoint(() => 1, 0)).toThrow('no convergence');
    expect(() => crossingPoint(() => NaN, 0)).toThrow('no convergence');
    expect(() => crossingPoint((x) => (x > 3 ? NaN : -1), 0)).toThrow('no convergence');
    expect(() => crossingPoint((x) => (x <= 0 ? -1 : x >= 0.5 ? 1 : NaN), 0)).toThrow('no convergence');
  });
});
