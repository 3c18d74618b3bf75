import { readFileSync } from 'node:fs';
import { plantJsonSchema } from '../../core/plant/plant-json-schema.ts';
import { route, type AnyRoute } from './route.ts';

/** What helps to write a plant file: its JSON Schema, and one to begin with. */
export function plantFileRoutes(): readonly AnyRoute[] {
  const schema = JSON.stringify(plantJsonSchema());
  const example = readFileSync(new URL('../cli/example-plant.yaml', import.meta.url), 'utf8');
  return [
    route({
      method: 'GET', path: '/api/plant/schema', summary: 'JSON Schema of the plant file', needs: 'nobody', answer: 'application/schema+json',
      handle: ({ reply }) => reply.type('application/schema+json').send(schema),
    }),
    route({
      method: 'GET', path: '/api/plant/example', summary: 'A plant file to begin with', needs: 'nobody', answer: 'application/yaml',
      handle: ({ reply }) => reply.type('application/yaml').send(example),
    }),
  ];
}
