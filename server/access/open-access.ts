import type { Settings } from '../settings/settings.ts';
import { BadSetting } from '../settings/settings.ts';

/**
 * Access without accounts is for one machine.
 *
 * @throws BadSetting where others could reach the server
 */
export function checkOpenAccess({ access, host }: Pick<Settings, 'access' | 'host'>): void {
  if (access === 'accounts' || isLoopback(host)) return;
  throw new BadSetting(`access: open, with host ${host}: whoever reaches this address could do everything; expected access accounts, or a host of this machine alone (127.0.0.1)`);
}

/**
 * Beyond one machine passwords and records travel by TLS, or somebody said that they need not.
 *
 * @throws BadSetting saying what to do
 */
export function checkPlainHttp({ host, tlsCert, plainHttp }: Pick<Settings, 'host' | 'tlsCert' | 'plainHttp'>): void {
  if (tlsCert !== undefined || plainHttp === 'allowed' || isLoopback(host)) return;
  throw new BadSetting(`plain-http: refused, with host ${host} and no tls-cert: passwords and records could be read on the way; give tls-cert and tls-key, let a proxy on this machine end TLS (host 127.0.0.1, trusted-hops 127.0.0.1), or say plain-http allowed`);
}

/** Whether only this machine reaches an address. */
export const isLoopback = (host: string): boolean => host === 'localhost' || host === '::1' || /^127(\.\d{1,3}){3}$/.test(host);
