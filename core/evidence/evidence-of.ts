import { decimalComplement } from '../figure/decimal-complement.ts';
import type { Guarantee } from '../plant/guarantee.ts';
import type { Fraction } from '../units.ts';
import { ChainEvidence, type StationEvidence } from './chain-evidence.ts';
import { ChainRule } from './chain-rule.ts';
import { binomialRule, type CountRule } from './count-rule.ts';
import type { Evidence } from './evidence.ts';
import { LotEvidence } from './lot-evidence.ts';
import type { Limit } from './nonconforming-places.ts';
import type { Standing } from './standing.ts';
import { stationRule } from './station-link.ts';
import { TimedUnitEvidence } from './timed-unit-evidence.ts';
import { UnitEvidence } from './unit-evidence.ts';
import type { Weighing } from './weighing.ts';

/** The running evidence that a guarantee asks for. */
export function evidenceOf(guarantee: Guarantee, standing: Standing): Evidence {
  const { promise } = guarantee;
  switch (promise.quantity) {
    case 'nonconforming-fraction':
      return unitsOf(guarantee, binomialRule(guarantee, promise.atMost, promise.target), standing, {});
    case 'yield': {
      const target = decimalComplement(promise.target) as Fraction;
      return unitsOf(guarantee, binomialRule(guarantee, promise.atMostNonconforming, target), standing, { asYield: true });
    }
    case 'fraction-beyond-limit':
      return unitsOf(guarantee, binomialRule(guarantee, promise.atMost, promise.target), standing, { limit: promise.limit });
    case 'lot-fraction':
      return new LotEvidence(guarantee, { line: promise.atMost, target: promise.target }, standing);
    case 'chained-yield': {
      const { stations, tail } = guarantee;
      const stationOf = (weighing: Weighing): StationEvidence => unitsOf(guarantee, stationRule, weighing, {});
      return new ChainEvidence({ stations, tail, stationOf }, new ChainRule(guarantee, promise.atLeast, promise.target), standing);
    }
    default:
      standing.block('quantity', `The evidence on this quantity is not computed in this version.`);
      return unitsOf(guarantee, stationRule, standing, {});
  }
}

function unitsOf({ window }: Guarantee, rule: CountRule, weighing: Weighing, { limit, asYield = false }: { limit?: Limit; asYield?: boolean }): StationEvidence {
  if (window.kind === 'time') return new TimedUnitEvidence({ span: window, limit, asYield }, rule, weighing);
  return new UnitEvidence({ size: window.kind === 'units' ? window.units : undefined, limit, asYield }, rule, weighing);
}
