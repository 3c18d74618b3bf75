import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { normalQuantileOfTail } from '../../../core/numerics/normal.ts';
import { vouchline } from '../built-program.ts';

let folder: string;
let steady: string;
let skewed: string;

/** A sample that is as normal, or as skewed, as its size allows: the quantiles themselves. */
const shares = Array.from({ length: 200 }, (_, i) => (i + 0.5) / 200);
const column = (values: readonly number[]): string => `unit,force\n${values.map((value, i) => `${i},${value.toFixed(4)}`).join('\n')}\n`;

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'vouchline-bound-'));
  steady = file('steady.csv', column(shares.map((share) => 2000 + 50 * normalQuantileOfTail(share))));
  skewed = file('skewed.csv', column(shares.map((share) => 2000 + 50 * Math.log(share))));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

function file(name: string, text: string): string {
  const path = join(folder, name);
  writeFileSync(path, text);
  return path;
}

const bound = (...args: readonly string[]) => vouchline(['bound', ...args]);
const inJson = (...args: readonly string[]): Record<string, unknown> => JSON.parse(bound(...args, '--json').out) as Record<string, unknown>;

describe('vouchline bound, for people', () => {
  it('says bound, line, assumption, look rule, source and the second computation', () => {
    const { code, out, err } = bound('nonconforming-fraction', '--n', '20000', '--nonconforming', '1', '--confidence', '95 %', '--line', '200 ppm');
    expect(err).toBe('');
    expect(code).toBe(0);
    expect(out).toContain('1 of 20 000 units nonconforming: at 95 % confidence the nonconforming fraction is at most 237.2 ppm (0.02372 %, 1 in 4216).');
    expect(out).toContain('Guarantee line 200 ppm (at most): not demonstrated');
    expect(out).toMatch(/^Assumes +The units of the window/m);
    expect(out).toMatch(/^Looks +Valid at one look fixed in advance/m);
    expect(out).toMatch(/^Source +C. J. Clopper/m);
    expect(out).toMatch(/^Check +Computed a second time by jstat.*the two agree/m);
  });

  it('gives the same figure as a batch, in JSON', () => {
    const batch = vouchline(['bound', '--batch'], '{"quantity":"nonconforming-fraction","n":20000,"nonconforming":1,"confidence":0.999,"side":"lower"}\n').out;
    const one = inJson('nonconforming-fraction', '--n', '20000', '--nonconforming', '1', '--confidence', '99.9 %', '--side', 'lower');
    expect({ bound: one['bound'] }).toEqual(JSON.parse(batch));
    expect(one).toMatchObject({ side: 'lower', tail: 0.001, confidence: '99.9 %', method: 'exact binomial bound', secondComputation: { agrees: true } });
  });

  it('holds at all looks where it is asked to, and says so', () => {
    const run = inJson('nonconforming-fraction', '--n', '20000', '--nonconforming', '1', '--confidence', '95 %', '--looks', 'all', '--line', '200 ppm');
    const once = inJson('nonconforming-fraction', '--n', '20000', '--nonconforming', '1', '--confidence', '95 %');
    expect(Number(run['bound'])).toBeGreaterThan(Number(once['bound']));
    expect(run['looks']).toContain('all looks');
    expect(run['method']).toBe('beta-mixture bound of a run');
  });

  it.each([
    ['demonstrated', ['yield', '--n', '5000', '--nonconforming', '41', '--line', '98.5 %']],
    ['not demonstrated', ['yield', '--n', '5000', '--nonconforming', '71', '--line', '98.5 %']],
    ['violated', ['yield', '--n', '5000', '--nonconforming', '110', '--side', 'upper', '--line', '98.5 %']],
    ['not shown violated', ['nonconforming-fraction', '--n', '5000', '--nonconforming', '1', '--side', 'lower', '--line', '200 ppm']],
    ['demonstrated', ['rate', '--count', '3', '--exposure', '1200', '--unit', 'm', '--line', '2 per 100 m']],
    ['demonstrated', ['finite-lot', '--lot-size', '500', '--n', '160', '--nonconforming', '0', '--line', '2 %']],
    ['demonstrated', ['mean', '--n', '50', '--mean', '1002', '--sd', '3', '--side', 'lower', '--line', '1000']],
    ['not demonstrated', ['mean', '--n', '50', '--mean', '1002', '--sd', '3', '--side', 'upper', '--line', '1000']],
  ])('finds a line %s by %j', (verdict, args) => {
    expect(bound(...args, '--confidence', '95 %').out).toMatch(new RegExp(`^Guarantee line .*: ${verdict}[.;]`, 'm'));
  });

  it('refuses the normal approximation, with what it would have said', () => {
    const { code, out, err } = bound('nonconforming-fraction', '--n', '20000', '--nonconforming', '0', '--confidence', '95 %', '--method', 'normal');
    expect({ code, out }).toEqual({ code: 2, out: '' });
    expect(err).toContain('--method normal is refused: 0 of 20000 units are of the scarcer kind');
    expect(err).toContain('It would say 0 ppm; the exact bound is 149.8 ppm');
  });

  it('shows where a known standard deviation is known from, or that nobody said', () => {
    const known = ['mean', '--n', '25', '--mean', '1002', '--sigma', '3', '--side', 'lower', '--confidence', '95 %'];
    expect(bound(...known, '--sigma-source', 'capability study of the filler, 2025').out).toMatch(/The standard deviation is known from: capability study of the filler, 2025\.$/m);
    expect(bound(...known).out).toContain('Nobody said where the standard deviation is known from');
  });

  it('takes the stations of a chain', () => {
    expect(bound('chained-yield', '--station', 'crimp=3/12000', '--station', 'leak=1/11997', '--confidence', '95 %').out).toContain('crimp 3 of 12 000, leak 1 of 11 997: at 95 % confidence the chained yield is at least 99.9237 %.');
  });
});

describe('vouchline bound, from a column', () => {
  it('bounds the mean and shows the check of the normal model', () => {
    const { out, code } = bound('mean', '--csv', steady, '--column', 'force', '--side', 'lower', '--confidence', '95 %', '--unit', 'N');
    expect(code).toBe(0);
    expect(out).toMatch(/^200 measurements, mean 2000, standard deviation 49\.\d+: at 95 % confidence the mean is at least 1994\.\d+ N\.$/m);
    expect(out).toContain('Nothing speaks against the normal model (Anderson–Darling');
    expect(out).not.toContain('skewed');
  });

  it('warns where skewness stands against the bound, and only there', () => {
    const against = bound('mean', '--csv', skewed, '--column', 'force', '--side', 'lower', '--confidence', '95 %').out;
    expect(against).toContain('skewed against the bound');
    expect(bound('mean', '--csv', skewed, '--column', 'force', '--side', 'upper', '--confidence', '95 %').out).not.toContain('skewed');
  });

  it('models the fraction beyond a limit where the model fits', () => {
    const { out, code } = bound('fraction-beyond-limit', '--csv', steady, '--column', 'force', '--lsl', '1850', '--confidence', '95 %');
    expect(code).toBe(0);
    expect(out).toContain('normal-model bound');
  });

  it('refuses the model where it does not, and counts instead', () => {
    const { out, err, code } = bound('fraction-beyond-limit', '--csv', skewed, '--column', 'force', '--lsl', '1850', '--confidence', '95 %');
    expect(code).toBe(1);
    expect(err).toMatch(/^The normal model is refused\. .*Counted instead\.$/m);
    expect(out).toMatch(/^10 of 200 measurements beyond the LSL 1850: at 95 % confidence the fraction beyond the limit is at most 8\.\d+ %/m);
    expect(out).toContain('exact binomial bound');
    expect(bound('fraction-beyond-limit', '--csv', skewed, '--column', 'force', '--lsl', '1850', '--confidence', '95 %', '--method', 'counted').code).toBe(0);
  });

  it.each([
    ['an empty cell', 'force\n1\n""\n3\n', 'line 3, column force: ""; expected a number'],
    ['a decimal comma', 'force\n"1,5"\n', 'line 2, column force: "1,5"; expected a number, with a point for decimals'],
    ['a row too short', 'unit,force\n1,2\n3\n', 'line 3'],
    ['no rows', 'force\n', 'no values'],
    ['another column', 'pull\n1\n', 'no column "force"; the header line has "pull"'],
    ['the column twice', 'force,force\n1,2\n', 'more than one column "force"'],
  ])('names %s and leaves no value out', (_, text, complaint) => {
    const { code, out, err } = bound('mean', '--csv', file('bad.csv', text), '--column', 'force', '--side', 'lower', '--confidence', '95 %');
    expect({ code, out }).toEqual({ code: 2, out: '' });
    expect(err).toContain(complaint);
  });
});

describe('vouchline bound names the option, what it held and what was expected', () => {
  const sample = ['nonconforming-fraction', '--n', '20', '--nonconforming', '1'];
  it.each([
    [[...sample], '--confidence is missing; expected a confidence level'],
    [[...sample, '--confidence', '95'], '--confidence: "95"; expected a confidence level'],
    [[...sample, '--confidence', '95 %', '--side', 'both'], '--side: "both"; expected lower or upper'],
    [[...sample, '--confidence', '95 %', '--line', '2 percent'], '--line: "2 percent"; expected a share'],
    [[...sample, '--confidence', '95 %', '--looks', 'all'], '--line is (missing), expected a number'],
    [[...sample, '--confidence', '95 %', '--method', 'guess'], '--method: "guess"; expected one of exact, mid-p, wilson, jeffreys'],
    [['nonconforming-fraction', '--n', '1,000', '--nonconforming', '1', '--confidence', '95 %'], '--n: "1,000"; expected a number'],
    [['nonconforming-fraction', '--n', '2', '--nonconforming', '3', '--confidence', '95 %'], '--nonconforming is 3, expected a whole number, from 0 to 2'],
    [['finite-lot', '--lot-size', '2', '--n', '3', '--nonconforming', '0', '--confidence', '95 %'], '--n is 3, expected a whole number, from 1 to 2'],
    [['mean', '--n', '5', '--mean', '1', '--sd', '1', '--confidence', '95 %'], '--side is missing'],
    [['mean', '--csv', 'no-such.csv', '--column', 'x', '--side', 'lower', '--confidence', '95 %'], '--csv: "no-such.csv"; expected a file that can be read'],
    [['mean', '--column', 'x', '--side', 'lower', '--confidence', '95 %'], '--csv is missing'],
    [['fraction-beyond-limit', '--n', '5', '--lsl', '1', '--usl', '2', '--confidence', '95 %'], '--lsl and --usl: one limit at a time'],
    [['fraction-beyond-limit', '--n', '5', '--k', '1', '--mean', '2', '--confidence', '95 %'], '--k and --mean: give the figure itself'],
    [['capability', '--n', '5', '--mean', '2', '--sd', '0', '--usl', '3', '--confidence', '95 %'], '--sd: 0; expected measurements that differ'],
    [['chained-yield', '--station', 'crimp=3of4', '--confidence', '95 %'], '--station: "crimp=3of4"; expected NAME=NONCONFORMING/INSPECTED'],
    [['nonconforming-fraction', '--bogus'], "unknown option '--bogus'"],
    [[], 'bound: expected a quantity'],
  ])('%j', (args, complaint) => {
    const { code, out, err } = bound(...args);
    expect(err).toContain(complaint);
    expect({ code, out }).toEqual({ code: 2, out: '' });
  });
});

it('the help of every quantity can be read, and ends in order', () => {
  const { out, code } = bound('--help');
  expect(code).toBe(0);
  expect(out).toContain('Exit codes: 0 answered');
  const names = [...out.matchAll(/^ {2}([a-z-]+) \[options\]/gm)].map(([, name]) => name);
  expect(names).toHaveLength(14);
  expect(bound('fraction-beyond-limit', '--help').out).toContain('--lsl <number>');
});
