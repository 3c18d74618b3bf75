import { readFileSync } from 'node:fs';
import type { FastifyInstance } from 'fastify';
import { plantJsonSchema } from '../../core/plant/plant-json-schema.ts';

/** What helps to write a plant file: its JSON Schema, and one to begin with. */
export function servePlantFiles(http: FastifyInstance): void {
  const schema = JSON.stringify(plantJsonSchema());
  const example = readFileSync(new URL('../cli/example-plant.yaml', import.meta.url), 'utf8');
  http.get('/api/plant/schema', (_request, reply) => reply.type('application/schema+json').send(schema));
  http.get('/api/plant/example', (_request, reply) => reply.type('application/yaml').send(example));
}
