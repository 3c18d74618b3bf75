import { mkdtempSync, rmSync } from 'node:fs';
import { createServer, type AddressInfo, type Server } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { GuaranteeCard, GuaranteeView } from '../../../core/view/guarantee-view.ts';
import { demoData } from '../../../server/demo/demo-data.ts';
import { demoPlant, joinMinute, momentOf } from '../../../server/demo/demo-plant.ts';
import { runDemo, type Demo } from '../../../server/demo/run-demo.ts';
import { logOf } from '../../../server/ops/log.ts';
import { settle } from '../../../server/settings/settings.ts';

let directory: string;
let taken: Server;
let demo: Demo | undefined;

beforeEach(async () => {
  directory = mkdtempSync(join(tmpdir(), 'vouchline-test-'));
  taken = createServer();
  await new Promise<void>((resolve) => taken.listen(0, '127.0.0.1', resolve));
});
afterEach(async () => {
  await demo?.stop('test over');
  demo = undefined;
  taken.close();
  rmSync(directory, { recursive: true, force: true });
});

const port = (): number => (taken.address() as AddressInfo).port;
const begin = (): Promise<Demo> =>
  runDemo({ settings: settle({ port: port() }, {}, {}), data: demoData(directory, undefined), rate: 300, log: logOf('silent') });

interface Shown {
  readonly card: GuaranteeCard;
  readonly view: GuaranteeView;
}
const shown = async ({ served }: Demo): Promise<readonly Shown[]> => {
  const answer = await fetch(`${served.address}/api/guarantees`);
  if (!answer.ok) throw new Error(`${answer.status}: ${await answer.text()}`);
  return (await answer.json()) as readonly Shown[];
};

/** Asks again and again until the answer fits; the test's own time limit ends it. */
async function until<T>(ask: () => Promise<T>, fits: (answer: T) => boolean): Promise<T> {
  for (;;) {
    const answer = await ask();
    if (fits(answer)) return answer;
    await new Promise((resolve) => setTimeout(resolve, 50)); // So that the server does not find it asks too much.
  }
}

describe('a running demo', () => {
  it('begins in the middle of life, goes on over the network, and goes on again where it stood', async () => {
    demo = await begin();
    const running = demo;
    expect(new URL(demo.served.address).port).not.toBe(String(port()));
    const joined = momentOf(demoPlant(1), joinMinute);
    const atJoin = await shown(demo);
    expect(atJoin.map(({ view }) => view.state)).toEqual(Array.from({ length: 11 }, () => 'demonstrated'));
    expect(Math.min(...atJoin.map(({ view }) => view.newest ?? 0))).toBeGreaterThan(joined - 3 * 60_000);

    const oldestOf = (all: readonly Shown[]): number => Math.min(...all.map(({ view }) => view.newest ?? 0));
    const lived = oldestOf(await until(() => shown(running), (all) => oldestOf(all) > joined + 5 * 60_000));
    await demo.stop('test');

    demo = await begin();
    const on = demo;
    expect(oldestOf(await shown(on))).toBeGreaterThanOrEqual(lived);
    const later = await until(() => shown(on), (all) => oldestOf(all) > lived + 10 * 60_000);
    expect(later.map(({ view }) => view.state)).toEqual(atJoin.map(({ view }) => view.state));
  }, 60_000);
});
