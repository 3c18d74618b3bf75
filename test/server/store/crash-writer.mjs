// A server that commits until it is killed: prints 'open', then the newest durable journal id after each commit.
import { openStore } from '../../../.build/server/store/sqlite-store.js';

const [directory] = process.argv.slice(2);
const store = await openStore(directory).catch((error) => {
  console.log(`refused ${error.fault}`);
  process.exit(3);
});
console.log('open');

const body = (id) => new Uint8Array(500 + (id % 5) * 3_000).map((_, place) => (place + id) % 256);
const commit = (id) => {
  const entries = [2 * id - 1, 2 * id].map((of) => ({ id: of, at: of, kind: 'frame', sourceId: 1, firstSequence: of, records: 1, body: body(of) }));
  const minutes = [{ guarantee: 'leak-a', at: 0, inspected: 2, nonconforming: 0, estimate: 0, bound: 0.5, opposite: 0, state: 'gathering' }];
  return store.commit({ entries, happenings: [], alarms: [], minutes, changes: [] });
};

const keepOn = async (lane) => {
  for (let id = store.lastId / 2 + 1 + lane; ; id += 8) {
    const given = commit(id);
    if (id % 40 === 0) await store.keepSnapshot({ journalId: 2 * id, at: id, body: new Uint8Array(5_000).fill(id) });
    await given;
    process.stdout.write(`${2 * id}\n`);
  }
};
await Promise.all(Array.from({ length: 8 }, (_, lane) => keepOn(lane)));
