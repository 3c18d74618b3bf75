import type { IncomingHttpHeaders } from 'node:http';

/**
 * Whether a browser sends this for a page of another place: that page may neither open a socket nor change anything
 * here. Programs name no origin and are let through: a token speaks for them, or what they do is open to all.
 * Only host and port are compared, so that a proxy in front may end TLS as long as it leaves `Host` as it was, or is
 * trusted to say it.
 *
 * @param host that the client asked for
 *
 * @source IETF RFC 6454 section 7; RFC 6455 section 10.2 (from memory)
 */
export function hasForeignOrigin(headers: IncomingHttpHeaders, host: string | undefined = headers.host): boolean {
  const { origin } = headers;
  if (origin === undefined) return headers['sec-fetch-site'] === 'cross-site';
  return !URL.canParse(origin) || new URL(origin).host === '' || new URL(origin).host !== host?.toLowerCase();
}
