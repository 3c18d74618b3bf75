import type { AlarmGrounds } from '../alarm/alarm.ts';
import { groundsSentence } from '../alarm/grounds-sentence.ts';
import type { Moment } from '../evidence/moment.ts';
import { guaranteeLineOf } from '../plant/guarantee-line.ts';
import type { AlarmRule, Guarantee } from '../plant/guarantee.ts';
import { methodOfRule } from '../run/method-of-rule.ts';
import type { RecordRange } from '../window/record-identity.ts';

/** What was known when an alarm was raised, as its watch has it. */
export interface Known {
  readonly figures: Readonly<Record<string, number>>;
  readonly ranges: readonly RecordRange[];
  readonly plantVersion: () => string;
  readonly sourceName: (index: number) => string;
}

/** What an alarm keeps so that it can be recomputed from the stored records. */
export function groundsOf(guarantee: Guarantee, rule: AlarmRule['kind'], moment: Moment, known: Known): AlarmGrounds {
  const { promise, tail } = guarantee;
  const { line, side } = guaranteeLineOf(promise);
  const { name, version, lookRule } = methodOfRule(guarantee, rule);
  return {
    source: moment.source,
    sequence: moment.sequence,
    plantVersion: known.plantVersion(),
    method: name,
    methodVersion: version,
    lookRule,
    figures: { ...known.figures, line, tail },
    records: known.ranges.map(({ source, first, last }) => ({ source: known.sourceName(source), first, last })),
    sentence: groundsSentence(rule, promise.quantity, side, known.figures),
  };
}
