// One of the two servers that race on the record path, in a process of its own.
// 'bare' receives and decodes, nothing else; 'plant' takes the same frames to evidence, with a store that is at once durable.
import { WebSocketServer } from 'ws';
import { Monitor } from '../../.build/core/monitor/monitor.js';
import { sourceLimits } from '../../.build/core/protocol/limits.js';
import { sourceProtocol } from '../../.build/core/protocol/source-messages.js';
import { plantClock } from '../../.build/server/clock/plant-clock.js';
import { SourceConnection } from '../../.build/server/ingest/source-connection.js';
import { Inbox } from '../../.build/server/pipeline/inbox.js';
import { Judge } from '../../.build/server/pipeline/judge.js';
import { throughPlant } from '../../.build/server/pipeline/pipeline.js';
import { plantOfChecked } from '../../.build/server/plant-file.js';
import { decodeBinary } from './bare-decode.mjs';
import { answering } from './forked.mjs';
import { processorTime } from './measure.mjs';
import { plantText, stationOf } from './plant-text.mjs';

const [who, kind, streamCount, connectionCount] = process.argv.slice(2);
const streams = Number(streamCount);
const connections = Number(connectionCount);
const server = new WebSocketServer({ host: '127.0.0.1', port: 0, perMessageDeflate: false, maxPayload: sourceLimits.frameBytes, handleProtocols: () => sourceProtocol });
const taken = who === 'bare' ? bare() : plant();

function bare() {
  let records = 0;
  server.on('connection', (socket) => {
    let next = 1;
    socket.on('message', (data, isBinary) => {
      if (!isBinary && data.length === 4) {
        socket.send(JSON.stringify({ type: 'ack', next }));
        return;
      }
      const frame = isBinary ? decodeBinary(data, kind) : JSON.parse(data.toString('utf8'));
      const count = isBinary ? frame.records : frame.parts[0].units ?? frame.parts[0].value.length;
      records += count;
      next += count;
    });
  });
  return () => ({ records, changes: 0 });
}

function plant() {
  const text = plantText(streams, kind);
  const monitor = new Monitor(plantOfChecked(text, 'bench'), 'bench');
  const clock = plantClock({ kind: 'wall' });
  const inbox = new Inbox();
  const judge = new Judge(monitor, 0, clock, plantOfChecked);
  let [records, changes] = [0, 0];
  const atOnce = { commit: () => Promise.resolve() };
  throughPlant(inbox.arrivals$, judge, atOnce).subscribe(({ group }) => {
    for (const entry of group.entries) records += entry.records;
    changes += group.happenings.length;
  });
  server.on('connection', (socket, { url }) => {
    const index = Number(url.slice(1));
    const stations = Array.from({ length: streams }, (_, stream) => stream).filter((stream) => stream % connections === index).map(stationOf);
    new SourceConnection(socket, { id: index + 1, name: `source-${index}`, stations }, {
      inbox,
      limits: sourceLimits,
      nextOf: (source) => monitor.sources.nextOf(source),
      now: () => clock.now(),
      frameRead: () => undefined,
      frameRefused: () => undefined,
    });
  });
  return () => ({ records, changes });
}

let spent = () => 0;
await new Promise((resolve) => server.once('listening', resolve));
answering({
  begin: () => {
    spent = processorTime();
    return taken();
  },
  end: () => ({ microseconds: spent(), ...taken() }),
}, { port: server.address().port });
