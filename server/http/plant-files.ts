import { readFileSync } from 'node:fs';
import * as v from 'valibot';
import { plantJsonSchema } from '../../core/plant/plant-json-schema.ts';
import type { PutFault } from '../plant-desk.ts';
import { plantText, type PlantFileText } from '../plant-file.ts';
import { actingName } from './acting-name.ts';
import { checkAnswer, plantFileAnswer, versionAnswer } from './answers/plant-file-answers.ts';
import { Conflict } from './refusals.ts';
import { BadRequest } from './request-schemas.ts';
import { route, type AnyRoute } from './route.ts';

export interface PlantFileHost {
  /** What is in force. */
  readonly inForce: () => { readonly text: string; readonly version: string };
  /** Writes it to its file and puts it in force; both are durable when it resolves. */
  readonly put: (file: PlantFileText, was: string, who: string, why: string) => Promise<PutFault | undefined>;
}

/** A plant file of a million characters, with what JSON needs to write them. */
const mostBytes = 4_194_304;

const text = v.pipe(v.string('the text of a plant file'), v.maxLength(1_048_576, 'at most 1,048,576 characters'));
const checkRequest = v.strictObject({ text });
const putRequest = v.strictObject({
  text,
  was: v.pipe(v.string('the version that was read before'), v.maxLength(64)),
  why: v.pipe(v.string('a reason'), v.trim(), v.minLength(1, 'say why the plant file changes'), v.maxLength(500, 'at most 500 characters')),
  by: v.optional(v.pipe(v.string(), v.trim(), v.minLength(1), v.maxLength(80))),
});

/** The plant file: read, checked, put in force; its JSON Schema, and one to begin with. */
export function plantFileRoutes(host: PlantFileHost): readonly AnyRoute[] {
  const schema = JSON.stringify(plantJsonSchema());
  const example = readFileSync(new URL('../cli/example-plant.yaml', import.meta.url), 'utf8');
  return [
    route({
      method: 'GET', path: '/api/plant/schema', summary: 'JSON Schema of the plant file', needs: 'nobody', answer: { media: ['application/schema+json'] },
      handle: ({ reply }) => reply.type('application/schema+json').send(schema),
    }),
    route({
      method: 'GET', path: '/api/plant/example', summary: 'A plant file to begin with', needs: 'nobody', answer: { media: ['application/yaml'] },
      handle: ({ reply }) => reply.type('application/yaml').send(example),
    }),
    route({ method: 'GET', path: '/api/plant', summary: 'The plant file in force', needs: { action: 'see', at: 'plant' }, answer: plantFileAnswer, handle: () => host.inForce() }),
    route({
      method: 'POST', path: '/api/plant/check', summary: 'Says everything that is wrong with a plant file', needs: { action: 'see', at: 'plant' }, body: checkRequest, bodyBytes: mostBytes, answer: checkAnswer,
      handle: ({ body }) => {
        const read = plantText(body.text);
        return read.ok ? { faults: [], version: read.value.version } : { faults: read.fault };
      },
    }),
    route({
      method: 'PUT', path: '/api/plant', summary: 'Puts a plant file in force', needs: { action: 'load-plant', at: 'plant' }, body: putRequest, bodyBytes: mostBytes, answer: versionAnswer,
      handle: async ({ body: { text, was, why, by }, caller }) => {
        const who = actingName(caller, by);
        const read = plantText(text);
        if (!read.ok) throw new BadRequest('text', read.fault.slice(0, 20).map(({ sentence }) => sentence).join(' '));
        const fault = await host.put(read.value, was, who, why);
        if (fault === 'another-in-force') throw new Conflict(`was: the plant file in force is ${host.inForce().version} by now, not ${was}: read it anew and put your change into it`);
        if (fault === 'changed-by-hand') throw new Conflict('text: the plant file on disk was changed by hand and not read anew; have the server read it (vouchline serve --reload) before');
        return { version: read.value.version };
      },
    }),
  ];
}
