import { decimalComplement } from '../figure/decimal-complement.ts';
import type { Guarantee } from '../plant/guarantee.ts';
import type { Fraction } from '../units.ts';
import { binomialRule } from './count-rule.ts';
import type { Evidence } from './evidence.ts';
import type { Standing } from './standing.ts';
import { UnitEvidence } from './unit-evidence.ts';

/** The running evidence that a guarantee asks for. */
export function evidenceOf(guarantee: Guarantee, standing: Standing): Evidence {
  const { promise, window } = guarantee;
  const size = window.kind === 'units' ? window.units : undefined;
  switch (promise.quantity) {
    case 'nonconforming-fraction':
      return new UnitEvidence({ size, limit: undefined, asYield: false }, binomialRule(guarantee, promise.atMost, promise.target), standing);
    case 'yield': {
      const target = decimalComplement(promise.target) as Fraction;
      return new UnitEvidence({ size, limit: undefined, asYield: true }, binomialRule(guarantee, promise.atMostNonconforming, target), standing);
    }
    default:
      standing.block('quantity', `The evidence on this quantity is not computed in this version.`);
      return new UnitEvidence({ size, limit: undefined, asYield: false }, binomialRule(guarantee, 0.5 as Fraction, 0 as Fraction), standing);
  }
}
