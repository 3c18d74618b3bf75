import type { CountRule } from './count-rule.ts';

/** The figures of a window of units by name; `filled` tells a window that gathers how far it has come. */
export function countFigures(rule: CountRule, inspected: number, nonconforming: number, windowUnits?: number): Readonly<Record<string, number>> {
  const filled = inspected / rule.thresholds.sizeToDemonstrate(0);
  return { inspected, nonconforming, ...(windowUnits === undefined ? {} : { windowUnits }), ...(filled < 1 ? { filled } : {}) };
}
