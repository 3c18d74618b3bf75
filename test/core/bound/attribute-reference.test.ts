import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { fractionLower, fractionUpper } from '../../../core/bound/nonconforming-fraction.ts';
import type { Tail } from '../../../core/units.ts';
import { attributeVectors } from '../../check-values/attribute-vectors.ts';
import { checkFile } from '../../check-values/check-file.ts';
import { gridEvaluatorOf, publishedEvaluatorOf } from '../../check-values/registry.ts';

interface Row { readonly id: string; readonly quantity: string; readonly agrees: boolean }
interface Grid { readonly quantity: string; readonly columns: readonly string[]; readonly rows: readonly (readonly unknown[])[] }

const stored = (name: string): unknown => JSON.parse(readFileSync(new URL(`../../reference/${name}`, import.meta.url), 'utf8'));

const grids = ['clopper-pearson', 'mid-p', 'wilson', 'jeffreys', 'poisson', 'demonstration-n', 'finite-lot'];

// Sources of the values stand in the files: 50-digit computation, publications with section and address.
describe('reference grids of counts and verdicts', () => {
  it.each(grids)('%s: every row, to 1e-12 or to the unit', (name) => {
    const grid = stored(`grid-${name}-open.json`) as Grid;
    expect(gridEvaluatorOf(grid.quantity)).toBeDefined();
    expect(grid.rows.length).toBeGreaterThan(400);
    expect(checkFile(grid).filter(({ kind }) => kind !== 'met')).toEqual([]);
  });

  it('finds a row that is wrong in its twelfth digit, or off by one unit', () => {
    const binomial = { ...(stored('grid-clopper-pearson-open.json') as Grid), rows: [[10, 0, 0.95, 'upper', 0.25886555089305 * (1 + 3e-12)]] };
    expect(checkFile(binomial)[0]).toMatchObject({ kind: 'beyond' });
    const lot = { ...(stored('grid-finite-lot-open.json') as Grid), rows: [[10, 1, 0, 0.8, 'upper', 8, true]] };
    expect(checkFile(lot)[0]).toMatchObject({ kind: 'beyond', found: '7' });
  });

  it('leaves no row out: what nothing evaluates is said to be so', () => {
    const grid: Grid = { quantity: 'the colour of the hose', columns: ['n', 'bound'], rows: [[1, 2]] };
    expect(checkFile(grid)).toEqual([{ kind: 'unanswered', row: '[1,2]' }]);
    expect(checkFile([{ fn: 'nobody', inputs: {}, output: 1 }])[0]).toMatchObject({ kind: 'unanswered' });
    expect(checkFile([{ neither: 1 }])[0]).toMatchObject({ kind: 'unanswered' });
    expect(() => checkFile('text')).toThrow('neither');
  });
});

/* Published figures that do not hold, each with the reason given in the file or found here:
 * a tie lost in a double (boost-max-n-006); a Brent search stopped early (scipy-doc-001, statsmodels-binom-015);
 * last bits of a double (other statsmodels); rounding up in a plan's table (plan-uk-004); a misprint
 * (cmh17-ra-052); off by one unit (aicpa-a-2-012); seven-digit arithmetic (touw-ub); rounding to tens (touw-poisson). */
const disputed = [
  'boost-max-n-006', 'scipy-doc-001', 'statsmodels-binom-002', 'statsmodels-binom-008', 'statsmodels-binom-011',
  'statsmodels-binom-013', 'statsmodels-binom-015', 'statsmodels-binom-016', 'plan-uk-004', 'cmh17-ra-052',
  'aicpa-a-2-012', 'touw-ub-002', 'touw-ub-004', 'touw-poisson-002', 'touw-poisson-003', 'touw-poisson-004',
];

describe('published figures of counts and verdicts', () => {
  const ours = /Clopper|Jeffreys|negative binomial|P\(X|Wilson score|Poisson|hypergeometric|mid-P|rule of three/;
  const rows = (stored('published-open.json') as Row[]).filter(({ quantity }) => ours.test(quantity) && !quantity.includes('coverage'));

  it('are all reproduced to their printed digits, except those that are named', () => {
    expect(rows.length).toBe(454);
    expect(rows.filter(({ quantity }) => publishedEvaluatorOf(quantity) === undefined)).toEqual([]);
    const outcomes = checkFile(rows);
    expect(outcomes.filter(({ kind }) => kind === 'beyond' || kind === 'unanswered')).toEqual([]);
    expect(rows.filter((_, i) => outcomes[i]?.kind === 'disputed').map(({ id }) => id)).toEqual(disputed);
  });

  it('would be missed if a printed digit were another', () => {
    const row = rows.find(({ id }) => id === 'boost-binom-001');
    expect(checkFile([{ ...row, value_text: '0.12841' }])[0]).toMatchObject({ kind: 'beyond' });
  });
});

describe('test vectors of counts and verdicts', () => {
  it('are all met to 1e-12, in each figure', () => {
    const known = new Set(attributeVectors.map(({ fn }) => fn));
    const vectors = (stored('sequential-vectors-open.json') as { readonly fn: string }[]).filter(({ fn }) => known.has(fn));
    expect(vectors.length).toBe(33);
    expect(checkFile(vectors).filter(({ kind }) => kind !== 'met')).toEqual([]);
    expect(checkFile([{ fn: 'dispersion', inputs: { batch_counts: [0, 1, 5], m: 10 }, output: { phi: '3.8', p_value: 'x' } }])[0]).toMatchObject({ kind: 'beyond' });
  });
});

/* [x, n, tail, lower, upper]: own computation in 50-digit arithmetic (mpmath, continued fraction), where the
 * grids do not reach: tails to 1e-310, both methods of summing near their border, tails above 1/2. */
const hard: readonly (readonly [number, number, number, number, number])[] = [
  [3, 10, 1e-300, 2.0274006651911334e-101, 1], [1, 3, 1e-310, 3.3333333333333231e-311, 1],
  [5, 1e9, 1e-300, 2.6051710899076941e-69, 7.188832458900177e-7], [5, 1e9, 0.05, 1.9701495700590845e-9, 1.0513034879762168e-8],
  [1e6, 1e8, 0.3, 0.0099947798134198964, 0.01000522525246946], [5e8, 1e9, 0.05, 0.49997399208063032, 0.50002600791936968],
  [799, 1600, 0.45, 0.49749218671372924, 0.50125808440944016], [801, 1602, 0.45, 0.49811842023747965, 0.50188157976252035],
  [2000, 1e5, 0.5, 0.019996600109048959, 0.020006600075666321], [1e6, 1e8, 1e-100, 0.0097898044954433502, 0.010213155581654063],
  [999_999_990, 1e9, 0.05, 0.99999998303778082, 0.99999999457459429], [798, 1e7, 0.2, 7.7413401361192324e-5, 8.2268633148708005e-5],
  [1e5, 1e9, 1e-12, 9.7791743802889048e-5, 0.00010224158310508641], [7, 8, 0.97, 0.9648748387781349, 0.64511948120389436],
  [40, 1e4, 0.999999, 0.0077390888750706378, 0.0017404792454188032],
];

describe('exact bounds beyond the grids', () => {
  it.each(hard)('%d of %d at tail %d', (x, n, tail, lower, upper) => {
    expect(Math.abs(fractionLower(x, n, tail as Tail) / lower - 1)).toBeLessThan(1e-13);
    expect(Math.abs(fractionUpper(x, n, tail as Tail) / upper - 1)).toBeLessThan(1e-13);
  });
});
