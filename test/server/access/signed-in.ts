import { WebSocket } from 'ws';
import type { Role } from '../../../core/access/role.ts';
import { liveProtocol } from '../../../core/live/message.ts';
import type { Served } from '../../../server/serve.ts';
import { password } from './people.ts';

/** Somebody signed in at a real server. */
export class SignedIn {
  readonly #served: Served;
  readonly name: string;
  cookie = '';

  private constructor(served: Served, name: string) {
    this.#served = served;
    this.name = name;
  }

  /** By a link to join; shown as "name Holm". */
  static async byLink(served: Served, link: string, name: string): Promise<SignedIn> {
    const person = new SignedIn(served, name);
    const answer = await person.ask('POST', '/api/invitations/accept', { code: link.split('#')[1], name, shownAs: `${name} Holm`, password });
    if (answer.status !== 200) throw new Error(await answer.text());
    return person;
  }

  async ask(method: string, path: string, body?: object, headers: Record<string, string> = {}): Promise<Response> {
    const answer = await fetch(`${this.#served.address}${path}`, {
      method,
      headers: { origin: this.#served.address, ...(this.cookie === '' ? {} : { cookie: this.cookie }), ...(body === undefined ? {} : { 'content-type': 'application/json' }), ...headers },
      ...(body === undefined ? {} : { body: JSON.stringify(body) }),
    });
    const set = answer.headers.get('set-cookie');
    if (set !== null) this.cookie = set.split(';')[0]!;
    return answer;
  }

  async json<T>(method: string, path: string, body?: object): Promise<T> {
    return (await (await this.ask(method, path, body)).json()) as T;
  }

  async invite(name: string, role: Role, line: string | null): Promise<SignedIn> {
    const { link } = await this.json<{ link: string }>('POST', '/api/invitations', { grants: [{ role, line }] });
    return SignedIn.byLink(this.#served, link, name);
  }

  signIn(): Promise<Response> {
    return this.ask('POST', '/api/sign-in', { name: this.name, password });
  }

  /** 101 where the live socket opens, else the status of the refusal. */
  live(headers: Record<string, string> = { cookie: this.cookie }): Promise<number> {
    return new Promise((resolve) => {
      const socket = new WebSocket(`${this.#served.address.replace('http', 'ws')}/live`, liveProtocol, { headers });
      socket.on('open', () => {
        resolve(101);
        socket.terminate();
      });
      socket.on('unexpected-response', (_request, response) => {
        resolve(response.statusCode ?? 0);
        socket.terminate();
      });
      socket.on('error', () => undefined);
    });
  }
}
