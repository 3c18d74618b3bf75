import type { Alarm } from '../../../core/alarm/alarm.ts';
import type { Served } from '../../../server/serve.ts';
import { password } from './people.ts';
import type { SignedIn } from './signed-in.ts';

/** What a route is asked so that it does what it is for. */
export interface RealRequest {
  readonly path: string;
  readonly body?: object;
  /** The status where nothing stands in the way; 2xx without one. */
  readonly status?: number;
}

/** Who asks, and where; the administrator makes what a request needs. */
interface Asking {
  readonly served: Served;
  readonly administrator: SignedIn;
  readonly person: SignedIn;
  /** Whose alarm waits for this person alone. */
  readonly guarantee: string;
  /** Account that others change, with a PIN. */
  readonly target: string;
}

const pin = '2846';
const why = 'to see whether it works';
let made = 0;

type Prepare = (asking: Asking) => RealRequest | Promise<RealRequest>;

const source = async ({ administrator }: Asking): Promise<string> => {
  made += 1;
  const name = `tester-${made}`;
  await administrator.json('POST', '/api/sources', { name, stations: ['A.leak-test'], why });
  return name;
};

async function otherSession({ served, person }: Asking): Promise<string> {
  await fetch(`${served.address}/api/sign-in`, { method: 'POST', headers: { 'content-type': 'application/json' }, body: JSON.stringify({ name: person.name, password }) });
  const sessions = await person.json<{ id: string; current: boolean }[]>('GET', '/api/own/sessions');
  return sessions.find(({ current }) => !current)!.id;
}

/** By method and path as described; a route that is not here needs nothing but to be asked. */
const prepared: Readonly<Record<string, Prepare>> = {
  'GET /api/guarantees/{id}/history': () => ({ path: '/api/guarantees/leak-A/history?from=0&to=253402300799999' }),
  'POST /api/guarantees/{id}/restart': () => ({ path: '/api/guarantees/leak-A/restart', body: { reason: why } }),
  'POST /api/alarms/{id}/acknowledge': async ({ administrator, guarantee }) => {
    const standing = await administrator.json<Alarm[]>('GET', '/api/alarms/standing');
    return { path: `/api/alarms/${standing.find((alarm) => alarm.guarantee === guarantee)!.id}/acknowledge`, body: { note: why } };
  },
  'POST /api/plant/check': async ({ administrator }) => ({ path: '/api/plant/check', body: { text: (await administrator.json<{ text: string }>('GET', '/api/plant')).text } }),
  'PUT /api/plant': async ({ administrator }) => {
    const { text, version } = await administrator.json<{ text: string; version: string }>('GET', '/api/plant');
    return { path: '/api/plant', body: { text: `${text}# read again\n`, was: version, why } };
  },
  'POST /api/sources': () => ({ path: '/api/sources', body: { name: `maker-${(made += 1)}`, stations: ['A.leak-test'], why } }),
  'POST /api/sources/{name}/renew': async (asking) => ({ path: `/api/sources/${await source(asking)}/renew`, body: { overlapHours: 1, why } }),
  'POST /api/sources/{name}/withdraw': async (asking) => ({ path: `/api/sources/${await source(asking)}/withdraw`, body: { why } }),
  'PUT /api/accounts/{id}': ({ target }) => ({ path: `/api/accounts/${target}`, body: { shownAs: `Target ${(made += 1)}`, why } }),
  'POST /api/accounts/{id}/new-password-link': ({ target }) => ({ path: `/api/accounts/${target}/new-password-link`, body: { why } }),
  'POST /api/accounts/{id}/sign-out-everywhere': ({ target }) => ({ path: `/api/accounts/${target}/sign-out-everywhere`, body: { why } }),
  'POST /api/invitations': () => ({ path: '/api/invitations', body: { grants: [{ role: 'viewer', line: 'A' }] } }),
  'DELETE /api/invitations/{id}': async ({ administrator }) => {
    const { id } = await administrator.json<{ id: string }>('POST', '/api/invitations', { grants: [{ role: 'viewer', line: null }] });
    return { path: `/api/invitations/${id}`, body: {} };
  },
  'POST /api/displays': () => ({ path: '/api/displays', body: { name: 'Hall 2', line: 'A' } }),
  'DELETE /api/displays/{id}': async ({ administrator }) => {
    const { id } = await administrator.json<{ id: string }>('POST', '/api/displays', { name: 'Hall 3' });
    return { path: `/api/displays/${id}`, body: {} };
  },
  'DELETE /api/own/sessions/{id}': async (asking) => ({ path: `/api/own/sessions/${await otherSession(asking)}`, body: {} }),
  'POST /api/own/password': () => ({ path: '/api/own/password', body: { old: password, new: password } }),
  'PUT /api/own/pin': () => ({ path: '/api/own/pin', body: { password, pin } }),
  'DELETE /api/own/pin': () => ({ path: '/api/own/pin', body: { password } }),
  'POST /api/own/tokens': () => ({ path: '/api/own/tokens', body: { name: 'mine', actions: ['see'], days: 1 } }),
  'DELETE /api/own/tokens/{id}': async ({ person }) => {
    const { id } = await person.json<{ id: string }>('POST', '/api/own/tokens', { name: 'mine for a while', actions: ['see'], days: 1 });
    return { path: `/api/own/tokens/${id}`, body: {} };
  },
  'POST /api/own/passkeys/begin': () => ({ path: '/api/own/passkeys/begin', body: { password } }),
  // These two need a device: the test of the pages has one.
  'POST /api/own/passkeys/finish': () => ({ path: '/api/own/passkeys/finish', body: { name: 'key', answer: { id: 'none' } }, status: 400 }),
  'DELETE /api/own/passkeys/{id}': () => ({ path: '/api/own/passkeys/none', body: { password }, status: 404 }),
  'POST /api/terminal/act-as': ({ target }) => ({ path: '/api/terminal/act-as', body: { account: target, pin } }),
};

/** What a route is asked so that it answers as it is meant to. @param path as described, with {name} */
export async function realRequest(method: string, path: string, asking: Asking): Promise<RealRequest> {
  const prepare = prepared[`${method} ${path}`];
  if (prepare !== undefined) return prepare(asking);
  const real = path.replace('{id}', 'leak-A');
  return method === 'GET' ? { path: real } : { path: real, body: {} };
}

/** Makes the account that others change. */
export async function targetOf(administrator: SignedIn): Promise<string> {
  const person = await administrator.invite('target', 'supervisor', null);
  await person.ask('PUT', '/api/own/pin', { password, pin });
  const accounts = await administrator.json<{ id: string; name: string }[]>('GET', '/api/accounts');
  return accounts.find(({ name }) => name === 'target')!.id;
}
