import { isLoopback } from './open-access.ts';

/**
 * Whether a request asked for a host that is not this machine by one of its own names. Where access is open, being on
 * this machine is what lets somebody in: a page of another place whose name was made to lead here is not.
 *
 * @param host as it was asked for, with or without its port
 */
export function isForeignHost(host: string | undefined): boolean {
  const asked = `http://${host ?? ''}`;
  if (!URL.canParse(asked)) return true;
  return !isLoopback(new URL(asked).hostname.replace(/^\[(.*)\]$/, '$1'));
}
