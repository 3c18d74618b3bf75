import { readFileSync } from 'node:fs';
import { Ajv2020, type AnySchemaObject } from 'ajv/dist/2020.js';
import { describe, expect, it } from 'vitest';
import { parse } from 'yaml';
import { plantJsonSchema } from '../../../core/plant/plant-json-schema.ts';
import { leak, smallPlant } from './small-plant.ts';

const accepts = new Ajv2020({ strict: true, allowUnionTypes: true }).compile(plantJsonSchema() as AnySchemaObject);

describe('published schema of the plant file', () => {
  it('accepts what the reader accepts', () => {
    expect(accepts(parse(smallPlant(leak)))).toBe(true);
    expect(accepts(parse(readFileSync(new URL('../../../server/demo/hose-works.yaml', import.meta.url), 'utf8')))).toBe(true);
  });

  it.each([
    ['an unknown field', `${leak}\natt-most: 1`],
    ['a field of another quantity', `${leak}\nmodel: counted`],
    ['a missing field', leak.replace('at-most: 200 ppm\n', '')],
    ['an unknown word', leak.replace('{ units: 20000 }', 'week')],
    ['a window of no units', leak.replace('20000', '0')],
    ['an unknown field of an alarm rule', `${leak}\nalarms: { crossing: { prio: high } }`],
    ['an alarm rule that is neither off nor settings', `${leak}\nalarms: { crossing: on }`],
    ['an id with a space', leak.replace('leak-A', 'leak A')],
  ])('refuses %s', (_what, guarantee) => {
    expect(accepts(parse(smallPlant(guarantee)))).toBe(false);
  });

  it('stands alone and says what each field expects', () => {
    const text = JSON.stringify(plantJsonSchema());
    expect(text).not.toContain('"$ref"');
    expect(text).toContain('a share, e.g. 200 ppm');
  });
});
