import type { FastifyRequest } from 'fastify';
import type { Caller } from '../../access/caller.ts';
import type { DirectoryFault } from '../../../core/access/directory-fault.ts';
import { DirectoryRefusal, type Directory } from '../../access/directory.ts';
import { route, type AnyRoute } from '../route.ts';
import { cookieOf, isSecure, originOf, placeOf, type AccessHost } from './access-host.ts';

const cookieName = 'vouchline-directory';
const back = '/api/sign-in/directory/back';

/** Ties the way back to the browser that began: Lax, because the directory sends it back from another place. */
const cookie = (state: string, secure: boolean, seconds: number): string =>
  `${cookieName}=${state}; Path=/api/sign-in/directory; HttpOnly; SameSite=Lax; Max-Age=${seconds}${secure ? '; Secure' : ''}`;

const stateOf = ({ headers }: FastifyRequest): string | undefined =>
  (headers.cookie ?? '').split(';').map((part) => part.trim()).find((part) => part.startsWith(`${cookieName}=`))?.slice(cookieName.length + 1);

const sentBack = (fault: DirectoryFault): string => `/sign-in?fault=${fault}`;

/** Signing in through the plant's directory: there and back. */
export function directoryRoutes(host: AccessHost, directory: Directory): readonly AnyRoute[] {
  return [
    route({
      method: 'GET', path: '/api/sign-in/directory', summary: 'Sends the browser to the directory; who is signed in links their account', needs: 'nobody', answer: 'elsewhere',
      handle: async ({ caller, request, reply }) => {
        const asker = caller as Caller | undefined;
        const begun = await directory.begin(`${placeOf(request).origin}${back}`, asker?.kind === 'account' ? asker.account : undefined).catch((cause: unknown) => {
          request.log.warn({ err: cause }, 'the directory cannot be asked');
        });
        if (begun === undefined) return reply.redirect(sentBack('unreachable'), 302);
        const { to, state } = begun;
        return reply.header('set-cookie', cookie(state, isSecure(request), 300)).redirect(to, 302);
      },
    }),
    route({
      method: 'GET', path: back, summary: 'Where the directory sends the browser back to', needs: 'nobody', answer: 'elsewhere',
      handle: async ({ request, reply }) => {
        reply.header('set-cookie', cookie('', isSecure(request), 0));
        let account: string;
        try {
          account = await directory.finish(new URL(request.url, placeOf(request).origin), stateOf(request));
        } catch (cause) {
          return reply.redirect(sentBack(cause instanceof DirectoryRefusal ? cause.fault : 'unreachable'), 302);
        }
        const begun = await host.signIn.begin(account, originOf(request), 'directory');
        return reply.header('set-cookie', cookieOf(begun, request, host.sessionSeconds)).redirect('/', 302);
      },
    }),
  ];
}
