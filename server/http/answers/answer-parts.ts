import * as v from 'valibot';

/** Parts that many answers hold. */
export const number = v.pipe(v.number(), v.finite());
export const whole = v.pipe(v.number(), v.safeInteger(), v.minValue(0));
/** Milliseconds since 1970-01-01 UTC. */
export const moment = v.pipe(v.number(), v.description('Milliseconds since 1970-01-01 UTC.'));
export const text = v.string();
export const figures = v.pipe(v.record(v.string(), number), v.description('Figures by their names.'));
export const limitSide = v.picklist(['below', 'above']);
/** What is said where something was done and there is no more to say of it. */
export const methodTold = v.strictObject({ name: text, sentence: text, assumes: v.array(text), source: text });
