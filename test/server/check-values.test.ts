import { spawnSync } from 'node:child_process';
import { mkdtempSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

const program = fileURLToPath(new URL('../../.build/test/check-values/main.js', import.meta.url));
const reference = fileURLToPath(new URL('../reference/', import.meta.url));
let folder: string;

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'vouchline-check-'));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

function check(...files: readonly string[]): { code: number | null; out: string } {
  const { status, stdout, stderr } = spawnSync(process.execPath, [program, ...files], { encoding: 'utf8' });
  return { code: status, out: stdout + stderr };
}

function file(name: string, content: unknown): string {
  const path = join(folder, name);
  writeFileSync(path, typeof content === 'string' ? content : JSON.stringify(content));
  return path;
}

/** One row of the grid by others that the name says. */
const grid = (bound: number, quantity = 'exact (Clopper-Pearson) one-sided bound on a binomial proportion'): object => ({
  quantity,
  columns: ['n', 'nonconforming', 'confidence', 'side', 'bound'],
  rows: [[1, 0, 0.9, 'upper', bound]],
});

describe('check-values', () => {
  it('finds every row of the reference in order, and exits 0', () => {
    const files = readdirSync(reference).filter((name) => name.endsWith('.json'));
    const { code, out } = check(...files.map((name) => join(reference, name)));
    expect(code).toBe(0);
    const lines = out.split('\n').filter((line) => !line.startsWith(' ') && line !== '');
    expect(lines).toHaveLength(files.length);
    for (const line of lines) {
      const [, rows, evaluated] = /rows (\d+), evaluated (\d+), worst relative error \S+, beyond tolerance 0/.exec(line) ?? [];
      expect(Number(rows)).toBeGreaterThan(0);
      expect(evaluated).toBe(rows);
    }
  });

  it('exits 0 for a right row of its own', () => {
    const { code, out } = check(file('right.json', grid(0.9)));
    expect(out).toContain('rows 1, evaluated 1');
    expect(code).toBe(0);
  });

  it('exits 1 for a row that is off, and names it with what it found', () => {
    const { code, out } = check(file('off.json', grid(0.9000001)));
    expect(out).toContain('beyond tolerance 1');
    expect(out).toMatch(/beyond: .*found 0\.(9|89999)/);
    expect(code).toBe(1);
  });

  it('exits 1 for a quantity that nothing evaluates', () => {
    const { code, out } = check(file('unknown.json', grid(0.9, 'weight of a bound')));
    expect(out).toContain('rows 1, evaluated 0');
    expect(out).toContain('nothing evaluates');
    expect(code).toBe(1);
  });

  it.each([
    ['a function of a vector', [{ fn: 'no_such_function', inputs: {}, output: '1' }]],
    ['a published quantity', [{ quantity: 'no such quantity', inputs: {}, value_text: '1.00' }]],
  ])('exits 1 for %s that nothing evaluates', (_, rows) => {
    expect(check(file('listed.json', rows)).code).toBe(1);
  });

  it('exits 1 for a file that is none, and still checks the others', () => {
    const { code, out } = check(file('broken.json', '{'), file('whole.json', grid(0.9)), join(folder, 'absent.json'));
    expect(out).toContain('whole.json: rows 1, evaluated 1');
    expect(out).toContain('broken.json');
    expect(out).toContain('absent.json');
    expect(code).toBe(1);
  });

  it('exits 1 without files', () => {
    expect(check().code).toBe(1);
  });
});
