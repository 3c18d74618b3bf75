import * as v from 'valibot';

/**
 * A field that is written one way and held another: its forms are the expectation in messages and the description in
 * the published schema, so the two cannot differ.
 */
export function written<In, Out>(
  schema: (forms: string) => v.GenericSchema<In>,
  forms: string,
  read: (value: In) => Out | undefined,
): v.GenericSchema<In, Out> {
  const parsed = v.rawTransform<In, Out>(({ dataset, addIssue, NEVER }) => {
    const value = read(dataset.value);
    if (value !== undefined) return value;
    addIssue({ message: forms });
    return NEVER;
  });
  return v.pipe(schema(forms), v.description(forms), parsed);
}

/** A field that is held as it is written. */
export function plain<Value>(schema: (forms: string) => v.GenericSchema<Value>, forms: string): v.GenericSchema<Value> {
  return v.pipe(schema(forms), v.description(forms));
}

/** One of some words. */
export function word<const Words extends readonly string[]>(words: Words): v.GenericSchema<Words[number]> {
  const forms = `one of ${words.join(', ')}`;
  return v.pipe(v.picklist(words, forms), v.description(forms));
}

type Entries = Record<string, v.GenericSchema | v.OptionalSchema<v.GenericSchema, unknown>>;

/**
 * A mapping with known fields. Every missing and every unknown field is an issue of its own: the first with what the
 * field expects, the second with the names there are.
 */
export function record<const E extends Entries>(
  entries: E,
): v.ObjectWithRestSchema<E, v.NeverSchema<string>, (issue: v.ObjectWithRestIssue) => string> {
  const names = Object.keys(entries).join(', ');
  return v.objectWithRest(entries, v.never(`one of ${names}`), (issue) => {
    const field = issue.path?.at(-1)?.key;
    const schema = typeof field === 'string' ? entries[field] : undefined;
    return schema === undefined ? `a mapping with the fields ${names}` : (v.getDescription(schema) ?? 'a value');
  });
}

const choices = new WeakMap<object, readonly v.GenericSchema[]>();

/**
 * One of several forms, of which the value itself shows which one was meant, so that its faults are told exactly
 * instead of 'none of them'.
 */
export function choice<const Options extends readonly v.GenericSchema[]>(
  options: Options,
  meant: (value: unknown) => Options[number],
  forms: string,
): v.GenericSchema<v.InferInput<Options[number]>, v.InferOutput<Options[number]>> {
  const lazy = v.lazy((value) => meant(value) as v.GenericSchema<v.InferInput<Options[number]>, v.InferOutput<Options[number]>>);
  const described = v.pipe(lazy, v.description(forms));
  for (const schema of [lazy, described]) choices.set(schema, options);
  return described;
}

/** The forms of a schema made by `choice`; undefined for any other. */
export function formsOfChoice(schema: object): readonly v.GenericSchema[] | undefined {
  return choices.get(schema);
}

export const isMapping = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null && !Array.isArray(value);
