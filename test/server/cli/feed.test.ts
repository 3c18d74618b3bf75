import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, afterEach, beforeEach, describe, expect, it } from 'vitest';
import { endAll, eventually, ServerProcess } from '../../faults/harness.ts';
import { leakPlant } from '../plants.ts';
import { dataDirectory, tokenFor } from '../serving.ts';
import { starting, vouchline, type Said } from './run-vouchline.ts';

const folder = mkdtempSync(join(tmpdir(), 'vouchline-feed-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

let data: ReturnType<typeof dataDirectory>;
let token: string;
let server: ServerProcess;
let to: string;

beforeEach(async () => {
  data = dataDirectory(leakPlant);
  token = await tokenFor(data.path, 'tester', ['A.leak-test']);
  server = ServerProcess.start(data.path);
  to = (await server.address).replace('http', 'ws');
});
afterEach(() => {
  endAll();
  data.remove();
});

const row = (i: number, more: object = {}): string =>
  `${JSON.stringify({ time: 1_764_547_200_000 + i * 1_000, station: 'A.leak-test', product: 'BH-4', characteristic: 'tightness', verdict: 'conforming', ...more })}\n`;
const rows = (from: number, to: number, more: (i: number) => object = () => ({})): string => Array.from({ length: to - from + 1 }, (_, i) => row(from + i, more(from + i))).join('');

function file(text: string): string {
  const path = join(folder, 'rows.ndjson');
  writeFileSync(path, text);
  return path;
}

const feed = (text: string, ...more: readonly string[]): Promise<Said> => vouchline(['feed', file(text), '--to', to, '--json', ...more], { VOUCHLINE_TOKEN: token });
const sums = ({ out }: Said): unknown => JSON.parse(out);

describe('vouchline feed', () => {
  it('appends rows without sequences, and goes on with the same file where the first sequence is given', async () => {
    const first = await feed(rows(1, 300));
    expect(first).toMatchObject({ code: 0 });
    expect(sums(first)).toMatchObject({ source: 'tester', first: 1, numbered: true, next: 301, sent: 300, repeated: 0, setAside: 0 });
    const second = await feed(rows(301, 500));
    expect(sums(second)).toMatchObject({ first: 301, next: 501, sent: 200 });
    expect(second.err).toContain('The first row gets sequence 301');
    expect(sums(await feed(rows(301, 600), '--first', '301'))).toMatchObject({ first: 301, next: 601, sent: 100, repeated: 200 });
    expect(await feed(rows(1, 3), '--first', '700')).toMatchObject({ code: 2, err: expect.stringContaining('The first sequence given is 700, but the server expects 601') as string });
  });

  it('skips of rows with sequences what the server has, and needs the others in order', async () => {
    const numbered = (i: number): object => ({ sequence: i });
    expect(sums(await feed(rows(1, 50, numbered)))).toMatchObject({ numbered: false, next: 51, sent: 50 });
    expect(sums(await feed(rows(1, 80, numbered)))).toMatchObject({ next: 81, sent: 30, repeated: 50 });
    const gap = await feed(rows(81, 90, numbered) + rows(95, 99, numbered));
    expect(gap.code).toBe(2);
    expect(gap.err).toContain('rows.ndjson:11: sequence is 95; expected 91, or a lost row that spends those between.');
    expect(sums(gap)).toMatchObject({ next: 91, sent: 10 });
    expect(await feed(rows(91, 92, numbered), '--first', '91')).toMatchObject({ code: 2, err: expect.stringContaining('leave out the first sequence given, 91') as string });
  });

  it('stops at a bad row, whose line it names, after what stands before it is on disk', async () => {
    const said = await feed(rows(1, 20) + row(21, { station: 'A leak' }) + rows(22, 30));
    expect(said.code).toBe(2);
    expect(said.err).toMatch(/rows\.ndjson:21: station is "A leak"; expected an id .* \(bad-id\)/);
    expect(sums(said)).toMatchObject({ next: 21, sent: 20 });
  });

  it('says what is set aside, and that by its exit code too', async () => {
    const said = await vouchline(['feed', file(rows(1, 5) + row(6, { product: 'BH-9' })), '--to', to, '--quiet'], { VOUCHLINE_TOKEN: token });
    expect(said.code).toBe(1);
    expect(said.out).toMatch(/^tester: 6 records sent, 0 known already, 1 set aside, in .* s; first sequence 1, everything below 7 is on the server's disk\n$/);
    expect(said.err).toBe('Set aside: 1 from sequence 6: The plant has no such product or characteristic. (unknown-product)\n');
  });

  it('names the field that the server refuses, and what was sent before it', async () => {
    const said = await feed(row(1) + row(2, { station: 'B.leak-test' }), '--frame-records', '1');
    expect(said.code).toBe(2);
    expect(said.err).toContain('Refused (station-not-allowed)');
    expect(said.err).toContain('parts[0].station');
    expect(sums(said)).toMatchObject({ next: 2 });
  });

  it('sends rows as they come, and goes on by itself when the server comes back', async () => {
    await server.kill();
    const port = await freePort();
    const again = (): ServerProcess => ServerProcess.run(process.execPath, [...serveWords(data.path), '--port', String(port)]);
    server = again();
    await server.address;
    const feeding = starting(['feed', '-', '--to', `ws://127.0.0.1:${port}`, '--json'], { VOUCHLINE_TOKEN: token });
    feeding.write(rows(1, 40));
    await eventually('the first rows are taken', () => (feeding.complaint().includes('The first row gets sequence 1') ? true : undefined));
    await recordsAt(port, 40);
    await server.kill();
    feeding.write(rows(41, 60));
    await eventually('the break is told', () => (feeding.complaint().includes('The connection failed') ? true : undefined));
    server = again();
    await server.address;
    feeding.write(rows(61, 70));
    feeding.end();
    const said = await feeding.said;
    expect(said.code, said.err).toBe(0);
    expect(sums(said)).toMatchObject({ first: 1, next: 71, sent: 70 });
    expect(said.err).toContain('Connected again');
  });

  it('ends with 3 when told to stop, and says how to go on', async () => {
    const feeding = starting(['feed', '-', '--to', to, '--json'], { VOUCHLINE_TOKEN: token });
    feeding.write(rows(1, 5));
    await eventually('it is connected', () => (feeding.complaint().includes('The first row gets sequence 1') ? true : undefined));
    feeding.signal('SIGINT');
    const said = await feeding.said;
    expect(said.code).toBe(3);
    expect(said.err).toContain('To go on: the same file again, with --first 1');
  });

  it('ends with 3 when nobody answers for too long', async () => {
    const port = await freePort();
    const said = await vouchline(['feed', file(rows(1, 2)), '--to', `ws://127.0.0.1:${port}`, '--give-up-after', '1'], { VOUCHLINE_TOKEN: token });
    expect(said.code).toBe(3);
    expect(said.err).toMatch(/Gave up after 1 s without success: .*ECONNREFUSED/);
  });

  it.each([
    ['no token', [], {}, 'No token: give it as VOUCHLINE_TOKEN or --token'],
    ['a token nobody knows', ['--token', 'vl-unknown-secret'], {}, 'Refused (token-unknown)'],
    ['a token that is none', ['--token', 'two words secret'], {}, '--token: what was given is no token'],
    ['an address that is none', ['--to', 'localhost'], { VOUCHLINE_TOKEN: 'vl-unknown-secret' }, '--to: "localhost"; expected ws://host:port'],
    ['a number that is none', ['--first', '-1'], { VOUCHLINE_TOKEN: 'vl-unknown-secret' }, '--first: "-1"; expected a whole number from 1'],
  ])('ends with 2 for %s, and shows no token', async (_what, words, environment, says) => {
    const said = await vouchline(['feed', file(row(1)), '--to', to, ...words], environment);
    expect(said.code).toBe(2);
    expect(said.err).toContain(says);
    expect(said.err + said.out).not.toContain('secret');
  });
});

const serveWords = (path: string): string[] => [new URL('../../../.build/server/cli/main.js', import.meta.url).pathname, 'serve', '--data', path, '--clock', 'records', '--access', 'open', '--log-level', 'error'];

function freePort(): Promise<number> {
  return new Promise((resolve) => {
    const taken = createServer().listen(0, '127.0.0.1', () => {
      const address = taken.address();
      taken.close(() => resolve(typeof address === 'object' && address !== null ? address.port : 0));
    });
  });
}

async function recordsAt(port: number, records: number): Promise<void> {
  await eventually(`${records} records are taken`, async () => {
    const metrics = await (await fetch(`http://127.0.0.1:${port}/metrics`)).text();
    return Number(/^vouchline_records_total (\d+)/m.exec(metrics)?.[1] ?? 0) >= records ? true : undefined;
  });
}
