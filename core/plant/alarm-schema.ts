import * as v from 'valibot';
import {
  betweenFalseCallsSchema,
  confidenceSchema,
  countSchema,
  responseSchema,
  returnDistanceSchema,
  returnUnitsSchema,
  spanSchema,
} from './figure-schemas.ts';
import { choice, isMapping, record, word } from './schema-parts.ts';

const off = word(['off']);
const urgency = { priority: v.optional(word(['high', 'medium', 'low'])), response: v.optional(responseSchema) };
const returning = v.optional(record({ distance: v.optional(returnDistanceSchema), units: v.optional(returnUnitsSchema) }));

const crossing = record({ ...urgency, return: returning });
const violation = record({ ...urgency, confidence: v.optional(confidenceSchema), return: returning });
const deterioration = record({
  ...urgency,
  'units-between-false-calls': v.optional(betweenFalseCallsSchema),
  baseline: v.optional(word(['line', 'normal-rate'])),
  detector: v.optional(word(['mixture', 'cusum'])),
});
const silence = record({ ...urgency, after: v.optional(spanSchema) });
const badData = record({ ...urgency, 'more-than': v.optional(countSchema), within: v.optional(spanSchema) });

/** An alarm rule is 'off' or its settings; each setting left out has its default. */
function offOr<Settings extends v.GenericSchema>(settings: Settings): v.OptionalSchema<v.GenericSchema<v.InferInput<Settings> | 'off', v.InferOutput<Settings> | 'off'>, undefined> {
  const either = choice([off, settings], (value) => (isMapping(value) ? settings : off), 'off, or a mapping with the settings of the rule');
  return v.optional(either as v.GenericSchema<v.InferInput<Settings> | 'off', v.InferOutput<Settings> | 'off'>);
}

/** The alarm rules of a guarantee as the plant file writes them. */
export const alarmsSchema = record({
  crossing: offOr(crossing),
  violation: offOr(violation),
  deterioration: offOr(deterioration),
  silence: offOr(silence),
  'bad-data': offOr(badData),
});

export type AlarmsFile = v.InferOutput<typeof alarmsSchema>;
