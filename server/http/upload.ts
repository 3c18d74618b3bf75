import type { FastifyInstance, FastifyReply, FastifyRequest } from 'fastify';
import type { IncomingMessage } from 'node:http';
import { bearerToken } from '../ingest/bearer-token.ts';
import type { Refusal } from '../../core/record/refusal.ts';
import type { Sender } from '../pipeline/arrival.ts';
import type { RowForm } from '../rows/row-form.ts';
import { idempotencyKeyOf, longestKey } from './idempotency-key.ts';
import type { UploadDesk } from './upload-desk.ts';
import { UploadFault } from './upload-fault.ts';
import { UploadRun, type UploadHost } from './upload-run.ts';

export interface UploadRouteHost extends UploadHost {
  readonly desk: UploadDesk;
  readonly senderOf: (token: string) => Promise<Sender | undefined>;
  /** Why no records are taken now. */
  readonly closedBecause: () => string | undefined;
  /** Puts on record that somebody came with a token nobody has. */
  readonly tokenUnknown: (what: string, address: string) => Promise<void>;
  readonly rowRefused: (sender: Sender, refusal: Refusal | undefined) => void;
}

const forms: Readonly<Record<string, RowForm>> = { 'application/x-ndjson': 'ndjson', 'text/csv': 'csv' };

/** POST /source/records: rows of a source, read as they come. Answers when they are on disk. */
export function serveUploads(http: FastifyInstance, host: UploadRouteHost): void {
  http.addContentTypeParser(Object.keys(forms), (_request, body, done) => done(null, body));
  http.post('/source/records', async (request, reply) => {
    try {
      return await answered(request, reply, host);
    } catch (cause) {
      if (!(cause instanceof UploadFault)) throw cause;
      return sendFault(reply, cause, {});
    } finally {
      request.raw.resume(); // What is left of the body is read and dropped, so that the answer arrives.
    }
  });
}

async function answered(request: FastifyRequest, reply: FastifyReply, host: UploadRouteHost): Promise<FastifyReply> {
  const closed = host.closedBecause();
  if (closed !== undefined) throw new UploadFault(503, closed, 'The server takes no records now; send the same again later.');
  const form = forms[(request.headers['content-type'] ?? '').split(';')[0]?.trim().toLowerCase() ?? ''];
  if (form === undefined) throw new UploadFault(415, 'unknown-content-type', `Content-Type: expected one of ${Object.keys(forms).join(', ')}`);
  const token = bearerToken(request.headers);
  if (token === undefined) throw new UploadFault(401, 'token-missing', 'No token was sent; expected Authorization: Bearer …');
  const sender = await host.senderOf(token);
  if (sender === undefined) {
    await host.tokenUnknown('POST /source/records', request.ip);
    throw new UploadFault(401, 'token-unknown', 'The token is not known, or was withdrawn.');
  }
  const turn = host.desk.turnOf(sender);
  const run = new UploadRun(host, turn, keyOf(request));
  try {
    await run.take(textOf(request.body as IncomingMessage | undefined), form);
    return await reply.send(run.sums);
  } catch (cause) {
    if (!(cause instanceof UploadFault)) throw cause;
    if ('line' in cause.details && cause.status !== 409) host.rowRefused(sender, cause.refusal);
    return await sendFault(reply, cause, run.sums);
  } finally {
    turn.end();
  }
}

function keyOf(request: FastifyRequest): string | undefined {
  const header = request.headers['idempotency-key'];
  if (header === undefined) return undefined;
  const key = typeof header === 'string' ? idempotencyKeyOf(header) : undefined;
  if (key !== undefined) return key;
  throw new UploadFault(400, 'idempotency-key-malformed', `Idempotency-Key: expected a string of 1 to ${longestKey} characters in quotes`);
}

/** The body piece by piece; ending before its end leaves the connection open for the answer. */
async function* textOf(body: IncomingMessage | undefined): AsyncGenerator<Uint8Array, void, undefined> {
  if (body === undefined) return;
  try {
    yield* body.iterator({ destroyOnReturn: false }) as AsyncIterable<Buffer>;
  } catch {
    throw new UploadFault(400, 'broken-off', 'The request broke off before its end.');
  }
}

function sendFault(reply: FastifyReply, { status, code, message, details }: UploadFault, sums: object): FastifyReply {
  return reply.status(status).send({ error: message, code, ...details, ...sums });
}
