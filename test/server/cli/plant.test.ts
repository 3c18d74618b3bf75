import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Ajv2020 } from 'ajv/dist/2020.js';
import { parse } from 'yaml';
import { afterAll, describe, expect, it } from 'vitest';
import { vouchline } from './run-vouchline.ts';

const folder = mkdtempSync(join(tmpdir(), 'vouchline-plant-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

function file(text: string): string {
  const path = join(folder, 'plant.yaml');
  writeFileSync(path, text);
  return path;
}

describe('vouchline plant', () => {
  it('prints an example that is in order and that its schema allows', async () => {
    const { out: example } = await vouchline(['plant', 'example']);
    const { out: schema } = await vouchline(['plant', 'schema']);
    const checked = await vouchline(['plant', 'check', file(example)]);
    expect(checked.err).toBe('');
    expect(checked).toMatchObject({ code: 0, out: expect.stringMatching(/is in order \(version [0-9a-f]{16}\): lines 1, products 1, guarantees 1\n$/) as string });
    const allows = new Ajv2020({ strict: false }).compile(JSON.parse(schema) as object);
    expect(allows(parse(example)), JSON.stringify(allows.errors)).toBe(true);
  });

  it('names every fault with line and column and ends with 2', async () => {
    const { out: example } = await vouchline(['plant', 'example']);
    const path = file(example.replace('at-most: 0.2 %', 'at-most: 200 %').replace('time-zone: Europe/Copenhagen', 'time-zone: Europe/Kopenhagen'));
    const said = await vouchline(['plant', 'check', path]);
    expect(said.code).toBe(2);
    const lineOf = (text: string): number => example.split('\n').findIndex((line) => line.includes(text)) + 1;
    expect(said.err).toContain(`${path}:${lineOf('time-zone: Europe')}:14: plant.time-zone`);
    expect(said.err).toContain(`${path}:${lineOf('at-most: 0.2 %')}:14: guarantees[0].at-most`);
    const json = await vouchline(['plant', 'check', '--json', path]);
    expect(json.code).toBe(2);
    expect(JSON.parse(json.out)).toMatchObject({ sound: false, faults: [{ field: 'plant.time-zone' }, { field: 'guarantees[0].at-most' }] });
  });

  it('ends with 2 for a file that cannot be read', async () => {
    expect(await vouchline(['plant', 'check', join(folder, 'none.yaml')])).toMatchObject({ code: 2, err: expect.stringContaining('cannot be read') as string });
  });
});

describe('vouchline replay', () => {
  const row = (i: number, more: object = {}): string =>
    `${JSON.stringify({ sequence: i, time: 1_764_547_200_000 + i * 1_000, station: 'A.leak-test', product: 'BH-4', characteristic: 'tightness', verdict: 'conforming', ...more })}\n`;
  const rows = (from: number, to: number): string => Array.from({ length: to - from + 1 }, (_, i) => row(from + i)).join('');

  async function replay(text: string, ...more: readonly string[]): ReturnType<typeof vouchline> {
    const plant = file((await vouchline(['plant', 'example'])).out);
    const path = join(folder, 'week-23.ndjson');
    writeFileSync(path, text);
    return vouchline(['replay', '--plant', plant, ...more, path]);
  }

  it('begins where its file begins, names the source after it, and sums up on standard error', async () => {
    const said = await replay(rows(5_000, 6_600));
    expect(said.code, said.err).toBe(0);
    expect(JSON.parse(said.out)).toMatchObject({ kind: 'evidence', guarantee: 'leak-A', from: 'gathering', to: 'demonstrated', source: 'week-23' });
    expect(said.err).toMatch(/^1601 records, 0 of them repeated, 0 set aside/);
  });

  it('prints what happened before a bad row or a gap, which it names', async () => {
    const bad = await replay(rows(1, 1_600) + row(1_601, { verdict: 'maybe' }));
    expect(bad).toMatchObject({ code: 2, err: expect.stringContaining('week-23.ndjson:1601: verdict is "maybe"; expected conforming or nonconforming.') as string });
    expect(bad.out.split('\n')).toHaveLength(2);
    expect(await replay(rows(1, 3) + row(9))).toMatchObject({ code: 2, err: expect.stringContaining('week-23.ndjson:4: sequence is 9; expected 4') as string });
  });

  it.each([
    [['--frame-records', '0'], '--frame-records: "0"; expected a whole number from 1'],
    [['--source', 'two words'], '--source: "two words"; expected 1 to 64 letters'],
  ])('ends with 2 for %s', async (words, says) => {
    expect(await replay(row(1), ...words)).toMatchObject({ code: 2, out: '', err: expect.stringContaining(says) as string });
  });

  it('tells what may be given, with examples and exit codes', async () => {
    for (const command of ['feed', 'replay', 'plant']) {
      const { code, out } = await vouchline([command, '--help']);
      expect(code).toBe(0);
      expect(out).toContain('Examples:');
      expect(out).toContain('Exit codes: 0');
    }
  });
});
