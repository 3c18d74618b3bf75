import * as v from 'valibot';
import type { Json } from '../../../core/access/canonical-json.ts';
import { changeKinds, type RecordedChange } from '../../../core/access/change.ts';
import { moment, text, whole } from './answer-parts.ts';
import type { Sent } from './sent.ts';

const anything = v.any() as v.GenericSchema<Json>;
const hash = v.pipe(text, v.regex(/^[0-9a-f]{64}$/));

const change: v.GenericSchema<Sent<Omit<RecordedChange, 'before' | 'after'>> & Pick<RecordedChange, 'before' | 'after'>> = v.strictObject({
  id: whole,
  at: moment,
  kind: v.picklist(changeKinds),
  who: text,
  what: text,
  before: anything,
  after: anything,
  why: text,
  entry: v.pipe(v.nullable(whole), v.description('Id of the journal entry that carries it.')),
  hash: v.pipe(hash, v.description("SHA-256 of the hash before and this record's canonical JSON.")),
});
export const changesAnswer = v.array(change);
export const headAnswer = v.strictObject({ id: whole, hash });
