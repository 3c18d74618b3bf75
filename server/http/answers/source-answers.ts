import * as v from 'valibot';
import { moment, text, whole } from './answer-parts.ts';

export const sourceAnswer = v.strictObject({
  id: whole,
  name: text,
  stations: v.array(text),
  products: v.pipe(v.array(text), v.description('Empty: every product.')),
  made: moment,
  lastUsed: v.nullable(moment),
  revoked: v.nullable(moment),
  oldTokenUntil: v.pipe(v.nullable(moment), v.description('Until when the token before the last renewal is taken beside the new one.')),
  connected: v.boolean(),
});
export const sourcesAnswer = v.array(sourceAnswer);
export const sourceTokenAnswer = v.strictObject({ source: sourceAnswer, token: v.pipe(text, v.description('Shown this once; only its hash is kept.')) });
