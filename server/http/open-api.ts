import { toJsonSchema, type JsonSchema } from '@valibot/to-json-schema';
import type { GenericSchema } from 'valibot';
import { route, type AnyRoute, type Answer, type Need } from './route.ts';

/** A JSON object of the description. */
type Part = Record<string, unknown>;

const refusal = (description: string): Part => ({ description, content: { 'application/json': { schema: { $ref: '#/components/schemas/Refusal' } } } });

/** GET /api/openapi.json: every route, described from the schemas that check its requests. */
export function openApiRoute(routes: readonly AnyRoute[]): AnyRoute {
  let text: string | undefined;
  const described: AnyRoute = route({
    method: 'GET', path: '/api/openapi.json', summary: 'This description', needs: { action: 'see', at: 'somewhere' }, answer: { media: ['application/json'] },
    handle: ({ reply }) => reply.type('application/json').send((text ??= JSON.stringify(openApi([...routes, described])))),
  });
  return described;
}

/** @source OpenAPI Specification 3.1.0 (from memory) */
export function openApi(routes: readonly AnyRoute[]): Part {
  const paths: Record<string, Part> = {};
  for (const one of routes) {
    const path = one.path.replaceAll(/:(\w+)/g, '{$1}');
    (paths[path] ??= {})[one.method.toLowerCase()] = operation(one);
  }
  return {
    openapi: '3.1.0',
    info: { title: 'Vouchline', version: '1', description: 'Times are milliseconds since 1970-01-01 UTC. Records of sources are sent another way: see the page of the protocol.' },
    paths,
    components: {
      securitySchemes: {
        token: { type: 'http', scheme: 'bearer', description: 'An API token of one person, for chosen actions.' },
        session: { type: 'apiKey', in: 'cookie', name: 'vouchline-session', description: 'What a browser gets when somebody signs in; __Host-vouchline-session over TLS.' },
      },
      schemas: {
        Refusal: { type: 'object', required: ['message'], properties: { message: { type: 'string' }, field: { type: 'string', description: 'Which field of the request does not fit.' } } },
      },
    },
  };
}

function operation(one: AnyRoute): Part {
  const { method, path, summary, needs, params, query, body, answer } = one;
  const open = needs === 'nobody';
  return {
    operationId: `${method.toLowerCase()}${path.replaceAll(/[^A-Za-z0-9]+(\w)/g, (_, letter: string) => letter.toUpperCase())}`,
    summary,
    security: open ? [] : [{ token: [] }, { session: [] }],
    ...(open ? {} : { 'x-needs': needed(needs) }),
    parameters: [...parameters(params, 'path'), ...parameters(query, 'query')],
    ...(body === undefined ? {} : { requestBody: { required: true, content: { 'application/json': { schema: schemaOf(body) } } } }),
    responses: {
      ...answered(answer),
      ...(params === undefined && query === undefined && body === undefined ? {} : { '400': refusal('The request does not fit; `field` says where.') }),
      ...(open ? {} : { '401': refusal('Nobody known asks.'), '403': refusal('Who asks may not do this; that is on record.') }),
      ...(params === undefined ? {} : { '404': refusal('There is no such thing.') }),
      ...(method === 'GET' ? {} : { '409': refusal('It cannot be done as things stand now.') }),
      '429': refusal('Too many tries or requests; Retry-After says when to try again.'),
    },
  };
}

function answered(answer: Answer): Part {
  if (answer === 'nothing') return { '204': { description: 'Done.' } };
  if (answer === 'elsewhere') return { '302': { description: 'Location says where it goes on.' } };
  if ('media' in answer) return { '200': { description: 'As asked.', content: Object.fromEntries(answer.media.map((type) => [type, {}])) } };
  return { '200': { description: 'As asked.', content: { 'application/json': { schema: schemaOf(answer, 'output') } } } };
}

const needed = ({ action, at }: Need<never>): Part => ({ action, at: typeof at === 'string' ? at : 'the line it concerns' });

function parameters(schema: GenericSchema | undefined, place: 'path' | 'query'): readonly Part[] {
  if (schema === undefined) return [];
  const { properties = {}, required = [] } = schemaOf(schema) as { properties?: Record<string, JsonSchema>; required?: readonly string[] };
  return Object.entries(properties).map(([name, of]) => ({ name, in: place, required: place === 'path' || required.includes(name), schema: of }));
}

/** As it is sent: what a schema turns it into on the way is no part of the description. */
function schemaOf(schema: GenericSchema, typeMode: 'input' | 'output' = 'input'): Part {
  const { $schema: _dialect, ...described } = toJsonSchema(schema, { target: 'draft-2020-12', typeMode, errorMode: 'ignore' });
  return described;
}
