import fc from 'fast-check';
import { afterEach, describe, expect, it } from 'vitest';
import { frameOf } from '../../../core/record/frame-of.ts';
import { noPlaces } from '../../../core/record/no-places.ts';
import type { Frame } from '../../../core/record/part.ts';
import { backoffMs } from '../../../server/feed/backoff.ts';
import { SourceClient, type ClientEvent } from '../../../server/feed/source-client.ts';
import type { SourceFailure } from '../../../server/feed/source-failure.ts';
import { fakeSourceServer, type FakeSetting, type Fate, type FakeSourceServer } from './fake-source-server.ts';

const ends: (() => Promise<void> | void)[] = [];
afterEach(async () => {
  for (const end of ends.splice(0)) await end();
});

async function server(setting: FakeSetting = {}): Promise<FakeSourceServer> {
  const fake = await fakeSourceServer(setting);
  ends.push(() => fake.stop());
  return fake;
}

function client(address: URL, giveUpMs = Infinity, onEvent?: (event: ClientEvent) => void): SourceClient {
  const made = new SourceClient({ address, token: 'secret-token', giveUpMs, backoff: { leastMs: 1, mostMs: 4 }, ...(onEvent && { onEvent }) });
  ends.push(() => made.close());
  return made;
}

const origin = { station: 'A.leak-test', product: 'BH-4', characteristic: 'tightness', lot: undefined };
const frame = (first: number, records: number): Frame =>
  frameOf(first, [{ kind: 'verdicts', origin, records, time: { kind: 'steady', start: 1_764_547_200_000, step: 250 }, nonconforming: noPlaces }]);

async function failureFrom(work: Promise<unknown>): Promise<SourceFailure> {
  return work.then(() => expect.unreachable('it succeeded'), (cause: unknown) => cause as SourceFailure);
}

describe('a source client', () => {
  it('keeps to the granted window and has everything acknowledged at the end', async () => {
    const fake = await server({ window: 3, hold: true });
    const source = client(fake.address);
    expect((await source.open()).next).toBe(1);
    const sent = (async () => {
      for (let first = 1; first <= 91; first += 10) await source.send(frame(first, 10));
      await source.settled();
    })();
    let done = false;
    void sent.then(() => (done = true));
    while (!done) {
      fake.release();
      await new Promise(setImmediate);
    }
    expect(fake.taken).toEqual(Array.from({ length: 100 }, (_, i) => i + 1));
    expect(fake.mostInFlight).toBe(3);
    expect(source.next).toBe(101);
    expect(source.kept).toBe(0);
  });

  it('sends every record once and in order, however the connection breaks', () =>
    fc.assert(
      fc.asyncProperty(
        fc.array(fc.integer({ min: 1, max: 5 }), { minLength: 1, maxLength: 20 }),
        fc.array(fc.constantFrom('answer' as const, 'answer' as const, 'take and break' as const, 'take one and break' as const, 'break' as const), { maxLength: 12 }),
        fc.integer({ min: 1, max: 4 }),
        async (sizes, fates, window) => {
          const fake = await fakeSourceServer({ window, fate: () => fates.pop() ?? 'answer' });
          const source = client(fake.address);
          try {
            await source.open();
            let first = 1;
            for (const records of sizes) {
              await source.send(frame(first, records));
              first += records;
            }
            await source.settled();
            expect(fake.taken).toEqual(Array.from({ length: first - 1 }, (_, i) => i + 1));
            expect(source.next).toBe(first);
          } finally {
            source.close();
            await fake.stop();
          }
        },
      ),
      { seed: 7, numRuns: 60 },
    ));

  it('sends what fills a hole until that itself is answered, though everything below the next sequence is known', async () => {
    const fates: Fate[] = [];
    const fake = await server({ fate: () => fates.shift() ?? 'answer' });
    const source = client(fake.address);
    await source.open();
    const lost = frameOf(11, [{ kind: 'lost', records: 5, at: 1, station: 'A.leak-test', reason: 'overrun' }]);
    fates.push('answer', 'answer', 'answer', 'break', 'take and break', 'answer');
    for (const one of [frame(1, 10), lost, frame(16, 5), frame(11, 5), frame(21, 5)]) await source.send(one);
    await source.settled();
    expect(fake.taken.slice(20)).toEqual([11, 12, 13, 14, 15, 21, 22, 23, 24, 25]);
    expect(fake.ledger.holes).toEqual([]);
    expect(fake.connections).toBe(3);
  });

  it('tells of the break and of the new greeting', async () => {
    const fates = ['take and break' as const];
    const fake = await server({ fate: () => fates.pop() ?? 'answer' });
    const told: string[] = [];
    const source = client(fake.address, Infinity, ({ kind }) => told.push(kind));
    await source.open();
    await source.send(frame(1, 5));
    await source.settled();
    expect(told).toEqual(['connected', 'broken', 'connected', 'acknowledged']);
    expect(fake.connections).toBe(2);
  });

  it('fails on a refused frame after what was sent before it is acknowledged, naming the field', async () => {
    const refused = { type: 'refused', code: 'station-not-allowed', sentence: 'No.', field: 'parts[0].station', value: '"A.leak-test"', expected: 'B.leak-test', next: 1 } as const;
    const fake = await server({ fate: ({ first }) => (first === 11 ? refused : 'answer') });
    const source = client(fake.address);
    await source.open();
    const failure = await failureFrom((async () => {
      for (const first of [1, 11, 21]) await source.send(frame(first, 10));
      await source.settled();
    })());
    expect(failure).toMatchObject({ kind: 'refused', message: 'Refused (station-not-allowed): No. parts[0].station is "A.leak-test"; expected B.leak-test.' });
    expect(source.next).toBe(11);
    expect(fake.connections).toBe(1);
  });

  it.each([
    { status: 401, code: 'token-unknown', says: 'Refused (token-unknown): The token is not known, or was withdrawn.' },
    { status: 404, code: undefined, says: 'No source can connect at this address: it answered 404 where a WebSocket at /source was expected.' },
  ])('does not try again where that is no use: $status $code', async ({ status, code, says }) => {
    const fake = await server({ status, ...(code !== undefined && { code }) });
    const failure = await failureFrom(client(fake.address).open());
    expect(failure).toMatchObject({ kind: 'refused', message: says });
    expect(failure.message).not.toContain('secret');
  });

  it('fails where records between the server and itself are missing', async () => {
    const fake = await server();
    const source = client(fake.address);
    await source.open();
    await source.send(frame(8, 2));
    expect(await failureFrom(source.settled())).toMatchObject({ kind: 'gap' });
    expect(fake.taken).toEqual([]);
  });

  it('gives up in its time where nobody answers, and at once where told to close', async () => {
    const fake = await fakeSourceServer({});
    await fake.stop();
    expect(await failureFrom(client(fake.address, 20).open())).toMatchObject({ kind: 'gave-up' });
    const source = client(fake.address);
    const opening = failureFrom(source.open());
    source.close();
    expect(await opening).toMatchObject({ kind: 'closed' });
  });

  it('tries another connection where the server says nothing any more', async () => {
    let answers = false;
    const fake = await server({ hold: true });
    const source = new SourceClient({ address: fake.address, token: 't', giveUpMs: Infinity, backoff: { leastMs: 1, mostMs: 1 }, quietMs: 30, onEvent: ({ kind }) => (answers ||= kind === 'broken') });
    ends.push(() => source.close());
    await source.open();
    await source.send(frame(1, 5));
    while (!answers) await new Promise(setImmediate);
    while (source.kept > 0) {
      fake.release();
      await new Promise(setImmediate);
    }
    expect(fake.taken).toEqual([1, 2, 3, 4, 5]);
    expect(fake.connections).toBeGreaterThan(1);
  });
});

describe('the wait before trying again', () => {
  it.each([
    [1, 0, 250], [2, 0, 500], [3, 0.5, 750], [7, 0, 15_000], [7, 0.999_999, 7_500], [4_000, 0, 15_000],
  ])('after %i failures, chance %d: about %d ms', (failed, chance, ms) => {
    expect(backoffMs(failed, { leastMs: 250, mostMs: 15_000 }, chance)).toBeCloseTo(ms, 1);
  });
});
