import { connect } from 'node:net';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { Served } from '../../../server/serve.ts';
import { leakPlant } from '../plants.ts';
import { dataDirectory, servedOn, sourceTalk, tokenFor } from '../serving.ts';

let data: ReturnType<typeof dataDirectory>;
let server: Served;
let token: string;

beforeEach(async () => {
  data = dataDirectory(leakPlant);
  token = await tokenFor(data.path, 'tester', ['A.leak-test']);
  server = await servedOn(data.path);
});
afterEach(async () => {
  await server.stop('the test is over');
  data.remove();
});

const row = (i: number, more: object = {}): string =>
  `${JSON.stringify({ time: 1_764_547_200_000 + i * 1_000, station: 'A.leak-test', product: 'BH-4', characteristic: 'tightness', verdict: 'conforming', ...more })}\n`;
const rows = (from: number, to: number, sequences = false): string =>
  Array.from({ length: to - from + 1 }, (_, i) => row(from + i, sequences ? { sequence: from + i } : {})).join('');

interface Answer {
  readonly status: number;
  readonly body: Readonly<Record<string, unknown>>;
}

async function post(body: string, headers: Readonly<Record<string, string>> = {}): Promise<Answer> {
  const answer = await fetch(`${server.address}/source/records`, {
    method: 'POST', body, headers: { authorization: `Bearer ${token}`, 'content-type': 'application/x-ndjson', ...headers },
  });
  return { status: answer.status, body: (await answer.json()) as Answer['body'] };
}

describe('rows with sequences', () => {
  it('are taken, and counted once when they are sent again', async () => {
    expect(await post(rows(1, 500, true))).toEqual({ status: 200, body: { next: 501, taken: 500, repeated: 0, setAside: [] } });
    expect(await post(rows(1, 600, true))).toEqual({ status: 200, body: { next: 601, taken: 100, repeated: 500, setAside: [] } });
  });

  it('are a CSV as well', async () => {
    const csv = `sequence,time,station,product,characteristic,verdict\n1,2025-12-01T00:00:00Z,A.leak-test,BH-4,tightness,nonconforming\n`;
    expect(await post(csv, { 'content-type': 'text/csv; charset=utf-8' })).toMatchObject({ status: 200, body: { next: 2, taken: 1 } });
  });

  it('stop at a bad one, which is named; those before it stand', async () => {
    const bad = rows(1, 3, true) + row(4, { sequence: 4, verdict: 'maybe' }) + rows(5, 9, true);
    expect(await post(bad)).toMatchObject({ status: 400, body: { code: 'out-of-range', line: 4, field: 'verdict', value: '"maybe"', expected: 'conforming or nonconforming', taken: 3, next: 4 } });
    expect(await post(rows(1, 9, true))).toMatchObject({ status: 200, body: { taken: 6, repeated: 3 } });
  });

  it('may not leave any out', async () => {
    expect(await post(rows(1, 3, true) + rows(7, 9, true))).toMatchObject({ status: 409, body: { code: 'sequence-gap', line: 4, value: 7, expected: 4, taken: 3 } });
  });

  it('keep what the source may not send for, and what the plant does not know, apart', async () => {
    expect(await post(row(1, { station: 'B.leak-test' }), { 'idempotency-key': '"a"' })).toMatchObject({ status: 403, body: { code: 'station-not-allowed', field: 'station', line: 1 } });
    expect(await post(row(1, { sequence: 1, product: 'BH-9' }))).toMatchObject({ status: 200, body: { taken: 1, setAside: [{ sequence: 1, records: 1, code: 'unknown-product' }] } });
  });

  it('fill what was declared lost, once, and are cut out of their neighbours for that', async () => {
    const lost = JSON.stringify({ sequence: 3, time: 1_764_547_203_000, event: 'lost', station: 'A.leak-test', records: 4, reason: 'overrun' });
    const text = `${rows(1, 2, true)}${lost}\n${rows(7, 9, true)}`;
    expect(await post(text)).toMatchObject({ status: 200, body: { taken: 9, next: 10 } });
    expect(await post(text)).toMatchObject({ status: 200, body: { taken: 0, repeated: 9 } });
    expect(await post(rows(1, 12, true))).toMatchObject({ status: 200, body: { taken: 7, repeated: 5, next: 13 } });
    expect(await post(rows(1, 12, true))).toMatchObject({ status: 200, body: { taken: 0, repeated: 12 } });
  });
});

describe('rows without sequences', () => {
  const key = { 'idempotency-key': '"5a3c"' };

  it('need a key', async () => {
    expect(await post(rows(1, 3))).toMatchObject({ status: 400, body: { code: 'idempotency-key-missing', taken: 0 } });
  });

  it('are counted once under one key, also after a restart, and anew under another', async () => {
    expect(await post(rows(1, 20), key)).toMatchObject({ status: 200, body: { taken: 20, next: 21 } });
    expect(await post(rows(1, 20), key)).toMatchObject({ status: 200, body: { taken: 0, repeated: 20, next: 21 } });
    expect(await post(rows(1, 20), { 'idempotency-key': '"other"' })).toMatchObject({ status: 200, body: { taken: 20, next: 41 } });
    await server.stop('restart');
    server = await servedOn(data.path);
    expect(await post(rows(1, 20), key)).toMatchObject({ status: 200, body: { taken: 0, repeated: 20, next: 41 } });
  });

  it('go on after the last that was taken, as long as nothing came in between', async () => {
    expect(await post(rows(1, 5) + row(6, { verdict: 'maybe' }), key)).toMatchObject({ status: 400, body: { taken: 5, line: 6 } });
    expect(await post(rows(1, 8), key)).toMatchObject({ status: 200, body: { taken: 3, repeated: 5, next: 9 } });
    expect(await post(rows(9, 9, true))).toMatchObject({ status: 200 });
    expect(await post(rows(1, 8), key)).toMatchObject({ status: 200, body: { taken: 0, repeated: 8, next: 10 } });
    expect(await post(rows(1, 9), key)).toMatchObject({ status: 409, body: { code: 'superseded', taken: 0, repeated: 8, next: 10 } });
  });

  it('are not others under the same key', async () => {
    await post(rows(1, 5), key);
    expect(await post(rows(2, 5), key)).toMatchObject({ status: 422, body: { code: 'idempotency-key-reused', next: 6 } });
  });
});

/** A request whose body goes on as the test says. */
function slowPost(headers: string): { readonly write: (text: string) => void; readonly answer: Promise<string>; readonly drop: () => void } {
  const { host, hostname, port } = new URL(server.address);
  const socket = connect(Number(port), hostname);
  socket.write(`POST /source/records HTTP/1.1\r\nHost: ${host}\r\nAuthorization: Bearer ${token}\r\nContent-Type: application/x-ndjson\r\nTransfer-Encoding: chunked\r\n${headers}\r\n`);
  let said = '';
  const answer = new Promise<string>((resolve) => {
    socket.on('data', (piece) => {
      said += piece.toString();
      if (/\r\n\r\n.*\}/s.test(said)) resolve(said);
    });
    socket.on('close', () => resolve(said));
  });
  socket.on('error', () => undefined);
  const write = (text: string): void => void socket.write(`${Buffer.byteLength(text).toString(16)}\r\n${text}\r\n`);
  return { write, answer, drop: () => socket.destroy() };
}

/** Waits until the server has read so many records. */
async function recordsRead(records: number): Promise<void> {
  for (;;) {
    const metrics = await (await fetch(`${server.address}/metrics`)).text();
    if (Number(/^vouchline_records_total (\d+)/m.exec(metrics)?.[1] ?? 0) >= records) return;
  }
}

/** The answer to a request that is sent again while another of the source runs. */
async function postWhenFree(body: string, headers: Readonly<Record<string, string>>): Promise<Answer> {
  for (;;) {
    const answer = await post(body, headers);
    if (answer.body['code'] !== 'busy') return answer;
  }
}

describe('an upload', () => {
  const key = { 'idempotency-key': '"k"' };
  const keyed = 'Idempotency-Key: "k"\r\n';

  it('is the only one of its source', async () => {
    const slow = slowPost('');
    slow.write(rows(1, 2, true));
    await recordsRead(2);
    expect(await post(rows(3, 3, true))).toMatchObject({ status: 409, body: { code: 'busy' } });
    slow.write(rows(3, 4, true));
    slow.write('');
    expect(await slow.answer).toMatch(/^HTTP\/1.1 200 .*"next":5,"taken":4/s);
  });

  it('ends when the source connects, whose records then are its own', async () => {
    const slow = slowPost(keyed);
    slow.write(rows(1, 10));
    await recordsRead(10);
    const talk = sourceTalk(server.address, token);
    expect(await slow.answer).toMatch(/^HTTP\/1.1 409 .*"code":"replaced"/s);
    expect(await talk.next()).toMatchObject({ type: 'welcome', next: 11 });
    expect(await post(rows(1, 10), key)).toMatchObject({ status: 409, body: { code: 'busy' } });
    talk.send({ type: 'records', first: 11, parts: [{ kind: 'verdicts', station: 'A.leak-test', product: 'BH-4', characteristic: 'tightness', units: 3, nonconforming: [], time: 1_764_547_300_000 }] });
    expect(await talk.next()).toMatchObject({ type: 'ack', next: 14 });
    talk.socket.close();
    await talk.closed;
    expect(await postWhenFree(rows(1, 12), key)).toMatchObject({ status: 409, body: { code: 'superseded', taken: 0, repeated: 10, next: 14 } });
  });

  it('that breaks off leaves what was on disk, and goes on under its key', async () => {
    const slow = slowPost(keyed);
    slow.write(rows(1, 10));
    await recordsRead(10);
    slow.drop();
    expect(await postWhenFree(rows(1, 30), key)).toMatchObject({ status: 200, body: { next: 31, taken: 20, repeated: 10 } });
  });

  it('is told when the server stops', async () => {
    const slow = slowPost('');
    slow.write(rows(1, 2, true));
    await recordsRead(2);
    await server.stop('over');
    expect(await slow.answer).toMatch(/^HTTP\/1.1 503 .*"code":"stopping"/s);
  });

  it.each([
    [401, 'token-missing', { authorization: '' }],
    [401, 'token-unknown', { authorization: 'Bearer nobody' }],
    [400, 'idempotency-key-malformed', { 'idempotency-key': 'two words' }],
  ])('is refused: %i %s', async (status, code, headers) => {
    expect(await post(rows(1, 1, true), headers)).toMatchObject({ status, body: { code } });
  });

  it('may be larger than any other request', async () => {
    expect(await post(rows(1, 20_000, true))).toMatchObject({ status: 200, body: { taken: 20_000 } });
  });
});
