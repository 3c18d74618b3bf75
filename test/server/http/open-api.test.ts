import * as v from 'valibot';
import { describe, expect, it } from 'vitest';
import { openApi } from '../../../server/http/open-api.ts';
import { route } from '../../../server/http/route.ts';

const document = openApi([
  route({ method: 'GET', path: '/things/:id', summary: 'A thing', needs: { action: 'see', at: 'plant' }, params: v.object({ id: v.string() }), query: v.strictObject({ limit: v.optional(v.string()) }), answer: v.strictObject({ name: v.string() }), handle: () => undefined }),
  route({ method: 'POST', path: '/things', summary: 'Makes a thing', needs: 'nobody', body: v.strictObject({ name: v.pipe(v.string(), v.minLength(1), v.maxLength(5)) }), answer: 'nothing', handle: () => undefined }),
]) as { openapi: string; paths: Record<string, Record<string, Record<string, unknown>>> };

describe('the description of the API', () => {
  it('is made from what checks the requests', () => {
    expect(document.openapi).toBe('3.1.0');
    expect(document.paths['/things/{id}']!['get']).toMatchObject({
      operationId: 'getThingsId',
      'x-needs': { action: 'see', at: 'plant' },
      security: [{ token: [] }, { session: [] }],
      parameters: [{ name: 'id', in: 'path', required: true, schema: { type: 'string' } }, { name: 'limit', in: 'query', required: false }],
      responses: { '200': { content: { 'application/json': { schema: { type: 'object', required: ['name'] } } } }, '401': {}, '403': {}, '404': {} },
    });
    expect(document.paths['/things']!['post']).toMatchObject({ security: [], requestBody: { content: { 'application/json': { schema: { properties: { name: { minLength: 1, maxLength: 5 } }, additionalProperties: false } } } }, responses: { '204': {}, '409': {} } });
  });

  it('gives every operation a name of its own', () => {
    const names = Object.values(document.paths).flatMap((methods) => Object.values(methods).map(({ operationId }) => operationId));
    expect(new Set(names).size).toBe(names.length);
  });
});
