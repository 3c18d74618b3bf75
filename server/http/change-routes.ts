import { Readable } from 'node:stream';
import * as v from 'valibot';
import { changeKinds, type RecordedChange } from '../../core/access/change.ts';
import type { AccessFile, ChangeQuery } from '../access/access-file.ts';
import { changesAnswer, headAnswer } from './answers/record-answers.ts';
import { changeCells, csvLine } from './change-csv.ts';
import { route, type AnyRoute } from './route.ts';

const whole = v.pipe(v.string(), v.regex(/^\d{1,15}$/, 'a whole number'), v.transform(Number));
const filter = {
  from: v.optional(whole, '0'),
  to: v.optional(whole, '253402300799999'),
  kind: v.optional(v.picklist(changeKinds)),
  holds: v.optional(v.pipe(v.string(), v.maxLength(100, 'at most 100 characters'))),
};
const changesQuery = v.strictObject({ ...filter, before: v.optional(whole), limit: v.optional(v.pipe(whole, v.minValue(1), v.maxValue(1_000)), '100') });
const exportQuery = v.strictObject({ ...filter, form: v.optional(v.picklist(['ndjson', 'csv']), 'ndjson') });

const reads = { action: 'read-changes', at: 'plant' } as const;
const page = 1_000;

/** The record of changes: read, filtered, exported; its newest hash, to be noted elsewhere. */
export function changeRoutes(file: AccessFile): readonly AnyRoute[] {
  return [
    route({
      method: 'GET', path: '/api/changes', summary: 'The record of changes, newest first', needs: reads, query: changesQuery, answer: changesAnswer,
      handle: ({ query }) => file.changes(known(query)),
    }),
    route({
      method: 'GET', path: '/api/changes/head', summary: 'Number and hash of the newest record; note them where nobody can alter them here', needs: reads, answer: headAnswer,
      handle: async () => {
        const [newest] = await file.changes({ from: 0, to: Number.MAX_SAFE_INTEGER, limit: 1 });
        return { id: newest?.id ?? 0, hash: newest?.hash ?? '0'.repeat(64) };
      },
    }),
    route({
      method: 'GET', path: '/api/changes/export', summary: 'The record of changes as a file, newest first', needs: reads, query: exportQuery, answer: { media: ['application/x-ndjson', 'text/csv'] },
      handle: ({ query: { form, ...rest }, reply }) =>
        reply
          .type(form === 'csv' ? 'text/csv; charset=utf-8' : 'application/x-ndjson')
          .header('content-disposition', `attachment; filename="changes.${form}"`)
          .send(Readable.from(form === 'csv' ? asCsv(file, rest) : asNdjson(file, rest))),
    }),
  ];
}

type Filter = Omit<v.InferOutput<typeof exportQuery>, 'form'>;

const known = ({ from, to, kind, holds, before, limit }: Filter & { readonly before?: number | undefined; readonly limit: number }): ChangeQuery => ({
  from, to, limit, ...(kind !== undefined && { kind }), ...(holds !== undefined && { holds }), ...(before !== undefined && { before }),
});

/** Page by page, so that a long record needs no more memory than a page. */
async function* pages(file: AccessFile, filter: Filter): AsyncGenerator<readonly RecordedChange[]> {
  let before: number | undefined;
  for (;;) {
    const found = await file.changes(known({ ...filter, before, limit: page }));
    if (found.length > 0) yield found;
    if (found.length < page) return;
    before = found.at(-1)?.id;
  }
}

async function* asNdjson(file: AccessFile, filter: Filter): AsyncGenerator<string> {
  for await (const found of pages(file, filter)) yield found.map((change) => `${JSON.stringify(change)}\n`).join('');
}

async function* asCsv(file: AccessFile, filter: Filter): AsyncGenerator<string> {
  yield csvLine(['id', 'at', 'kind', 'who', 'what', 'before', 'after', 'why', 'entry', 'hash']);
  for await (const found of pages(file, filter)) yield found.map((change) => csvLine(changeCells(change))).join('');
}
