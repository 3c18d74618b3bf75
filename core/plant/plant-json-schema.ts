import { toJsonSchema, type ConversionConfig, type JsonSchema } from '@valibot/to-json-schema';
import { plantSchema } from './plant-schema.ts';
import { formsOfChoice } from './schema-parts.ts';

const conversion: ConversionConfig = {
  target: 'draft-2020-12',
  typeMode: 'input',
  overrideSchema: ({ valibotSchema, jsonSchema }) => {
    if (valibotSchema.type === 'never') return { not: {} };
    const forms = formsOfChoice(valibotSchema);
    if (forms === undefined) return undefined;
    const { description = '' } = jsonSchema;
    return { ...(description && { description }), anyOf: forms.map((form) => bare(toJsonSchema(form, conversion))) };
  },
};

/** Without dialect and definitions: the library makes definitions for choices alone, and those are written out. */
function bare({ $schema: _dialect, $defs: _definitions, ...schema }: JsonSchema): JsonSchema {
  return schema;
}

/**
 * The plant file's form as JSON Schema (draft 2020-12), made from the schemas that validate it. It says what can be
 * said of form; what the parts must say of each other (ids, units, windows large enough) only readPlant checks.
 */
export function plantJsonSchema(): JsonSchema {
  const schema = bare(toJsonSchema(plantSchema, conversion));
  return { $schema: 'https://json-schema.org/draft/2020-12/schema', title: 'Vouchline plant file, version 1', ...schema };
}
