import type { IncomingMessage } from 'node:http';
import proxyAddr from '@fastify/proxy-addr';
import { BadSetting } from '../settings/settings.ts';

/**
 * The proxies in front of this server, named one by one: what they say of a client is believed, and what anybody else
 * says is not.
 */
export interface Hops {
  trusts(address: string): boolean;
  /** Address of the client, past the trusted hops. */
  addressOf(request: IncomingMessage): string;
  /** Host the client asked for; the last trusted hop may say it. */
  hostOf(request: IncomingMessage): string | undefined;
  /** Whether the client came by TLS, to this server or to the trusted hop before it. */
  isSecure(request: IncomingMessage): boolean;
}

/**
 * @param named addresses and networks, separated by commas: 127.0.0.1, 10.0.0.0/8; empty: none
 * @throws BadSetting naming what is no address
 */
export function hopsOf(named: string): Hops {
  const list = named.split(',').map((one) => one.trim()).filter((one) => one !== '');
  const trust = compiled(list);
  const trusts = (address: string): boolean => list.length > 0 && trust(address, 0);
  const said = (request: IncomingMessage, name: string): string | undefined => {
    if (!trusts(request.socket.remoteAddress ?? '')) return undefined;
    const value = request.headers[name];
    return typeof value === 'string' ? value.split(',').at(-1)?.trim() : undefined;
  };
  return {
    trusts,
    addressOf: (request) => (list.length === 0 ? (request.socket.remoteAddress ?? '') : proxyAddr(request, trust)),
    hostOf: (request) => said(request, 'x-forwarded-host') ?? request.headers.host,
    isSecure: (request) => 'encrypted' in request.socket || said(request, 'x-forwarded-proto') === 'https',
  };
}

function compiled(list: string[]): (address: string, hop: number) => boolean {
  try {
    return proxyAddr.compile(list);
  } catch (cause) {
    throw new BadSetting(`trusted-hops: ${(cause as Error).message}; expected addresses or networks, e.g. 127.0.0.1, 10.0.0.0/8`);
  }
}
