import { describe, expect, it } from 'vitest';
import { devianceTerm, stirlingError } from '../../../core/numerics/stirling.ts';

// Both tables: own computation in 40-digit arithmetic (mpmath).
const errors: readonly (readonly [number, number])[] = [
  [0.01, 1.4340079537031842], [0.3, 0.23606490074821558], [0.5, 0.15342640972002735], [1, 0.081061466795327258],
  [1.7, 0.048499868113656918], [7.25, 0.011487002684428697], [15.9, 0.0052403998807561083],
  [16, 0.0052076559196096404], [16.5, 0.005049887331583002], [1e6, 8.3333333333330556e-8], [1e15, 8.3333333333333333e-17],
];
const deviances: readonly (readonly [number, number])[] = [
  [1e-9, 4.999999998333334e-19], [-1e-5, 5.0000166667500013e-11], [0.1, 0.0048411977847573466],
  [0.249, 0.028706695698157339], [0.251, 0.029152982587452384], [-0.199, 0.02126264013706396],
  [-0.201, 0.021708927760525957], [3, 2.5451774444795625], [-0.999, 0.99209224472101786], [-1, 1], [0, 0],
  [1e6, 12815525.373475332],
];

describe('the Stirling error', () => {
  it.each(errors)('at %d is %d', (z, expected) => {
    expect(Math.abs(stirlingError(z) - expected)).toBeLessThan(1e-15);
  });

  it('gives the factorials up to 20', () => {
    let factorial = 1;
    for (let n = 1; n <= 20; n++) {
      factorial *= n;
      const stirling = Math.sqrt(2 * Math.PI * n) * (n / Math.E) ** n * Math.exp(stirlingError(n));
      expect(Math.abs(stirling / factorial - 1)).toBeLessThan(1e-14);
    }
  });
});

describe('the deviance term', () => {
  it.each(deviances)('at %d is %d', (t, expected) => {
    expect(Math.abs(devianceTerm(t) - expected)).toBeLessThanOrEqual(4e-15 * expected);
  });
});
