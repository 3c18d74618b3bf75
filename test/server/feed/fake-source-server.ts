import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { WebSocketServer, type WebSocket } from 'ws';
import { SourceLedger } from '../../../core/monitor/source-ledger.ts';
import { BinaryFrameReader } from '../../../core/protocol/binary-frame-reader.ts';
import { sourceLimits } from '../../../core/protocol/limits.ts';
import { gapMessage, sourceProtocol, type ServerMessage } from '../../../core/protocol/source-messages.ts';
import type { Frame } from '../../../core/record/part.ts';
import { tailOf } from '../../../core/record/tail-of.ts';

/** What happens to a frame: taken and answered, taken (all or but one record) with the answer lost in a break, lost in a break, or an answer of the test's own. */
export type Fate = 'answer' | 'take and break' | 'take one and break' | 'break' | ServerMessage;

/** A server of sources that does to each frame what the test says, on a real socket. */
export interface FakeSourceServer {
  readonly address: URL;
  readonly ledger: SourceLedger;
  /** Sequences as they were taken. */
  readonly taken: number[];
  /** Most frames that were in flight at the same time. */
  mostInFlight: number;
  connections: number;
  /** Answers what is held back. */
  release: () => void;
  stop: () => Promise<void>;
}

export interface FakeSetting {
  readonly window?: number;
  readonly fate?: (frame: Frame) => Fate;
  /** Hold answers back until `release`. */
  readonly hold?: boolean;
  /** Refuse every connection in HTTP. */
  readonly status?: number;
  readonly code?: string;
}

export async function fakeSourceServer({ window = 4, fate = () => 'answer', hold = false, status, code }: FakeSetting): Promise<FakeSourceServer> {
  const http = createServer();
  const sockets = new WebSocketServer({ noServer: true, perMessageDeflate: false });
  const held: (() => void)[] = [];
  const fake: FakeSourceServer = {
    address: new URL('ws://127.0.0.1'), ledger: new SourceLedger(), taken: [], mostInFlight: 0, connections: 0,
    release: () => held.splice(0).forEach((answer) => answer()),
    stop: () => new Promise((resolve) => {
      for (const socket of sockets.clients) socket.terminate();
      http.closeAllConnections();
      http.close(() => resolve());
    }),
  };

  function onFrame(socket: WebSocket, frame: Frame, answered: () => void): void {
    const fateOf = fate(frame);
    if (typeof fateOf === 'object') return answered(), socket.send(JSON.stringify(fateOf));
    if (fateOf !== 'break') {
      const admission = fake.ledger.place(frame.first, frame.records);
      if (admission.kind === 'gap') return answered(), socket.send(JSON.stringify(gapMessage(frame.first, admission.expected)));
      const rest = admission.kind === 'mixed' ? tailOf(frame, fake.ledger.next - frame.first) : frame;
      const records = fateOf === 'take one and break' && admission.kind !== 'late' ? 1 : rest.records;
      if (admission.kind !== 'repeat') {
        for (let i = 0; i < records; i += 1) fake.taken.push(rest.first + i);
        if (admission.kind === 'late') fake.ledger.fill(rest.first, records);
        else fake.ledger.advance(rest.first + records);
        if (rest.parts[0]?.kind === 'lost') fake.ledger.declareLost(rest.first, records);
      }
    }
    if (fateOf !== 'answer') return socket.terminate();
    answered();
    socket.send(JSON.stringify({ type: 'ack', next: fake.ledger.next }));
  }

  http.on('upgrade', (request, socket, head) => {
    if (status !== undefined) {
      socket.end(`HTTP/1.1 ${status} No\r\nConnection: close\r\n\r\n${JSON.stringify({ code })}`);
      return;
    }
    sockets.handleUpgrade(request, socket, head, (opened) => {
      fake.connections += 1;
      let inFlight = 0;
      const reader = new BinaryFrameReader(sourceLimits);
      opened.on('message', (data) => {
        const frame = reader.read(data as Buffer);
        if (!frame.ok) throw new Error(frame.fault.sentence);
        inFlight += 1;
        fake.mostInFlight = Math.max(fake.mostInFlight, inFlight);
        const answer = (): void => onFrame(opened, frame.value, () => (inFlight -= 1));
        if (hold) held.push(answer);
        else answer();
      });
      opened.send(JSON.stringify({ type: 'welcome', protocol: sourceProtocol, source: 's', next: fake.ledger.next, window, limits: sourceLimits, at: 0 }));
    });
  });
  await new Promise<void>((resolve) => http.listen(0, '127.0.0.1', resolve));
  fake.address.port = String((http.address() as AddressInfo).port);
  return fake;
}
