import type { IncomingHttpHeaders } from 'node:http';

/** The token of `Authorization: Bearer …`; undefined where there is none. */
export function bearerToken(headers: IncomingHttpHeaders): string | undefined {
  const said = /^Bearer ([\x21-\x7e]{1,512})$/i.exec(headers.authorization ?? '');
  return said?.[1];
}
