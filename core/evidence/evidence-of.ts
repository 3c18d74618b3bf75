import { decimalComplement } from '../figure/decimal-complement.ts';
import type { Guarantee } from '../plant/guarantee.ts';
import type { Fraction } from '../units.ts';
import { ExposureSum } from '../window/exposure-sum.ts';
import { ChainEvidence, type StationEvidence } from './chain-evidence.ts';
import { ChainRule } from './chain-rule.ts';
import { binomialRule, poissonRule, type CountRule } from './count-rule.ts';
import type { Evidence } from './evidence.ts';
import { fractionRule } from './fraction-rule.ts';
import type { HeldRecords, RecordSum } from './held-records.ts';
import { LimitEvidence } from './limit-evidence.ts';
import { LotEvidence } from './lot-evidence.ts';
import { MeanRule } from './mean-rule.ts';
import { MeasuredSum } from './measured-sum.ts';
import type { Limit } from './nonconforming-places.ts';
import { NormalRule, type BeyondLimit } from './normal-rule.ts';
import { NumberedRecords } from './numbered-records.ts';
import { RateRule } from './rate-rule.ts';
import { exposedRecords, measuredRecords } from './record-columns.ts';
import { RecordEvidence } from './record-evidence.ts';
import type { Standing } from './standing.ts';
import { stationRule } from './station-link.ts';
import { TimedRecords } from './timed-records.ts';
import { TimedUnitEvidence } from './timed-unit-evidence.ts';
import { UnitEvidence } from './unit-evidence.ts';
import type { Weighing } from './weighing.ts';
import { WholeLotsEvidence } from './whole-lots-evidence.ts';

/** The running evidence that a guarantee asks for. @param stationName how people call a station */
export function evidenceOf(guarantee: Guarantee, standing: Standing, stationName: (id: string) => string): Evidence {
  const { promise } = guarantee;
  switch (promise.quantity) {
    case 'nonconforming-fraction':
      return fractionEvidence(guarantee, fractionRule(guarantee, promise.atMost, promise.target), standing, false);
    case 'yield': {
      const target = decimalComplement(promise.target) as Fraction;
      return fractionEvidence(guarantee, fractionRule(guarantee, promise.atMostNonconforming, target), standing, true);
    }
    case 'fraction-beyond-limit':
      return beyondLimitOf(guarantee, promise, standing);
    case 'lot-fraction':
      return new LotEvidence(guarantee, { line: promise.atMost, target: promise.target }, standing);
    case 'chained-yield': {
      const { stations, tail } = guarantee;
      const stationOf = (weighing: Weighing): StationEvidence => unitsOf(guarantee, stationRule, weighing, {});
      return new ChainEvidence({ stations, stationName, tail, stationOf }, new ChainRule(guarantee, promise.atLeast, promise.target), standing);
    }
    case 'rate':
      return new RecordEvidence(exposedRecords, recordsOf(guarantee, 2, () => new ExposureSum()), new RateRule(poissonRule(guarantee, { ...promise, line: promise.atMost })), standing);
    case 'mean': {
      const held = recordsOf(guarantee, 1, () => new MeasuredSum(promise.line, promise.range));
      return new RecordEvidence(measuredRecords, held, new MeanRule(guarantee, promise), standing);
    }
  }
}

function fractionEvidence(guarantee: Guarantee, rule: CountRule, standing: Standing, asYield: boolean): Evidence {
  const { clusters, window } = guarantee;
  if (clusters?.kind !== 'lots') return unitsOf(guarantee, rule, standing, { asYield });
  return new WholeLotsEvidence({ size: window.kind === 'units' ? window.units : undefined, allowed: clusters.allowed, asYield }, rule, standing);
}

function beyondLimitOf(guarantee: Guarantee, promise: BeyondLimit, standing: Standing): Evidence {
  if (promise.model === 'normal') {
    const held = recordsOf(guarantee, 1, () => new MeasuredSum(promise.limit.value, undefined));
    return new RecordEvidence(measuredRecords, held, new NormalRule(guarantee, promise), standing);
  }
  const { limit, unit } = promise;
  const { window } = guarantee;
  const rule = binomialRule(guarantee, promise.atMost, promise.target);
  if (window.kind === 'time') return unitsOf(guarantee, rule, standing, { limit });
  return new LimitEvidence(window.kind === 'units' ? window.units : undefined, limit, unit, rule, standing);
}

function recordsOf<T, S extends RecordSum<T, S>>({ window }: Guarantee, width: 1 | 2, emptySum: () => S): HeldRecords<S> {
  if (window.kind === 'time') return new TimedRecords<T, S>(window, emptySum);
  return new NumberedRecords<T, S>(window.kind === 'units' ? window.units : undefined, width, emptySum());
}

function unitsOf({ window, clusters }: Guarantee, rule: CountRule, weighing: Weighing, { limit, asYield = false }: { limit?: Limit; asYield?: boolean }): StationEvidence {
  if (window.kind === 'time') return new TimedUnitEvidence({ span: window, limit, clustersDeclared: clusters !== undefined, asYield }, rule, weighing);
  const gap = clusters?.kind === 'events' ? clusters.gap : undefined;
  return new UnitEvidence({ size: window.kind === 'units' ? window.units : undefined, gap, clustersDeclared: clusters !== undefined, limit, asYield }, rule, weighing);
}
