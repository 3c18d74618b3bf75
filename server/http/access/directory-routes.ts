import type { FastifyRequest } from 'fastify';
import type { Caller } from '../../access/caller.ts';
import type { Directory } from '../../access/directory.ts';
import { route, type AnyRoute } from '../route.ts';
import { cookieOf, isSecure, originOf, placeOf, type AccessHost } from './access-host.ts';

const cookieName = 'vouchline-directory';
const back = '/api/sign-in/directory/back';

/** Ties the way back to the browser that began: Lax, because the directory sends it back from another place. */
const cookie = (state: string, secure: boolean, seconds: number): string =>
  `${cookieName}=${state}; Path=/api/sign-in/directory; HttpOnly; SameSite=Lax; Max-Age=${seconds}${secure ? '; Secure' : ''}`;

const stateOf = ({ headers }: FastifyRequest): string | undefined =>
  (headers.cookie ?? '').split(';').map((part) => part.trim()).find((part) => part.startsWith(`${cookieName}=`))?.slice(cookieName.length + 1);

/** Signing in through the plant's directory: there and back. */
export function directoryRoutes(host: AccessHost, directory: Directory): readonly AnyRoute[] {
  return [
    route({
      method: 'GET', path: '/api/sign-in/directory', summary: 'Sends the browser to the directory; who is signed in links their account', needs: 'nobody', answer: 'text/html',
      handle: async ({ caller, request, reply }) => {
        const asker = caller as Caller | undefined;
        const { to, state } = await directory.begin(`${placeOf(request).origin}${back}`, asker?.kind === 'account' ? asker.account : undefined);
        return reply.header('set-cookie', cookie(state, isSecure(request), 300)).redirect(to, 302);
      },
    }),
    route({
      method: 'GET', path: back, summary: 'Where the directory sends the browser back to', needs: 'nobody', answer: 'text/html',
      handle: async ({ request, reply }) => {
        reply.header('set-cookie', cookie('', isSecure(request), 0));
        let account: string;
        try {
          account = await directory.finish(new URL(request.url, placeOf(request).origin), stateOf(request));
        } catch (cause) {
          const words = 'statusCode' in (cause as object) ? (cause as Error).message : 'The directory cannot be reached.';
          return reply.redirect(`/sign-in?fault=${encodeURIComponent(words)}`, 302);
        }
        const begun = await host.signIn.begin(account, originOf(request), 'directory');
        return reply.header('set-cookie', cookieOf(begun, request, host.sessionSeconds)).redirect('/', 302);
      },
    }),
  ];
}
