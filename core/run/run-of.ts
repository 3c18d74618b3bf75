import { decimalComplement } from '../figure/decimal-complement.ts';
import type { Guarantee } from '../plant/guarantee.ts';
import { ExposureRun } from './exposure-run.ts';
import { fractionRunRule } from './fraction-run-rule.ts';
import { lotRunRule } from './lot-run-rule.ts';
import { MeanRun } from './mean-run.ts';
import { rateRunRule } from './rate-run-rule.ts';
import type { RunEvidence } from './run-evidence.ts';
import { UnitRun } from './unit-run.ts';

/** The evidence of a guarantee's run at all looks; undefined where none is known: for a chain of stations, the normal model, declared inspection errors and clusters. */
export function runOf(guarantee: Guarantee): RunEvidence | undefined {
  const { promise } = guarantee;
  if (guarantee.stationError !== undefined || guarantee.clusters !== undefined) return undefined;
  switch (promise.quantity) {
    case 'nonconforming-fraction':
      return new UnitRun(fractionRunRule(guarantee, promise.atMost, promise.target), { limit: undefined, asYield: false });
    case 'yield':
      return new UnitRun(fractionRunRule(guarantee, promise.atMostNonconforming, decimalComplement(promise.target)), { limit: undefined, asYield: true });
    case 'fraction-beyond-limit':
      if (promise.model === 'normal') return undefined;
      return new UnitRun(fractionRunRule(guarantee, promise.atMost, promise.target), { limit: promise.limit, asYield: false });
    case 'lot-fraction': {
      const ruleOfLot = (size: number): ReturnType<typeof lotRunRule> => lotRunRule(guarantee, promise.atMost, promise.target, size);
      return new UnitRun(ruleOfLot(1), { limit: undefined, asYield: false, ruleOfLot });
    }
    case 'rate':
      return new ExposureRun(rateRunRule(guarantee, { ...promise, line: promise.atMost }));
    case 'mean':
      return new MeanRun(guarantee, promise);
    case 'chained-yield':
      return undefined;
  }
}
