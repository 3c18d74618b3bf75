import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { checkVectors, type Vector } from '../../check-values/check-vectors.ts';
import { sequentialVectors } from '../../check-values/sequential.ts';

/* Made elsewhere in 50-digit arithmetic from the same formulas; the file stands beside its sources in test/reference. */
const file = new URL('../../reference/sequential-vectors-open.json', import.meta.url);
const vectors = (JSON.parse(readFileSync(file, 'utf8')) as Vector[]).filter(({ fn }) => sequentialVectors.some((known) => known.fn === fn));

describe('reference vectors of looks at all times', () => {
  it('are there', () => {
    expect(vectors.length).toBeGreaterThan(80);
  });

  it.each(vectors.map((vector) => ({ vector })))('$vector.fn $vector.inputs', ({ vector }) => {
    expect(checkVectors([vector])).toMatchObject([{ kind: 'met' }]);
  });
});
