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

/** Whether only this machine reaches an address. */
export const isLoopback = (host: string): boolean => host === 'localhost' || host === '::1' || /^127(\.\d{1,3}){3}$/.test(host);
