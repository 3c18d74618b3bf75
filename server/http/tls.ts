import { readFileSync, statSync } from 'node:fs';
import type { Server } from 'node:https';
import { createSecureContext } from 'node:tls';
import type { Logger } from 'pino';
import { BadSetting, type Settings } from '../settings/settings.ts';

/** Certificate and key as they stand in their files. */
export interface TlsPair {
  readonly cert: Buffer;
  readonly key: Buffer;
}

type TlsFiles = Pick<Settings, 'tlsCert' | 'tlsKey'>;

/** @returns undefined without the settings @throws BadSetting naming the file that cannot be used */
export function tlsPair({ tlsCert, tlsKey }: TlsFiles): TlsPair | undefined {
  if (tlsCert === undefined && tlsKey === undefined) return undefined;
  if (tlsCert === undefined) throw new BadSetting('tls-cert: is missing beside tls-key; expected the file of the certificate');
  if (tlsKey === undefined) throw new BadSetting('tls-key: is missing beside tls-cert; expected the file of the key');
  const pair = { cert: fileOf('tls-cert', tlsCert), key: fileOf('tls-key', tlsKey) };
  try {
    createSecureContext({ ...pair, minVersion: 'TLSv1.2' });
  } catch (cause) {
    throw new BadSetting(`tls-cert, tls-key: ${tlsCert} and ${tlsKey} do not fit together: ${(cause as Error).message}`);
  }
  return pair;
}

function fileOf(name: string, path: string): Buffer {
  try {
    return readFileSync(path);
  } catch (cause) {
    throw new BadSetting(`${name}: ${path} cannot be read: ${(cause as Error).message}`);
  }
}

/** Takes up another certificate when its files change; one that cannot be used changes nothing. @returns asks the files once */
export function tlsReload(server: Server, files: TlsFiles, log: Logger): () => void {
  let known = stamp(files);
  return () => {
    const now = stamp(files);
    if (now === known) return;
    known = now;
    try {
      const pair = tlsPair(files);
      if (pair !== undefined) server.setSecureContext({ ...pair, minVersion: 'TLSv1.2' });
      log.info('another certificate is in use');
    } catch (cause) {
      log.error({ err: cause }, 'the changed certificate cannot be used; the one before stays in use');
    }
  };
}

function stamp({ tlsCert = '', tlsKey = '' }: { tlsCert?: string | undefined; tlsKey?: string | undefined }): string {
  return [tlsCert, tlsKey].map((path) => {
    try {
      const { mtimeMs, size, ino } = statSync(path);
      return `${mtimeMs} ${size} ${ino}`;
    } catch {
      return 'not there';
    }
  }).join(', ');
}
