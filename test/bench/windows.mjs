// What admitting records to a window costs beside a bare loop that reads the same typed arrays and keeps a count.
// Run after the build: node test/bench/windows.mjs
import { ExposureSum } from '../../.build/core/window/exposure-sum.js';
import { RecordWindow } from '../../.build/core/window/record-window.js';
import { TimeWindow } from '../../.build/core/window/time-window.js';
import { UnitWindow } from '../../.build/core/window/unit-window.js';

const [parts, records, rate] = [1_000, 1_000, 1e-3];

/** Places of the nonconforming units of each part, from a fixed seed. */
function drawParts() {
  let seed = 7;
  return Array.from({ length: parts }, () => {
    const places = [];
    for (let place = 0; place < records; place += 1) {
      seed = (seed * 48_271) % 2_147_483_647;
      if (seed < rate * 2_147_483_647) places.push(place);
    }
    return Uint32Array.from(places);
  });
}

/** Admits a part and stops at every moment the count changes, as the evidence stage does. */
function walk(window, sequence, places) {
  window.admitRun(0, sequence, records);
  let [place, changes] = [0, 0];
  for (let k = 0; k <= places.length; k += 1) {
    const end = k < places.length ? places[k] : records;
    while (place < end) {
      const stretch = Math.min(end - place, window.nextDeparture());
      window.admitConforming(stretch);
      place += stretch;
      changes += 1;
    }
    if (k < places.length) {
      window.admitNonconforming();
      place += 1;
      changes += 1;
    }
  }
  return changes;
}

/** Median nanoseconds of processor time a part, contestants taking turns; each gets a running sequence. */
function race(contestants, rounds = 21) {
  const taken = Object.fromEntries(Object.keys(contestants).map((name) => [name, []]));
  let sequence = 1;
  for (let round = -3; round < rounds; round += 1) {
    for (const [name, admit] of Object.entries(contestants)) {
      const begin = process.cpuUsage();
      let kept = 0;
      for (let part = 0; part < parts; part += 1) kept += admit(sequence + part * records, part);
      const { user, system } = process.cpuUsage(begin);
      const ns = ((user + system) * 1e3) / parts;
      if (kept < 0) throw new Error('a count below 0');
      if (round >= 0) taken[name].push(ns);
    }
    sequence += parts * records;
  }
  return Object.fromEntries(Object.entries(taken).map(([name, all]) => [name, all.sort((a, b) => a - b)[rounds >> 1]]));
}

function tell(title, bare, times) {
  console.log(title);
  for (const [name, ns] of Object.entries(times)) {
    console.log(`  ${name.padEnd(46)} ${(ns / records).toFixed(3).padStart(8)} ns a record  ${(ns / times[bare]).toFixed(2).padStart(6)} x bare`);
  }
}

const listed = drawParts();
const verdicts = listed.map((places) => {
  const bytes = new Uint8Array(records);
  for (const place of places) bytes[place] = 1;
  return bytes;
});
const [last, large, growing] = [new UnitWindow({ size: 10_000 }), new UnitWindow({ size: 1_000_000 }), new UnitWindow()];
const hour = new TimeWindow({ spanMs: 3_600_000, stepMs: 60_000 });
tell('Verdicts, 1,000 units a part, 1,000 nonconforming per million', 'bare: a byte a unit', race({
  'bare: a byte a unit': (_, part) => {
    let count = 0;
    const bytes = verdicts[part];
    for (let k = 0; k < records; k += 1) count += bytes[k];
    return count;
  },
  'bare: listed places only': (_, part) => {
    let sum = 0;
    const places = listed[part];
    for (let k = 0; k < places.length; k += 1) sum += places[k];
    return sum;
  },
  'last 10,000 units, every moment': (sequence, part) => walk(last, sequence, listed[part]),
  'last 1,000,000 units, every moment': (sequence, part) => walk(large, sequence, listed[part]),
  'growing, every moment': (sequence, part) => walk(growing, sequence, listed[part]),
  'last hour in minutes (4 parts a minute)': (sequence, part) => {
    const [at, places] = [sequence * 15, listed[part]];
    let from = 0;
    for (const place of places) {
      if (place > from) hour.admitConforming(at, 0, sequence + from, place - from);
      hour.admitNonconforming(at, 0, sequence + place);
      from = place + 1;
    }
    if (from < records) hour.admitConforming(at, 0, sequence + from, records - from);
    return hour.nonconforming;
  },
}));

const counts = new Uint32Array(records).map((_, k) => k % 3);
const exposures = new Float64Array(records).map((_, k) => 100 + (k % 7) / 10);
const sums = [new ExposureSum(), new ExposureSum()];
const rolling = new RecordWindow({ size: 10_000, width: 2 }, sums[0]);
const lot = new RecordWindow({ width: 2 }, sums[1]);
const feed = (window) => (sequence) => {
  window.admitRun(0, sequence, records);
  for (let k = 0; k < records; k += 1) window.admit(counts[k], exposures[k]);
  return window.records;
};
tell('Counts with exposure, 1,000 records a part', 'bare: two columns summed', race({
  'bare: two columns summed': () => {
    let [count, exposure] = [0, 0];
    for (let k = 0; k < records; k += 1) {
      count += counts[k];
      exposure += exposures[k];
    }
    return count + exposure;
  },
  'last 10,000 records': feed(rolling),
  'growing': feed(lot),
}));
