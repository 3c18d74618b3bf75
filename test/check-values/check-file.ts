import { checkDataSets } from './check-data-sets.ts';
import { checkGrid, type Grid } from './check-grid.ts';
import { checkPublished, type Published } from './check-published.ts';
import { checkVectors, type Vector } from './check-vectors.ts';
import type { DataSet } from './data-sets.ts';
import type { Outcome } from './outcome.ts';

/** Every row of a file of reference values, whichever of the four forms it has. */
export function checkFile(content: unknown): readonly Outcome[] {
  if (Array.isArray(content)) {
    const rows: readonly unknown[] = content;
    return rows.flatMap(checkListed);
  }
  if (isObject(content) && Array.isArray(content['rows'])) return checkGrid(content as unknown as Grid);
  if (isObject(content)) return checkDataSets(content as Readonly<Record<string, DataSet>>);
  throw new Error('the file holds neither a grid nor published values, vectors or data sets');
}

function checkListed(row: unknown): readonly Outcome[] {
  if (isObject(row) && 'fn' in row) return checkVectors([row as unknown as Vector]);
  if (isObject(row) && 'value_text' in row) return checkPublished([row as unknown as Published]);
  return [{ kind: 'unanswered', row: JSON.stringify(row) }];
}

function isObject(value: unknown): value is Readonly<Record<string, unknown>> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}
