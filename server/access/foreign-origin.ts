import type { IncomingHttpHeaders } from 'node:http';

/**
 * Whether a browser sends this for a page of another place: that page may neither open a socket nor change anything
 * here. Programs name no origin and are let through: a token speaks for them, or what they do is open to all.
 * Host and port are compared, and that a page asking by TLS came by TLS; a proxy in front that nobody named may end TLS
 * as long as it leaves `Host` as it was.
 *
 * @param host that the client asked for
 * @param secure whether the client came by TLS
 *
 * @source IETF RFC 6454 section 7; RFC 6455 section 10.2 (from memory)
 */
export function hasForeignOrigin(headers: IncomingHttpHeaders, host: string | undefined = headers.host, secure = false): boolean {
  const { origin } = headers;
  if (origin === undefined) return headers['sec-fetch-site'] === 'cross-site';
  if (!URL.canParse(origin)) return true;
  const { host: from, protocol } = new URL(origin);
  return from === '' || from !== host?.toLowerCase() || (secure && protocol !== 'https:');
}
