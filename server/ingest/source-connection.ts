import type { RawData, WebSocket } from 'ws';
import type { Receipt } from '../../core/monitor/receipt.ts';
import { BinaryFrameReader } from '../../core/protocol/binary-frame-reader.ts';
import { JsonFrameReader } from '../../core/protocol/json-frame-reader.ts';
import type { SourceLimits } from '../../core/protocol/limits.ts';
import { endsConnection, refusalTable, type RefusalCode } from '../../core/protocol/refusals.ts';
import { gapMessage, refusedMessage, sourceProtocol, type ServerMessage, type SetAside } from '../../core/protocol/source-messages.ts';
import type { Frame } from '../../core/record/part.ts';
import type { Refusal } from '../../core/record/refusal.ts';
import type { Result } from '../../core/result.ts';
import type { Sender } from '../pipeline/arrival.ts';
import type { Inbox } from '../pipeline/inbox.ts';
import { AllowedStations } from './allowed-stations.ts';
import { Reading } from './reading.ts';

/** What a connection needs from the server. */
export interface SourceHost {
  readonly inbox: Inbox;
  readonly limits: SourceLimits;
  /** The sequence a source is to send next. */
  readonly nextOf: (source: string) => number;
  readonly now: () => number;
  readonly frameRead: (records: number) => void;
  readonly frameRefused: (refusal: Refusal) => void;
}

/** Answers a source may leave untaken, bytes: beyond that it is not read until it takes them. */
const mostUntakenBytes = 262_144;

/** WebSocket close codes: RFC 6455 section 7.4.1, and from the range for applications (4000 on). */
const closeCodes: Partial<Record<RefusalCode, number>> = { 'frame-too-large': 1009, replaced: 4001, 'too-many-in-flight': 4002, 'token-unknown': 4003, 'not-stored': 4004 };

/** One source on the line: reads its frames, grants a window, answers when they are durable. */
export class SourceConnection {
  readonly sender: Sender;
  readonly reading: Reading;
  readonly #socket: WebSocket;
  readonly #host: SourceHost;
  readonly #binary: BinaryFrameReader;
  readonly #json: JsonFrameReader;
  readonly #allowed: AllowedStations;
  /** One of each for all frames. */
  readonly #judged = (receipt: Receipt, frame: Frame): void => {
    if (receipt.kind === 'gap') this.#answer(gapMessage(frame.first, receipt.next));
  };
  readonly #durable = (receipt: Receipt): void => {
    if (receipt.kind === 'taken' || receipt.kind === 'repeated') this.#acknowledge(receipt);
  };
  readonly #sent = (): void => {
    if (this.reading.isHeldFor('answers') && this.#socket.bufferedAmount < mostUntakenBytes / 2) this.reading.release('answers');
  };
  #inFlight = 0;
  #ackNext = 0;
  #setAside: SetAside[] = [];
  #ackDue = false;
  #open = true;
  #taking = true;

  constructor(socket: WebSocket, sender: Sender, host: SourceHost) {
    this.sender = sender;
    this.#socket = socket;
    this.reading = new Reading(socket);
    this.#host = host;
    this.#binary = new BinaryFrameReader(host.limits);
    this.#json = new JsonFrameReader(host.limits);
    this.#allowed = new AllowedStations(sender);
    socket.on('message', (data, isBinary) => this.#onMessage(data, isBinary));
    socket.on('close', () => {
      this.#open = false;
    });
    // Everything this source sent before is made durable first: below `next` nothing can be missing.
    host.inbox.put({ kind: 'barrier', done: () => this.#welcome() });
  }

  /** Ends the connection, saying why. */
  end(code: RefusalCode): void {
    this.#send({ type: 'refused', code, sentence: refusalTable[code].sentence });
    this.#close(code);
  }

  /** Takes no more frames; those taken are still answered, the others are sent again another time. */
  takeNoMore(): void {
    this.#taking = false;
  }

  /** The server goes down on purpose. */
  stopping(reason: string): void {
    this.#send({ type: 'stopping', reason });
    this.#open = false;
    this.#socket.close(1001, 'stopping');
  }

  #welcome(): void {
    const { limits, nextOf, now } = this.#host;
    const { name } = this.sender;
    this.#send({ type: 'welcome', protocol: sourceProtocol, source: name, next: nextOf(name), window: limits.framesInFlight, limits, at: now() });
  }

  #onMessage(data: RawData, isBinary: boolean): void {
    if (!this.#open || !this.#taking) return;
    this.#inFlight += 1;
    if (this.#inFlight > this.#host.limits.framesInFlight) {
      this.end('too-many-in-flight');
      return;
    }
    const bytes = data as Buffer;
    const frame = isBinary ? this.#binary.read(bytes) : this.#json.read(bytes.toString('utf8'));
    this.#onFrame(frame, isBinary ? bytes : undefined);
  }

  #onFrame(read: Result<Frame, Refusal>, bytes: Uint8Array | undefined): void {
    const refusal = read.ok ? this.#allowed.refusalOf(read.value) : read.fault;
    if (refusal !== undefined || !read.ok) {
      if (refusal !== undefined) this.#refuse(refusal);
      return;
    }
    const frame = read.value;
    this.#host.frameRead(frame.records);
    this.#host.inbox.put({ kind: 'frame', sender: this.sender, frame, bytes, judged: this.#judged, durable: this.#durable });
  }

  #refuse(refusal: Refusal): void {
    this.#host.frameRefused(refusal);
    this.#answer(refusedMessage(refusal, this.#host.nextOf(this.sender.name)));
    if (endsConnection(refusal.code)) this.#close(refusal.code);
  }

  /** One acknowledgement answers all frames that became durable together. */
  #acknowledge(receipt: Extract<Receipt, { kind: 'taken' | 'repeated' }>): void {
    this.#inFlight -= 1;
    this.#ackNext = Math.max(this.#ackNext, receipt.next);
    if (receipt.kind === 'taken') {
      for (const { sequence, records, code } of receipt.notCounted) {
        this.#setAside.push({ sequence, records, code, sentence: refusalTable[code].sentence });
      }
    }
    if (this.#ackDue) return;
    this.#ackDue = true;
    queueMicrotask(() => this.#sendAck());
  }

  #sendAck(): void {
    const setAside = this.#setAside;
    this.#ackDue = false;
    this.#setAside = [];
    this.#send({ type: 'ack', next: this.#ackNext, ...(setAside.length > 0 ? { setAside } : {}) });
  }

  #answer(message: ServerMessage): void {
    this.#inFlight -= 1;
    this.#send(message);
  }

  #send(message: ServerMessage): void {
    if (!this.#open) return;
    this.#socket.send(JSON.stringify(message), this.#sent);
    if (this.#socket.bufferedAmount > mostUntakenBytes) this.reading.hold('answers');
  }

  #close(code: RefusalCode): void {
    this.#open = false;
    this.#socket.close(closeCodes[code] ?? 1008, code);
  }
}
