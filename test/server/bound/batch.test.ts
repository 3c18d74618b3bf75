import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { BatchAnswers } from '../../../server/bound/batch-answer.ts';
import { answersOf, longestRequest } from '../../../server/bound/batch-lines.ts';
import { vouchline } from '../built-program.ts';

const answer = (request: object): Record<string, unknown> => JSON.parse(new BatchAnswers().answer(JSON.stringify(request))) as Record<string, unknown>;

interface Grid {
  readonly columns: readonly string[];
  readonly rows: readonly (readonly unknown[])[];
}

/** Check values by others (50 digits); each file names its origin. */
const grids = [
  ['clopper-pearson', { quantity: 'nonconforming-fraction', method: 'exact' }, 'bound'],
  ['mid-p', { quantity: 'nonconforming-fraction', method: 'mid-p' }, 'bound'],
  ['wilson', { quantity: 'nonconforming-fraction', method: 'wilson' }, 'bound'],
  ['jeffreys', { quantity: 'nonconforming-fraction', method: 'jeffreys' }, 'bound'],
  ['poisson', { quantity: 'count' }, 'bound'],
  ['finite-lot', { quantity: 'finite-lot' }, 'bound'],
  ['fraction-beyond-limit', { quantity: 'fraction-beyond-limit' }, 'bound'],
  ['capability-lower', { quantity: 'capability' }, 'bound'],
  ['tolerance-k', { quantity: 'tolerance-factor' }, 'k'],
  ['demonstration-n', { quantity: 'demonstration' }, 'n'],
] as const;

describe('a batch through the program', () => {
  it.each(grids)('answers every row of the grid %s', (name, fixed, figure) => {
    const { columns, rows } = JSON.parse(readFileSync(new URL(`../../reference/grid-${name}-open.json`, import.meta.url), 'utf8')) as Grid;
    const wanted = rows.map((row) => Object.fromEntries(columns.map((column, at) => [column, row[at]])));
    const requests = wanted.map(({ tie: _tie, [figure]: _figure, ...fields }) => JSON.stringify({ ...fixed, ...fields }));
    const { code, out, err } = vouchline(['bound', '--batch'], requests.join('\n'));
    expect(err).toBe('');
    expect(code).toBe(0);
    const answers = out.trimEnd().split('\n').map((line) => JSON.parse(line) as Record<string, number>);
    expect(answers).toHaveLength(rows.length);
    const off = answers.map((found, at) => {
      const right = Number(wanted[at]![figure]);
      return Math.abs((found[figure] ?? NaN) - right) / (right === 0 ? 1 : Math.abs(right));
    });
    expect(off.filter((error) => !(error <= 1e-12))).toEqual([]);
  });

  it('goes on behind requests that cannot be met, in their order', () => {
    const lines = [
      '{"quantity":"nonconforming-fraction","n":1,"nonconforming":0,"confidence":0.9,"side":"upper"}',
      'not JSON',
      '{"quantity":"nonconforming-fraction","n":1,"nonconforming":2,"confidence":0.9,"side":"upper"}',
      '',
      '{"quantity":"nonconforming-fraction","n":1,"nonconforming":1,"confidence":0.9,"side":"upper"}',
    ];
    const { code, out } = vouchline(['bound', '--batch'], `${lines.join('\n')}\n`);
    const answers = out.trimEnd().split('\n').map((line) => JSON.parse(line) as Record<string, unknown>);
    expect(code).toBe(0);
    expect(answers.map((found) => ('error' in found ? 'error' : found['bound']))).toEqual([expect.closeTo(0.9, 12), 'error', 'error', 'error', 1]);
    expect(answers[2]).toEqual({ error: 'nonconforming is 2, expected a whole number, from 0 to 1', field: 'nonconforming' });
  });
});

describe('one request', () => {
  const sample = { quantity: 'nonconforming-fraction', n: 20_000, nonconforming: 1, side: 'upper' };

  it('takes the complement of a confidence in decimals, or a tail as it stands', () => {
    expect(answer({ ...sample, confidence: 0.999999 })).toEqual(answer({ ...sample, tail: 1e-6 }));
    expect(answer({ ...sample, confidence: '0.99999999999999999999' })).toEqual(answer({ ...sample, tail: 1e-20 }));
  });

  it.each([
    [{ ...sample }, 'confidence'],
    [{ ...sample, confidence: 0.95, tail: 0.05 }, 'tail'],
    [{ ...sample, confidence: 1 }, 'confidence'],
    [{ ...sample, confidence: 95 }, 'confidence'],
    [{ ...sample, tail: 0 }, 'tail'],
    [{ ...sample, confidence: 0.95, side: 'both' }, 'side'],
    [{ ...sample, confidence: 0.95, method: 'normal' }, 'method'],
    [{ ...sample, confidence: 0.95, n: '20000' }, 'n'],
    [{ ...sample, confidence: 0.95, n: 0.5 }, 'n'],
    [{ ...sample, confidence: 0.95, N: 3 }, 'N'],
    [{ ...sample, confidence: 0.95, looks: 'all' }, 'line'],
    [{ ...sample, confidence: 0.95, looks: 'all', line: 0.001, method: 'wilson' }, 'method'],
    [{ ...sample, confidence: 0.95, looks: 'often' }, 'looks'],
    [{ quantity: 'fraction', confidence: 0.95 }, 'quantity'],
    [{ quantity: 'finite-lot', lot_size: 10, n: 11, nonconforming: 0, confidence: 0.9, side: 'upper' }, 'n'],
    [{ quantity: 'mean', n: 5, mean: 1, sd: 1, sigma: 1, confidence: 0.9, side: 'upper' }, 'sigma'],
    [{ quantity: 'mean', n: 5, mean: 1, sigma: 1, looks: 'all', confidence: 0.9, side: 'upper' }, 'tightest_at'],
    [{ quantity: 'clustered-fraction', n: 5, nonconforming: 1, design_effect: 0.5, confidence: 0.9, side: 'upper' }, 'design_effect'],
    [{ quantity: 'chained-yield', stations: [{ station: 'crimp', n: 5, nonconforming: 1, spoilt: 2 }], confidence: 0.9, side: 'lower' }, 'stations[0].spoilt'],
    [{ quantity: 'inspected-fraction', n: 50, rejected: 1, sensitivity: 0.9, false_reject: 0.1, seeded: 3, confidence: 0.9, side: 'upper' }, 'seeded'],
    [{ quantity: 'demonstration', rate: 0, nonconforming: 0, confidence: 0.9 }, 'rate'],
  ])('names the field at fault in %j', (request, field) => {
    const found = answer(request);
    expect(found['field']).toBe(field);
    expect(found['error']).toMatch(/./);
    expect('bound' in found).toBe(false);
  });

  it('answers no infinite bound with a figure', () => {
    expect(answer({ quantity: 'mean', n: 2, mean: 0, sd: 1, looks: 'all', confidence: 0.999999, side: 'upper' })).toEqual({ error: 'these figures bound nothing: the bound is Infinity' });
  });

  it('gives the further quantities', () => {
    const fields = { confidence: 0.95, side: 'lower' } as const;
    expect(answer({ quantity: 'yield', n: 1, nonconforming: 0, ...fields })).toEqual({ bound: expect.closeTo(0.05, 12) as number });
    // The bound of a chain of one station with no loss: -ln(yield) = -ln(0.05)/n, so exp(-2.9957/100).
    const chain = answer({ quantity: 'chained-yield', stations: [{ station: 'leak', n: 100, nonconforming: 0 }], ...fields });
    expect(chain['bound']).toBeCloseTo(0.05 ** (1 / 100), 12);
    // Mirror images: an upper bound on a loss is a lower bound on the yield, at all looks too.
    const [loss, kept] = [
      answer({ quantity: 'nonconforming-fraction', n: 500, nonconforming: 3, line: 0.015, looks: 'all', confidence: 0.95, side: 'upper' }),
      answer({ quantity: 'yield', n: 500, nonconforming: 3, line: 0.985, looks: 'all', ...fields }),
    ];
    expect(Number(kept['bound'])).toBeCloseTo(1 - Number(loss['bound']), 12);
    expect(Number(loss['bound'])).toBeGreaterThan(Number(answer({ ...sample, n: 500, nonconforming: 3, confidence: 0.95 })['bound']));
    // (U - Fr)/(Se - Fr) with U = 1 - 0.05^(1/1) = 0.95 for none of one rejected.
    const seen = answer({ quantity: 'inspected-fraction', n: 1, rejected: 0, sensitivity: 1, false_reject: 0.5, confidence: 0.95, side: 'upper' });
    expect(seen['bound']).toBeCloseTo(0.9, 12);
  });
});

describe('the text of a batch', () => {
  const line = '{"quantity":"count","count":3,"confidence":0.95,"side":"upper"}';

  async function through(pieces: readonly Buffer[]): Promise<string> {
    let text = '';
    // eslint-disable-next-line @typescript-eslint/require-await -- what comes in is asynchronous in its form only
    for await (const answers of answersOf((async function* () { yield* pieces; })())) text += answers;
    return text;
  }

  it('is answered the same wherever it is cut', async () => {
    const whole = Buffer.from(`${line}\nbad ü\n\n${line}`);
    const right = await through([whole]);
    expect(right.split('\n')).toHaveLength(5);
    await fc.assert(
      fc.asyncProperty(fc.array(fc.integer({ min: 0, max: whole.length }), { maxLength: 6 }), async (cuts) => {
        const at = [0, ...cuts.sort((a, b) => a - b), whole.length];
        expect(await through(at.slice(1).map((end, i) => whole.subarray(at[i], end)))).toBe(right);
      }),
      { seed: 11 },
    );
  });

  it('is read past a request that is too long, holding none of it', async () => {
    const long = Buffer.from('x'.repeat(longestRequest / 2));
    const answers = (await through([long, long, long, Buffer.from(`\n${line}\n`)])).trimEnd().split('\n');
    expect(answers[0]).toContain(`more than ${longestRequest} characters`);
    expect(answers[1]).toContain('"bound":7.75');
    expect(answers).toHaveLength(2);
  });

  it('is answered line by line, before more of it comes', async () => {
    const taken: string[] = [];
    const text = (async function* () {
      await Promise.resolve();
      yield Buffer.from(`${line}\n`);
      taken.push('first answered');
      yield Buffer.from(`${line}\n`);
    })();
    const answers = answersOf(text);
    await answers.next();
    expect(taken).toEqual([]);
    await answers.next();
    expect(taken).toEqual(['first answered']);
  });
});
