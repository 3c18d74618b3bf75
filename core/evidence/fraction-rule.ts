import type { Guarantee } from '../plant/guarantee.ts';
import type { Fraction } from '../units.ts';
import { binomialRule, type CountRule } from './count-rule.ts';
import { designedRule } from './designed-rule.ts';
import { eventRule } from './event-rule.ts';
import { inspectedRule } from './inspected-rule.ts';

/**
 * The rule of a guarantee on a fraction of units, with what its limit sheet declares of inspection errors and clusters.
 * Line and target as of `binomialRule`.
 */
export function fractionRule(guarantee: Guarantee, line: Fraction, target: Fraction): CountRule {
  const { stationError, clusters } = guarantee;
  if (stationError !== undefined) return inspectedRule(guarantee, stationError, line, target);
  if (clusters?.kind === 'design-effect') return designedRule(guarantee, clusters.designEffect, line, target);
  if (clusters?.kind === 'events') return eventRule(guarantee, clusters.clusterSize, line, target);
  return binomialRule(guarantee, line, target);
}
