// Durable records a second, and reading them back, each as a ratio to the bare disk in the same run.
// Usage: node test/bench/store.mjs [--records 10000000] [--rounds 5] [--directory .data/bench-store]
import { fdatasyncSync, closeSync, mkdirSync, openSync, readSync, rmSync, statSync, writeSync } from 'node:fs';
import { join } from 'node:path';
import { parseArgs } from 'node:util';
import { openStore } from '../../.build/server/store/sqlite-store.js';

const { values } = parseArgs({
  options: { records: { type: 'string', default: '10000000' }, rounds: { type: 'string', default: '5' }, directory: { type: 'string', default: '.data/bench-store' } },
});
const records = Number(values.records);
const rounds = Number(values.rounds);
const top = values.directory;
const perCommit = 1_000;

const median = (of) => [...of].sort((a, b) => a - b)[Math.floor(of.length / 2)];
const secondsOf = async (act) => {
  const start = process.hrtime.bigint();
  await act();
  return Number(process.hrtime.bigint() - start) / 1e9;
};
const fresh = () => {
  rmSync(top, { recursive: true, force: true });
  mkdirSync(top, { recursive: true });
};

/** Bytes of one frame of 1,000 records: verdicts with a steady time, verdicts with a time each, measurements with a time each. */
const shapes = [
  { name: 'verdicts, steady time (120 B a frame)', bytes: 120 },
  { name: 'verdicts, a time each (8 kB a frame)', bytes: 8_100 },
  { name: 'measurements, a time each (24 kB a frame)', bytes: 24_200 },
];

const frameOf = (bytes, id) => new Uint8Array(bytes).map((_, place) => (place * 31 + id * 17) & 255);
const entryOf = (frame, id) => ({ id, at: 1.77e12 + id, kind: 'frame', sourceId: 1 + (id % 40), firstSequence: id * perCommit, records: perCommit, body: frame });
const groupOf = (entries) => ({ entries, happenings: [], alarms: [], minutes: [], changes: [] });

/** Bare: one process appends each frame and waits until it is on the disk. */
async function bareAppend(frames, commits) {
  const file = openSync(join(top, 'bare'), 'a');
  const seconds = await secondsOf(() => {
    for (let id = 1; id <= commits; id += 1) {
      writeSync(file, frames[id % frames.length]);
      fdatasyncSync(file);
    }
  });
  closeSync(file);
  return seconds;
}

/** Store: one frame a transaction, `inFlight` frames not yet acknowledged, as a granted window has them. */
async function storeAppend(frames, commits, inFlight, options) {
  const store = await openStore(join(top, 'store'), options);
  const seconds = await secondsOf(async () => {
    let next = 0;
    const lane = async () => {
      while (next < commits) {
        const id = ++next;
        await store.commit(groupOf([entryOf(frames[id % frames.length], id)]));
      }
    };
    await Promise.all(Array.from({ length: inFlight }, lane));
  });
  await store.close();
  return seconds;
}

async function benchAppend({ name, bytes }, commits) {
  const frames = Array.from({ length: 16 }, (_, id) => frameOf(bytes, id));
  const cases = [
    ['one frame a commit, 1 in flight', 1, { groupEntries: 1 }],
    ['one frame a commit, 8 in flight', 8, { groupEntries: 1 }],
    ['groups merged, 32 in flight', 32, {}],
  ];
  const bare = [];
  const ratios = cases.map(() => []);
  const rates = cases.map(() => []);
  for (let round = 0; round < rounds; round += 1) {
    fresh();
    const floor = await bareAppend(frames, commits);
    bare.push((commits * perCommit) / floor);
    for (const [index, [, inFlight, options]] of cases.entries()) {
      rmSync(join(top, 'store'), { recursive: true, force: true });
      const seconds = await storeAppend(frames, commits, inFlight, options);
      ratios[index].push(floor / seconds);
      rates[index].push((commits * perCommit) / seconds);
    }
  }
  console.log(`\n${name}: bare append + fdatasync ${(median(bare) / 1e6).toFixed(2)} M records/s`);
  cases.forEach(([label], index) => {
    console.log(`  ${label}: ${(median(rates[index]) / 1e6).toFixed(2)} M records/s, ratio ${median(ratios[index]).toFixed(2)} (${ratios[index].map((r) => r.toFixed(2)).join(' ')})`);
  });
}

async function benchRead({ name, bytes }) {
  fresh();
  const frames = Array.from({ length: 16 }, (_, id) => frameOf(bytes, id));
  const count = records / perCommit;
  const store = await openStore(join(top, 'store'));
  const file = openSync(join(top, 'bare'), 'a+');
  for (let id = 1; id <= count; id += 500) {
    const entries = Array.from({ length: Math.min(500, count - id + 1) }, (_, place) => entryOf(frames[(id + place) % 16], id + place));
    await store.commit(groupOf(entries));
    for (const { body } of entries) writeSync(file, body);
  }
  fdatasyncSync(file);
  await store.close();
  const buffer = new Uint8Array(4 * 1_048_576);
  const touch = (view) => {
    let sum = 0;
    for (let place = 0; place < view.length; place += 4_096) sum += view[place];
    return sum;
  };
  const bare = [];
  const ours = [];
  for (let round = 0; round < rounds; round += 1) {
    bare.push(
      await secondsOf(() => {
        let at = 0;
        for (let got = -1; got !== 0; at += got) {
          got = readSync(file, buffer, 0, buffer.length, at);
          touch(buffer.subarray(0, got));
        }
      }),
    );
    const again = await openStore(join(top, 'store'));
    let seen = 0;
    ours.push(
      await secondsOf(async () => {
        for await (const batch of again.readJournal(1)) for (const entry of batch) { touch(entry.body); seen += entry.records; }
      }),
    );
    if (seen !== records) throw new Error(`read ${seen} records of ${records}`);
    await again.close();
  }
  closeSync(file);
  const size = statSync(join(top, 'store', 'vouchline.db')).size;
  console.log(`\nread back ${records} records, ${name}: bare ${(median(bare) * 1e3).toFixed(0)} ms, store ${(median(ours) * 1e3).toFixed(0)} ms, times bare ${(median(ours) / median(bare)).toFixed(2)}; ${(size / records).toFixed(2)} B a record on disk`);
}

for (const shape of shapes) await benchAppend(shape, 1_000);
for (const shape of shapes) await benchRead(shape);
rmSync(top, { recursive: true, force: true });
