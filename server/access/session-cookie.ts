import type { IncomingHttpHeaders } from 'node:http';

/** __Host-: browsers take it only with Secure, Path=/ and no Domain, so that no other host of the plant can set it. */
const names = { secure: '__Host-vouchline-session', plain: 'vouchline-session' } as const;

/** The secret of the session cookie; undefined without one. */
export function sessionSecret({ cookie = '' }: IncomingHttpHeaders): string | undefined {
  for (const name of [names.secure, names.plain]) {
    const found = cookie.split(';').map((part) => part.trim()).find((part) => part.startsWith(`${name}=`));
    if (found !== undefined) return found.slice(name.length + 1);
  }
  return undefined;
}

/** @param seconds how long the browser keeps it; 0 takes it away */
export function sessionCookie(secret: string, secure: boolean, seconds: number): string {
  return `${secure ? names.secure : names.plain}=${secret}; Path=/; HttpOnly; SameSite=Strict; Max-Age=${seconds}${secure ? '; Secure' : ''}`;
}
