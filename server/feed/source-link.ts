import type { IncomingMessage } from 'node:http';
import { WebSocket } from 'ws';
import { endsConnection, refusalTable, type RefusalCode } from '../../core/protocol/refusals.ts';
import { serverMessageOf } from '../../core/protocol/server-message.ts';
import { sourceProtocol, type ServerMessage } from '../../core/protocol/source-messages.ts';
import { failureOf, SourceFailure } from './source-failure.ts';

/** How a connection came to its end. */
export type LinkEnd =
  /** Connecting again may help. */
  | { readonly kind: 'broken'; readonly why: string }
  /** It will not. */
  | { readonly kind: 'final'; readonly failure: SourceFailure };

export interface LinkListener {
  readonly heard: (message: ServerMessage) => void;
  /** Called once; nothing is heard after it. */
  readonly ended: (end: LinkEnd) => void;
}

/** Bytes of one message of the server at most. */
const mostMessageBytes = 16 * 1_048_576;
const mostBodyBytes = 4_096;

/** One connection of a source to the server, from the attempt to its end. */
export class SourceLink {
  readonly #socket: WebSocket;
  readonly #listener: LinkListener;
  #ended = false;

  /** @param address where sources connect: ws: or wss: */
  constructor(address: URL, token: string, listener: LinkListener) {
    this.#listener = listener;
    this.#socket = new WebSocket(address, sourceProtocol, {
      headers: { authorization: `Bearer ${token}` },
      perMessageDeflate: false,
      maxPayload: mostMessageBytes,
      handshakeTimeout: 15_000,
    });
    this.#socket.on('message', (data, isBinary) => this.#onMessage(data as Buffer, isBinary));
    this.#socket.on('unexpected-response', (request, response) => {
      void this.#onAnswer(response).then((end) => {
        request.destroy();
        this.#end(end);
      });
    });
    this.#socket.on('error', (cause) => this.#end({ kind: 'broken', why: cause.message || String((cause as NodeJS.ErrnoException).code ?? cause.name) }));
    this.#socket.on('close', (code, reason) => this.#end({ kind: 'broken', why: `the connection was closed (${code}${reason.length > 0 ? ` ${reason.toString()}` : ''})` }));
  }

  /** Sends one binary frame. */
  send(bytes: Uint8Array): void {
    this.#socket.send(bytes);
  }

  /** Ends the connection from this side, saying why to the listener; for one that does not answer any more. */
  break(why: string): void {
    this.#end({ kind: 'broken', why });
  }

  /** Ends the connection in order; the listener is not told. */
  close(): void {
    this.#ended = true;
    this.#socket.close(1000);
    if (this.#socket.readyState === WebSocket.CONNECTING) this.#socket.terminate();
  }

  #onMessage(data: Buffer, isBinary: boolean): void {
    if (this.#ended) return;
    const read = serverMessageOf(isBinary ? '' : data.toString('utf8'));
    if (!read.ok) {
      this.#end({ kind: 'broken', why: `the server's message could not be read: ${read.fault.sentence}` });
      return;
    }
    const message = read.value;
    if (message.type === 'refused' && isFinal(message.code)) this.#end({ kind: 'final', failure: failureOf(message) });
    else this.#listener.heard(message);
  }

  /** What an answer in HTTP instead of a connection means. */
  async #onAnswer(response: IncomingMessage): Promise<LinkEnd> {
    const status = response.statusCode ?? 0;
    const code = await codeOf(response);
    if (status >= 500 || status === 429) return { kind: 'broken', why: `the server answered ${status} (${code ?? 'no reason given'})` };
    if (code !== undefined && code in refusalTable) return { kind: 'final', failure: failureOf({ type: 'refused', code, sentence: refusalTable[code].sentence }) };
    return { kind: 'final', failure: new SourceFailure('refused', `No source can connect at this address: it answered ${status} where a WebSocket at /source was expected.`) };
  }

  #end(end: LinkEnd): void {
    if (this.#ended) return;
    this.#ended = true;
    this.#socket.terminate();
    this.#listener.ended(end);
  }
}

/** Whether the server will say the same again: a refusal that ends the connection, but for a store that may recover. */
function isFinal(code: RefusalCode): boolean {
  return code in refusalTable && endsConnection(code) && code !== 'not-stored';
}

async function codeOf(response: IncomingMessage): Promise<RefusalCode | undefined> {
  try {
    let body = '';
    for await (const piece of response) {
      body += String(piece);
      if (body.length > mostBodyBytes) break;
    }
    return (JSON.parse(body) as { code?: RefusalCode }).code;
  } catch {
    return undefined; // Whoever answered is no Vouchline server; the status says enough.
  }
}
