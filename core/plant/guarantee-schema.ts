import * as v from 'valibot';
import { alarmsSchema } from './alarm-schema.ts';
import {
  amountSchema,
  confidenceSchema,
  flagSchema,
  idSchema,
  measureSchema,
  nameSchema,
  perShiftSchema,
  shareSchema,
  sourceSchema,
  spanSchema,
  weightSchema,
  windowUnitsSchema,
} from './figure-schemas.ts';
import { clustersSchema, stationErrorSchema } from './remedy-schemas.ts';
import { choice, isMapping, record, word } from './schema-parts.ts';

const windowWord = word(['lot', 'shift', 'run']);
const windowUnits = record({ units: windowUnitsSchema });
const windowTime = record({ time: spanSchema, step: v.optional(spanSchema) });
const windowSchema = choice(
  [windowWord, windowUnits, windowTime],
  (value) => (!isMapping(value) ? windowWord : 'time' in value || 'step' in value ? windowTime : windowUnits),
  'a window: units: 20000, time: 8 h (with its step), lot, shift or run',
);

const settings = {
  id: idSchema,
  name: v.optional(nameSchema),
  product: v.optional(idSchema),
  confidence: v.optional(confidenceSchema),
  window: v.optional(windowSchema),
  looks: v.optional(word(['one', 'all', 'both'])),
  'safety-relevant': v.optional(flagSchema),
  'units-per-shift': v.optional(perShiftSchema),
  weight: v.optional(weightSchema),
  alarms: v.optional(alarmsSchema),
};
const place = { station: idSchema, characteristic: idSchema };
const share = { target: v.optional(shareSchema), 'normal-rate': v.optional(shareSchema) };
const quantity = <const Name extends string>(name: Name): v.LiteralSchema<Name, undefined> => v.literal(name);

const remedies = { 'inspection-error': v.optional(stationErrorSchema), clusters: v.optional(clustersSchema) };

const nonconformingFraction = record({
  quantity: quantity('nonconforming-fraction'), ...settings, ...place, ...share, ...remedies, 'at-most': shareSchema,
});
const yieldOf = record({ quantity: quantity('yield'), ...settings, ...place, ...share, ...remedies, 'at-least': shareSchema });
const rate = record({
  quantity: quantity('rate'), ...settings, ...place,
  'at-most': amountSchema, target: v.optional(amountSchema), 'normal-rate': v.optional(amountSchema),
});
const mean = record({
  quantity: quantity('mean'), ...settings, ...place,
  'at-most': v.optional(measureSchema), 'at-least': v.optional(measureSchema),
  target: measureSchema, 'normal-rate': v.optional(measureSchema),
  sigma: v.optional(record({ value: measureSchema, source: sourceSchema })),
  range: v.optional(record({ from: measureSchema, to: measureSchema })),
});
const fractionBeyondLimit = record({
  quantity: quantity('fraction-beyond-limit'), ...settings, ...place, ...share, 'at-most': shareSchema,
  'specification-limit': v.pipe(
    record({ below: v.optional(measureSchema), above: v.optional(measureSchema) }),
    v.description('a specification limit: below: 400 or above: 900'),
  ),
  model: v.optional(word(['counted', 'normal'])),
});
const idList = v.pipe(
  v.array(idSchema, 'a list of two or more ids'), v.minLength(2, 'a list of two or more ids'), v.description('a list of two or more ids'),
);
const chainedYield = record({
  quantity: quantity('chained-yield'), ...settings, ...share,
  stations: idList, characteristics: idList, 'at-least': shareSchema,
});
const lotFraction = record({ quantity: quantity('lot-fraction'), ...settings, ...place, ...share, 'at-most': shareSchema });

/** Every quantity a guarantee can be about. */
export const quantities = [
  'nonconforming-fraction', 'yield', 'rate', 'mean', 'fraction-beyond-limit', 'chained-yield', 'lot-fraction',
] as const;

/** A guarantee as the plant file writes it; which fields it has depends on its quantity. */
export const guaranteeSchema = v.variant(
  'quantity',
  [nonconformingFraction, yieldOf, rate, mean, fractionBeyondLimit, chainedYield, lotFraction],
  (issue) => (issue.path === undefined ? 'a mapping that describes a guarantee' : `one of ${quantities.join(', ')}`),
);

export type GuaranteeFile = v.InferOutput<typeof guaranteeSchema>;
export type WindowFile = NonNullable<GuaranteeFile['window']>;
