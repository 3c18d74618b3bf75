import { BadSetting, type Settings } from '../settings/settings.ts';
import type { DirectorySetting } from './directory.ts';
import { isLoopback } from './open-access.ts';

/** @returns undefined where no directory is set up @throws BadSetting naming what is missing or no address */
export function directorySetting({ directoryIssuer: issuer, directoryClient: clientId, directorySecret: clientSecret, directoryName: name }: Settings): DirectorySetting | undefined {
  if (issuer === undefined) return undefined;
  if (clientId === undefined) throw new BadSetting('directory-client: is missing beside directory-issuer; expected the client id that the provider knows');
  if (clientSecret === undefined) throw new BadSetting('directory-secret: is missing beside directory-issuer; expected the client secret');
  const url = URL.canParse(issuer) ? new URL(issuer) : undefined;
  const safe = url?.protocol === 'https:' || (url?.protocol === 'http:' && isLoopback(url.hostname));
  if (!safe) throw new BadSetting(`directory-issuer: ${JSON.stringify(issuer)}; expected an address with https`);
  return { issuer, clientId, clientSecret, name };
}
