// What reading a frame costs beside its bare ceiling: JSON.parse alone for text, unchecked typed-array
// reads for binary. Run after the build: node test/bench/protocol.mjs [--cbor path/to/cbor-x/index.js]
// The CBOR line answers whether an open encoding would have served as well; the library is no dependency.
import { pathToFileURL } from 'node:url';
import { BinaryFrameReader } from '../../.build/core/protocol/binary-frame-reader.js';
import { binaryOfFrame } from '../../.build/core/protocol/binary-frame-writer.js';
import { JsonFrameReader } from '../../.build/core/protocol/json-frame-reader.js';
import { sourceLimits } from '../../.build/core/protocol/limits.js';

const at = 1_764_547_200_000;
const shapes = {
  'verdicts, steady': (n) => ({
    kind: 'verdicts', station: 'a-leak', product: 'hose-12', characteristic: 'leak', lot: 'L-2041', units: n,
    nonconforming: Array.from({ length: Math.ceil(n / 100) }, (_, i) => i * 100), time: { start: at, step: 250 },
  }),
  'measurements, a time each': (n) => ({
    kind: 'measurements', station: 'a-crimp', product: 'hose-12', characteristic: 'pull-off-force', lot: 'L-2041',
    value: Array.from({ length: n }, (_, i) => 1500 + Math.round(400 * Math.sin(i * 7)) / 8), time: Array.from({ length: n }, (_, i) => at + i * 251 + (i % 7)),
  }),
};

/** Median nanoseconds of CPU (not of a clock that others share) a call over rounds in which the contestants take turns. */
function race(contestants, rounds = 31, roundMs = 12) {
  const names = Object.keys(contestants);
  const loops = Object.fromEntries(names.map((name) => [name, calls(contestants[name], roundMs)]));
  const taken = Object.fromEntries(names.map((name) => [name, []]));
  for (let round = 0; round < rounds; round += 1) {
    for (const name of names) taken[name].push(timed(contestants[name], loops[name]) / loops[name]);
  }
  return Object.fromEntries(names.map((name) => [name, taken[name].sort((a, b) => a - b)[rounds >> 1]]));
}
function timed(of, loops) {
  const begin = process.cpuUsage();
  for (let i = 0; i < loops; i += 1) of(i);
  const { user, system } = process.cpuUsage(begin);
  return (user + system) * 1000;
}
function calls(of, roundMs) {
  timed(of, 20_000);
  return Math.max(10, Math.ceil((roundMs * 1e6) / (timed(of, 20_000) / 20_000)));
}

/** The same columns copied out of the bytes with nothing checked and nothing named. */
function bareReader(kind) {
  return (bytes) => {
    const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
    const first = view.getFloat64(8, true);
    const part = 24 + view.getUint32(20, true);
    const [records, listed] = [view.getUint32(part + 4, true), view.getUint32(part + 8, true)];
    const body = bytes.byteOffset + part + 16;
    const columns = kind === 'verdicts'
      ? [new Uint32Array(bytes.buffer.slice(body + 16, body + 16 + listed * 4))]
      : bytes[part + 1] === 0
        ? [new Float64Array(bytes.buffer.slice(body + 16, body + 16 + records * 8))]
        : [new Uint32Array(bytes.buffer.slice(body + 8, body + 8 + records * 4)),
          new Float64Array(bytes.buffer.slice(body + 8 + Math.ceil(records / 2) * 8, body + 8 + Math.ceil(records / 2) * 8 + records * 8))];
    return { first, records, columns };
  };
}

const cborAt = process.argv.indexOf('--cbor');
const cbor = cborAt < 0 ? undefined : await import(pathToFileURL(process.argv[cborAt + 1]).href);

/** The part with its columns as typed arrays (RFC 8746), names and keys as a general decoder meets them. */
function cborFrame(part) {
  const typed = { ...part };
  if (part.nonconforming) typed.nonconforming = Uint32Array.from(part.nonconforming);
  if (part.value) {
    typed.value = Float64Array.from(part.value);
    typed.time = { base: part.time[0], offsets: Uint32Array.from(part.time, (time) => time - part.time[0]) };
  }
  return new cbor.Encoder({ useRecords: false, tagUint8Array: false }).encode({ type: 'records', first: 1, parts: [typed] });
}

for (const [shape, partOf] of Object.entries(shapes)) {
  console.log(`\n${shape}: ns a record (share of the bare ceiling kept)`);
  for (const n of [1, 10, 100, 1000]) {
    const part = partOf(n);
    const text = JSON.stringify({ type: 'records', first: 1, parts: [part] });
    const json = new JsonFrameReader(sourceLimits);
    const frame = json.read(text).value;
    const made = binaryOfFrame(frame);
    const packed = new Uint8Array(made.length + 2);
    packed.set(made, 2);
    const bytes = packed.subarray(2); // a WebSocket message begins anywhere
    const binary = new BinaryFrameReader(sourceLimits);
    const bare = bareReader(part.kind);
    const texts = Array.from({ length: 64 }, (_, i) => text.replace('"first":1', `"first":${1 + i * n}`));
    const contestants = {
      parse: (i) => JSON.parse(texts[i & 63]),
      json: (i) => json.read(texts[i & 63]),
      bare: () => bare(bytes),
      binary: () => binary.read(bytes),
      encode: () => binaryOfFrame(frame),
    };
    if (cbor) {
      const packedCbor = cborFrame(part);
      const decoder = new cbor.Decoder({ useRecords: false });
      contestants.cbor = () => decoder.decode(packedCbor);
      contestants.cborBytes = () => packedCbor.length;
    }
    const ns = race(contestants);
    const each = (name) => (ns[name] / n).toFixed(n >= 100 ? 2 : 1);
    console.log([
      `${String(n).padStart(5)} a frame:`,
      `JSON.parse ${each('parse')}`, `JSON read ${each('json')} (${(ns.parse / ns.json).toFixed(2)})`,
      `bare binary ${each('bare')}`, `binary read ${each('binary')} (${(ns.bare / ns.binary).toFixed(2)})`,
      `write ${each('encode')}`, `bytes ${text.length} / ${made.length}${cbor ? ` / CBOR ${contestants.cborBytes()}` : ''}`,
      ...(cbor ? [`CBOR decode unchecked ${each('cbor')}`] : []),
    ].join('  '));
  }
}
