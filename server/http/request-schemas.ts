import * as v from 'valibot';

const personName = v.pipe(v.string(), v.trim(), v.minLength(1, 'say who you are'), v.maxLength(80, 'at most 80 characters'));
const words = (most: number): v.GenericSchema<string> => v.pipe(v.string(), v.trim(), v.maxLength(most, `at most ${most} characters`));
const wholeText = v.pipe(v.string(), v.regex(/^\d{1,15}$/, 'a whole number'), v.transform(Number));

/** Who acts: asked for where access is open; whoever is signed in acts under their own name. */
const by = v.optional(personName);

export const acknowledgeRequest = v.strictObject({ by, note: v.optional(words(500), '') });
export const restartRequest = v.strictObject({ by, reason: v.pipe(words(500), v.minLength(1, 'say why the evidence is restarted')) });
export const alarmParams = v.object({ id: wholeText });
export const guaranteeParams = v.object({ id: v.pipe(v.string(), v.maxLength(64)) });

const range = { from: wholeText, to: wholeText };
export const historyQuery = v.strictObject({ ...range, points: v.optional(v.pipe(wholeText, v.minValue(1), v.maxValue(10_000)), '600') });
export const eventsQuery = v.strictObject({
  from: v.optional(wholeText, '0'),
  to: v.optional(wholeText, '253402300799999'),
  guarantee: v.optional(v.pipe(v.string(), v.maxLength(64))),
  kind: v.optional(v.picklist(['evidence', 'alarm', 'restart', 'run', 'line', 'set-aside'])),
  before: v.optional(wholeText),
  limit: v.optional(v.pipe(wholeText, v.minValue(1), v.maxValue(10_000)), '1000'),
});
/** All of the accepted error in one figure, e.g. 0.05. */
export const togetherQuery = v.strictObject({ tail: v.optional(v.pipe(v.string(), v.regex(/^0?\.\d{1,15}$/, 'a number above 0, below 1'), v.transform(Number), v.minValue(1e-9, 'a number above 0, below 1')), '0.05') });
export const alarmsQuery = v.strictObject({ before: v.optional(wholeText), limit: v.optional(v.pipe(wholeText, v.minValue(1), v.maxValue(1_000)), '50') });

/** A request that does not fit: which field, what it held, what was expected. */
export class BadRequest extends Error {
  readonly statusCode = 400;
  readonly field: string;

  constructor(field: string, message: string) {
    super(message);
    this.field = field;
  }
}

/** @throws BadRequest naming the first field that does not fit */
export function checked<S extends v.GenericSchema>(schema: S, value: unknown): v.InferOutput<S> {
  const result = v.safeParse(schema, value);
  if (result.success) return result.output;
  const issue = result.issues[0];
  const field = v.getDotPath(issue) ?? '';
  throw new BadRequest(field, `${field === '' ? 'the request' : field}: got ${issue.received}; expected ${issue.expected ?? issue.message}${issue.expected ? ` (${issue.message})` : ''}`);
}
