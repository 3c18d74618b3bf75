import { connect } from 'node:net';
import { afterEach, expect, it } from 'vitest';
import { connectedSource, endAll, eventually, heard, ServerProcess } from '../../faults/harness.ts';
import { leakPlant, verdictPart } from '../plants.ts';
import { dataDirectory, tokenFor } from '../serving.ts';

afterEach(endAll);

const row = (i: number): string => `${JSON.stringify({ time: 1_764_547_200_000 + i * 1_000, station: 'A.leak-test', product: 'BH-4', characteristic: 'tightness', verdict: 'conforming' })}\n`;
const rows = (to: number): string => Array.from({ length: to }, (_, i) => row(i + 1)).join('');

it.each([{ others: false }, { others: true }])('an upload cut off by the end of the server knows what was its own (other records came since: $others)', async ({ others }) => {
  const data = dataDirectory(leakPlant);
  try {
    const token = await tokenFor(data.path, 'tester', ['A.leak-test']);
    let server = ServerProcess.start(data.path);
    let address = await server.address;
    const post = async (body: string): Promise<{ status: number; body: object }> => {
      const headers = { authorization: `Bearer ${token}`, 'content-type': 'application/x-ndjson', 'idempotency-key': '"k"' };
      const answer = await fetch(`${address}/source/records`, { method: 'POST', headers, body });
      return { status: answer.status, body: (await answer.json()) as object };
    };
    const { host, hostname, port } = new URL(address);
    const socket = connect(Number(port), hostname).on('error', () => undefined);
    const text = rows(10);
    socket.write(`POST /source/records HTTP/1.1\r\nHost: ${host}\r\nAuthorization: Bearer ${token}\r\nContent-Type: application/x-ndjson\r\nIdempotency-Key: "k"\r\nContent-Length: 100000\r\n\r\n${text}`);
    await eventually('ten records are taken', async () => (/^vouchline_records_total 10$/m.test(await (await fetch(`${address}/metrics`)).text()) ? true : undefined));
    await eventually('they are durable', async () => (/^vouchline_waiting_bytes 0$/m.test(await (await fetch(`${address}/metrics`)).text()) ? true : undefined));
    await server.kill();
    server = ServerProcess.start(data.path);
    address = await server.address;
    if (others) {
      const { talk, next } = await connectedSource(address, token);
      expect(next).toBe(11);
      talk.send({ type: 'records', first: 11, parts: [verdictPart(3, [], 1_764_547_300_000)] });
      expect(await heard(talk)).toMatchObject({ type: 'ack', next: 14 });
      talk.socket.close();
      await talk.closed;
    }
    const answer = await eventually('the source is free', async () => {
      const one = await post(rows(12));
      return 'code' in one.body && one.body.code === 'busy' ? undefined : one;
    });
    expect(answer).toMatchObject(others ? { status: 409, body: { code: 'superseded', taken: 0, repeated: 10, next: 14 } } : { status: 200, body: { taken: 2, repeated: 10, next: 13 } });
    await server.kill();
  } finally {
    data.remove();
  }
});
