import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { Served } from '../../server/serve.ts';
import { leakPlant, verdictPart } from './plants.ts';
import { dataDirectory, liveTalk, servedOn, sourceTalk, tokenFor } from './serving.ts';

const monday = Date.UTC(2026, 5, 1, 6);
let data: ReturnType<typeof dataDirectory>;
let served: Served;
let token: string;

beforeEach(async () => {
  data = dataDirectory(leakPlant);
  token = await tokenFor(data.path, 'leak-tester', ['A.leak-test']);
  served = await servedOn(data.path);
});
afterEach(async () => {
  await served.stop('test over');
  data.remove();
});

const records = (first: number, ...parts: object[]): object => ({ type: 'records', first, parts });

describe('a server', () => {
  it('welcomes a source, acknowledges what is durable, and tells it after a restart where to go on', async () => {
    const source = sourceTalk(served.address, token);
    expect(await source.next()).toMatchObject({ type: 'welcome', source: 'leak-tester', next: 1 });
    source.send(records(1, verdictPart(1000, [], monday)));
    expect(await source.next()).toEqual({ type: 'ack', next: 1001 });
    await served.stop('restart');
    expect(await source.next()).toMatchObject({ type: 'stopping', reason: 'restart' });
    served = await servedOn(data.path);
    const again = sourceTalk(served.address, token);
    expect(await again.next()).toMatchObject({ type: 'welcome', next: 1001 });
    again.send(records(501, verdictPart(1000, [600], monday + 500_000)));
    expect(await again.next()).toEqual({ type: 'ack', next: 1501 });
    const live = liveTalk(served.address);
    expect(await live.next()).toMatchObject({ type: 'snapshot', views: [{ id: 'leak-A', state: 'demonstrated', figures: { inspected: 1000, nonconforming: 1 } }] });
  });

  it('refuses a source without a token, with a wrong one, and for a station that is not its own', async () => {
    expect((await sourceTalk(served.address, 'vouchline_nobody').closed).code).toBe(1006);
    const source = sourceTalk(served.address, token);
    await source.next();
    source.send(records(1, verdictPart(1, [], monday, { station: 'A.paint' })));
    expect(await source.next()).toMatchObject({ type: 'refused', code: 'station-not-allowed', field: 'parts[0].station', next: 1 });
    source.send(records(1, verdictPart(1, [], monday)));
    expect(await source.next()).toEqual({ type: 'ack', next: 2 });
  });

  it('answers a bad frame with its field and keeps the connection', async () => {
    const source = sourceTalk(served.address, token);
    await source.next();
    source.socket.send('{"type":"records","first":1,"parts":[{"kind":"verdicts"}]}');
    expect(await source.next()).toMatchObject({ type: 'refused', code: 'missing-field' });
    source.socket.send(Uint8Array.of(1, 2, 3));
    expect(await source.next()).toMatchObject({ type: 'refused' });
    source.send(records(3, verdictPart(1, [], monday)));
    expect(await source.next()).toMatchObject({ type: 'refused', code: 'sequence-gap', expected: '1', next: 1 });
    source.send(records(1, verdictPart(1, [], monday)));
    expect(await source.next()).toEqual({ type: 'ack', next: 2 });
  });

  it('ends the older connection of a source that connects twice', async () => {
    const older = sourceTalk(served.address, token);
    await older.next();
    const newer = sourceTalk(served.address, token);
    expect(await older.next()).toMatchObject({ type: 'refused', code: 'replaced' });
    expect((await older.closed).code).toBe(4001);
    expect(await newer.next()).toMatchObject({ type: 'welcome' });
  });

  it('shows a crossing on a dashboard, takes the acknowledgement, and shows its return', async () => {
    const live = liveTalk(served.address);
    await live.until((message) => message.type === 'snapshot');
    const source = sourceTalk(served.address, token);
    await source.next();
    source.send(records(1, verdictPart(1000, [], monday), verdictPart(10, [1, 3, 5, 7, 9], monday + 1_000_000)));
    const raised = await live.until((message) => message.type === 'change' && message.alarms.length > 0);
    expect(raised).toMatchObject({ alarms: [{ id: 1, guarantee: 'leak-A', rule: 'crossing', state: { kind: 'raised' } }] });
    const answer = await fetch(`${served.address}/api/alarms/1/acknowledge`, { method: 'POST', headers: { 'content-type': 'application/json' }, body: JSON.stringify({ by: 'Mette', note: 'seal' }) });
    expect(await answer.json()).toEqual({ acknowledged: 1 });
    expect(await live.until((message) => message.type === 'change' && message.alarms.length > 0)).toMatchObject({ alarms: [{ state: { kind: 'acknowledged', acknowledgement: { by: 'Mette' } } }] });
    source.send(records(1011, verdictPart(1200, [], monday + 1_010_000)));
    expect(await live.until((message) => message.type === 'change' && message.alarms.length > 0)).toMatchObject({ alarms: [{ state: { kind: 'ended' } }] });
    const events = (await (await fetch(`${served.address}/api/events?sort=alarm`)).json()) as unknown;
    expect(events).toMatchObject({ message: expect.stringContaining('sort') as string });
  });

  it('lets a dashboard that comes back resume with what changed, and starts anew after a restart', async () => {
    const live = liveTalk(served.address);
    const snapshot = await live.next();
    if (snapshot.type !== 'snapshot') throw new Error('a snapshot comes first');
    live.socket.close();
    const source = sourceTalk(served.address, token);
    await source.next();
    source.send(records(1, verdictPart(10, [], monday)));
    await source.next();
    const back = liveTalk(served.address);
    back.socket.removeAllListeners('open');
    back.socket.on('open', () => back.send({ type: 'watch', boot: snapshot.boot, revision: snapshot.revision }));
    expect(await back.next()).toMatchObject({ type: 'change', views: [{ id: 'leak-A', figures: { inspected: 10 } }] });
  });

  it('takes up a changed plant file on reload and keeps the old one when the new one is not valid', async () => {
    const { writeFileSync } = await import('node:fs');
    writeFileSync(`${data.path}/plant.yaml`, leakPlant.replace('1 %', 'one percent'));
    expect((await served.reload())[0]).toMatch(/plant\.yaml:\d+:\d+: guarantees\[0\]\.at-most .*one percent/);
    const live = liveTalk(served.address);
    expect(await live.next()).toMatchObject({ type: 'snapshot', cards: [{ guaranteeLine: 0.01 }] });
    writeFileSync(`${data.path}/plant.yaml`, leakPlant.replace('1 %', '2 %'));
    expect(await served.reload()).toEqual([]);
    expect(await live.until((message) => message.type === 'snapshot')).toMatchObject({ cards: [{ guaranteeLine: 0.02 }] });
  });

  it('tells operators how it is', async () => {
    expect(await (await fetch(`${served.address}/healthz`)).json()).toEqual({ status: 'ok' });
    expect(await (await fetch(`${served.address}/readyz`)).json()).toEqual({ status: 'ready' });
    const metrics = await fetch(`${served.address}/metrics`);
    expect(metrics.headers.get('content-type')).toMatch(/^application\/openmetrics-text/);
    const text = await metrics.text();
    expect(text).toMatch(/^vouchline_guarantees\{state="gathering"\} 1$/m);
    expect(text.trimEnd().endsWith('# EOF')).toBe(true);
  });
});
