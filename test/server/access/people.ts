import type { FastifyInstance } from 'fastify';
import { accessOf, type Access } from '../../../server/access/access-of.ts';
import type { AccessFile } from '../../../server/access/access-file.ts';
import { hopsOf } from '../../../server/http/hops.ts';
import { httpServer } from '../../../server/http/http-server.ts';
import { serveRoutes } from '../../../server/http/serve-routes.ts';
import { logOf } from '../../../server/ops/log.ts';
import { openMemoryStore, type MemoryDisk } from '../../../server/store/memory-store.ts';
import type { RecordedChange } from '../../../core/access/change.ts';

export const password = 'seven long hoses in the rain';

/** One person's requests, with the cookie they were given. */
export class Person {
  readonly #http: FastifyInstance;
  cookie: string | undefined;
  readonly address: string;

  constructor(http: FastifyInstance, address = '10.0.0.7') {
    this.#http = http;
    this.address = address;
  }

  async ask(method: 'GET' | 'POST' | 'PUT' | 'DELETE', url: string, body?: object, more: Record<string, string> = {}): Promise<{ status: number; body: Record<string, unknown> & unknown[]; retryAfter: string | undefined }> {
    const headers = { host: 'plant.example', origin: 'http://plant.example', ...(this.cookie === undefined ? {} : { cookie: this.cookie }), ...more };
    const answer = await this.#http.inject({ method, url, headers, remoteAddress: this.address, ...(body === undefined ? {} : { payload: body }) });
    const set = answer.headers['set-cookie'];
    if (typeof set === 'string') this.cookie = set.split(';')[0];
    return { status: answer.statusCode, body: (answer.body === '' ? {} : JSON.parse(answer.body)) as never, retryAfter: answer.headers['retry-after'] };
  }

  signIn(name: string, with_ = password): Promise<{ status: number; retryAfter: string | undefined }> {
    return this.ask('POST', '/api/sign-in', { name, password: with_ });
  }
}

/** Access on a memory store, with a clock that is moved by hand; served, but not listening. */
export class Plant {
  now = Date.UTC(2026, 5, 1, 6);
  readonly #disk: MemoryDisk | undefined;
  access!: Access;
  http!: FastifyInstance;
  file!: AccessFile;

  constructor(disk?: MemoryDisk) {
    this.#disk = disk;
  }

  async open(): Promise<this> {
    this.file = openMemoryStore(this.#disk).access;
    this.access = await accessOf({ file: this.file, settings: { access: 'accounts', sessionIdleHours: 12, sessionDays: 30 }, directory: undefined, plantName: () => 'Hose works', lines: () => ['A', 'B'], log: logOf('silent'), now: () => this.now });
    this.http = await httpServer({ hops: hopsOf(''), tls: undefined, requestsPerSecond: 10_000 });
    serveRoutes(this.http, this.access.routes, this.access.guard);
    return this;
  }

  person(address?: string): Person {
    return new Person(this.http, address);
  }

  /** The first account, signed in. */
  async administrator(): Promise<Person> {
    const person = this.person();
    const made = await person.ask('POST', '/api/invitations/accept', { code: this.access.firstCode, name: 'olaf', shownAs: 'Olaf Berg', password });
    if (made.status !== 200) throw new Error(JSON.stringify(made.body));
    return person;
  }

  /** Another account with these roles, signed in. */
  async account(by: Person, name: string, grants: readonly { role: string; line: string | null }[], address?: string): Promise<Person> {
    const { body } = await by.ask('POST', '/api/invitations', { grants });
    const person = this.person(address);
    const made = await person.ask('POST', '/api/invitations/accept', { code: (body['link'] as string).split('#')[1], name, shownAs: `${name} Holm`, password });
    if (made.status !== 200) throw new Error(JSON.stringify(made.body));
    return person;
  }

  changes(): Promise<readonly RecordedChange[]> {
    return this.file.changes({ from: 0, to: Number.MAX_SAFE_INTEGER, limit: 1_000 });
  }
}
