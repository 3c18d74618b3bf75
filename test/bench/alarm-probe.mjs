// Sends single records that must raise an alarm, and takes the time until a dashboard's socket has it; one process does
// both, so that one clock tells. Against the bare server the same message goes to the viewer and nothing else happens.
import WebSocket from 'ws';
import { liveProtocol } from '../../.build/core/live/message.js';
import { binaryOfFrame } from '../../.build/core/protocol/binary-frame-writer.js';
import { sourceProtocol } from '../../.build/core/protocol/source-messages.js';
import { answering } from './forked.mjs';
import { pause } from './measure.mjs';
import { characteristics, probeGuarantee, probeStation, probeUnits, product } from './plant-text.mjs';

const opened = (socket) => new Promise((resolve, reject) => socket.once('open', resolve).once('error', reject));
let [source, next, done] = [undefined, 1, 1];
let heard = () => undefined;
let bare;
/** Probes used up so far: each raises its alarm once. */
let used = 0;

function frame(probe, records, nonconforming) {
  const origin = { station: probeStation(probe), product, characteristic: characteristics.verdicts, lot: undefined };
  const part = { kind: 'verdicts', origin, records, time: { kind: 'steady', start: Date.now(), step: 0 }, nonconforming: Uint32Array.from(nonconforming) };
  const bytes = binaryOfFrame({ first: next, records, parts: [part] });
  next += records;
  return bytes;
}

async function connectPlant({ port, token, probes }) {
  source = new WebSocket(`ws://127.0.0.1:${port}/source`, sourceProtocol, { headers: { authorization: `Bearer ${token}` } });
  source.on('message', (data) => {
    const message = JSON.parse(data.toString());
    if (message.type === 'refused') throw new Error(`refused: ${data}`);
    if (message.type === 'ack') done = message.next;
  });
  await new Promise((resolve) => source.once('message', resolve));
  const dashboard = new WebSocket(`ws://127.0.0.1:${port}/live`, liveProtocol);
  await opened(dashboard);
  dashboard.send('{"type":"watch"}');
  dashboard.on('message', (data) => {
    const at = performance.now();
    const message = JSON.parse(data.toString());
    if (message.type === 'change') for (const alarm of message.alarms) if (alarm.state.kind === 'raised') heard(alarm.guarantee, at);
  });
  for (let probe = 0; probe < probes; probe += 1) {
    source.send(frame(probe, probeUnits, []));
    while (next - done > 32 * probeUnits) await pause(2);
  }
  while (done < next) await pause(5);
}

async function connectBare({ port }) {
  bare = new WebSocket(`ws://127.0.0.1:${port}/probe`, sourceProtocol);
  const viewer = new WebSocket(`ws://127.0.0.1:${port}/viewer`, liveProtocol);
  await Promise.all([opened(bare), opened(viewer)]);
  viewer.on('message', (data) => heard(data.readUInt32LE(8), performance.now()));
}

/** Milliseconds from sending to hearing, `count` times, a random while apart so that no timer is met in step. */
async function run({ through, count }) {
  const taken = [];
  for (let k = 0; k < count; k += 1) {
    await pause(5 + ((k * 37) % 23));
    const plant = through === 'plant';
    const bytes = frame(plant ? used : 0, 1, [0]);
    const expected = plant ? probeGuarantee(used++) : (next - 1) % 4_294_967_296;
    const at = new Promise((resolve) => (heard = (what, when) => what === expected && resolve(when)));
    const begin = performance.now();
    (plant ? source : bare).send(bytes);
    if (!plant) next -= 1;
    taken.push((await at) - begin);
  }
  return taken;
}

answering({ connectPlant, connectBare, run });
