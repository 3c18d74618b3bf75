import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { checkFile } from '../../check-values/check-file.ts';
import { publishedEvaluatorOf } from '../../check-values/registry.ts';

interface Row { readonly id: string; readonly quantity: string }
interface Grid { readonly rows: readonly (readonly unknown[])[] }

const stored = (name: string): unknown => JSON.parse(readFileSync(new URL(`../../reference/${name}`, import.meta.url), 'utf8'));

// Sources of the values stand in the files: 50-digit computation, publications with section and address.
describe('reference figures of measurements', () => {
  it.each(['t-quantile', 'fraction-beyond-limit', 'tolerance-k', 'capability-lower'])('%s: every row to 1e-12', (name) => {
    const grid = stored(`grid-${name}-open.json`) as Grid;
    expect(grid.rows.length).toBeGreaterThan(200);
    expect(checkFile(grid).filter(({ kind }) => kind !== 'met')).toEqual([]);
  });

  it('data sets: certified mean and deviation, and the t bounds, to 14 digits or what doubles hold', () => {
    const outcomes = checkFile(stored('strd-data-open.json'));
    expect(outcomes.length).toBe(60);
    expect(outcomes.filter(({ kind }) => kind !== 'met')).toEqual([]);
  });

  it('published figures to their printed digits, except those that are named', () => {
    const ours = /\bt bound|Student|standard deviation|noncentral|sample|factor|coverage/;
    const rows = (stored('published-open.json') as Row[]).filter(({ quantity }) => ours.test(quantity));
    expect(rows.length).toBe(417);
    expect(rows.filter(({ quantity }) => publishedEvaluatorOf(quantity) === undefined)).toEqual([]);
    const outcomes = checkFile(rows);
    expect(outcomes.filter(({ kind }) => kind === 'beyond' || kind === 'unanswered')).toEqual([]);
    const disputed = rows.filter((_, i) => outcomes[i]?.kind === 'disputed').map(({ id }) => id);
    // the handbook's column of tolerance factors runs up to 0.002 high; the approximation is not the exact factor;
    // the rest differ in the last bit that a double holds or in the last printed digit
    expect(disputed).toEqual([
      'scipy-nct-001', 'scipy-nct-003', 'scipy-nct-004', 'scipy-nct-006', 'netcontent-hb133-003',
      'cmh17-kb-002', 'cmh17-kb-003', 'cmh17-kb-004', 'cmh17-kb-005', 'cmh17-kb-006',
      'cmh17-kb-010', 'cmh17-kb-011', 'cmh17-kb-014', 'cmh17-kb-015', 'cmh17-kb-019',
      'cmh17-kb-020', 'cmh17-kb-021', 'cmh17-kb-023', 'cmh17-kb-024', 'cmh17-kb-028',
      'cmh17-kb-033', 'cmh17-kb-038', 'cmh17-kb-039', 'cmh17-kb-041', 'nist-7263-002',
    ]);
  });
});
