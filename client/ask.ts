/** What the server refused or could not do: its own sentence, the field it names, how long to wait before the next try. */
export class Refusal extends Error {
  readonly status: number;
  /** As in the body that was sent; undefined where the refusal names none. */
  readonly field: string | undefined;
  readonly retryAfterS: number | undefined;

  constructor(status: number, message: string, field?: string, retryAfterS?: number) {
    super(message);
    this.status = status;
    this.field = field;
    this.retryAfterS = retryAfterS;
  }
}

export type Method = 'GET' | 'POST' | 'PUT' | 'DELETE';

/** Asks the server. Absence in the answer is undefined. @throws Refusal, Error where nothing answers; each with a message a person can read */
export type Ask = <T = void>(method: Method, path: string, body?: object) => Promise<T>;

/** Longest wait for an answer, ms. */
const patienceMs = 30_000;

/** @param onUnknown  called when the server no longer knows who asks */
export function askServer(onUnknown: () => void): Ask {
  return async <T>(method: Method, path: string, body?: object): Promise<T> => {
    const init = body === undefined ? {} : { body: JSON.stringify(body), headers: { accept: 'application/json', 'content-type': 'application/json' } };
    const response = await fetch(path, { method, headers: { accept: 'application/json' }, signal: AbortSignal.timeout(patienceMs), ...init }).catch((cause: unknown) => {
      throw new Error('the server does not answer', { cause });
    });
    const text = await response.text();
    if (response.ok) return (text === '' ? undefined : JSON.parse(text, withoutNull)) as T;
    if (response.status === 401) onUnknown();
    throw refusalIn(response, text);
  };
}

/** JSON knows no absence but null. In a list it keeps its place: a step of a history without a value. */
function withoutNull(this: unknown, _key: string, value: unknown): unknown {
  return value === null && !Array.isArray(this) ? undefined : value;
}

/** The server's own sentence, where its refusal carries one. */
function refusalIn(response: Response, text: string): Refusal {
  const said = saidIn(text);
  const wait = Number(response.headers.get('retry-after') ?? Number.NaN);
  return new Refusal(response.status, said.message ?? `the server answered ${response.status}`, said.field, Number.isFinite(wait) ? wait : undefined);
}

function saidIn(text: string): { readonly message?: string | undefined; readonly field?: string | undefined } {
  try {
    const value: unknown = JSON.parse(text.slice(0, 4_000));
    if (typeof value !== 'object' || value === null) return {};
    const said = (name: string): string | undefined => {
      const part = (value as Readonly<Record<string, unknown>>)[name];
      return typeof part === 'string' && part !== '' ? part : undefined;
    };
    return { message: said('message'), field: said('field') };
  } catch {
    return {}; // Not JSON: a proxy's page, say. The status is told instead.
  }
}

/** A failure as a clause: 'the server does not answer'. */
export const reasonOf = (cause: unknown): string => (cause instanceof Error ? cause.message : String(cause)).replace(/\.$/, '');
