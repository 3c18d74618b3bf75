import * as v from 'valibot';
import { falseCallsSchema, idSchema, nameSchema, unitSchema } from './figure-schemas.ts';
import { guaranteeSchema } from './guarantee-schema.ts';
import { choice, record, word, written } from './schema-parts.ts';
import { minuteForms, minuteOf, weekdays, weekdaysForms, weekdaysOf } from './roster-text.ts';
import { timeZoneForms, timeZoneOf } from './time-zone.ts';

function some<In, Out>(item: v.GenericSchema<In, Out>, forms: string): v.GenericSchema<In[], Out[]> {
  return v.pipe(v.array(item, forms), v.description(forms));
}
const clockTime = written((forms) => v.string(forms), minuteForms, minuteOf);
const daySpan = written((forms) => v.string(forms), weekdaysForms, weekdaysOf);
const dayList = some(word(weekdays), 'a list of weekdays, e.g. [Mon, Tue, Wed]');

const shift = record({
  name: nameSchema,
  days: v.optional(choice([daySpan, dayList], (value) => (Array.isArray(value) ? dayList : daySpan), weekdaysForms)),
  from: clockTime,
  to: clockTime,
});
const station = record({ id: idSchema, name: v.optional(nameSchema) });
const line = record({ id: idSchema, name: v.optional(nameSchema), stations: some(station, 'a list of stations in the order the units pass them') });
const characteristic = record({ id: idSchema, name: v.optional(nameSchema), unit: v.optional(unitSchema) });
const product = record({ id: idSchema, name: v.optional(nameSchema), characteristics: some(characteristic, 'a list of characteristics') });

/** The whole plant file, version 1. Validation and the published JSON Schema are both made from it. */
export const plantSchema = record({
  vouchline: v.pipe(v.literal(1, '1, the version of the plant file'), v.description('1, the version of the plant file')),
  plant: v.pipe(
    record({
      name: nameSchema,
      'time-zone': written((forms) => v.string(forms), timeZoneForms, timeZoneOf),
      'false-calls-per-shift': v.optional(falseCallsSchema),
    }),
    v.description('a mapping with the fields name, time-zone and, if you like, false-calls-per-shift'),
  ),
  shifts: v.optional(some(shift, 'a list of shifts')),
  lines: some(line, 'a list of lines'),
  products: some(product, 'a list of products'),
  guarantees: some(guaranteeSchema, 'a list of guarantees'),
});

export type PlantFile = v.InferOutput<typeof plantSchema>;
export type ShiftFile = NonNullable<PlantFile['shifts']>[number];
