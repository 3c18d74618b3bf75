import type { Caller } from '../../access/caller.ts';
import { hashOfSecret } from '../../access/secret.ts';
import { sessionCookie } from '../../access/session-cookie.ts';
import { NotSignedIn } from '../refusals.ts';
import { route, type AnyRoute } from '../route.ts';
import { invitationLookAnswer, signedInAnswer, signInAnswer } from './access-answers.ts';
import { cookieOf, isSecure, nameOf, originOf, type AccessHost } from './access-host.ts';
import { acceptRequest, codeRequest, displaySignInRequest, signInRequest } from './access-schemas.ts';

/** A display keeps its cookie for ten years: its token is what is revoked. */
const displaySeconds = 10 * 365 * 86_400;

/** Coming in and going out. */
export function signInRoutes(host: AccessHost): readonly AnyRoute[] {
  const { signIn, invitations, sessionSeconds } = host;
  return [
    route({
      method: 'POST', path: '/api/sign-in', summary: 'Signs in by name and password', needs: 'nobody', body: signInRequest, answer: signInAnswer,
      handle: async ({ body: { name, password }, request, reply }) => {
        const account = await signIn.check(name, password, originOf(request));
        const ticket = host.passkeys.ticketFor(account);
        if (ticket !== undefined) return { second: 'passkey', ticket };
        const begun = await signIn.begin(account, originOf(request), 'password');
        return reply.header('set-cookie', cookieOf(begun, request, sessionSeconds)).send({ name: begun.name });
      },
    }),
    route({
      method: 'POST', path: '/api/sign-out', summary: 'Ends this session', needs: 'nobody', answer: 'nothing',
      handle: async ({ caller, request, reply }) => {
        const { account, by } = (caller as Caller | undefined) ?? {};
        if (account !== undefined && by !== undefined) await signIn.end(account, nameOf(caller), '', (id) => id === by);
        return reply.status(204).header('set-cookie', sessionCookie('', isSecure(request), 0)).send();
      },
    }),
    route({
      method: 'POST', path: '/api/invitations/look', summary: 'What an invitation is for', needs: 'nobody', body: codeRequest, answer: invitationLookAnswer,
      handle: ({ body: { code } }) => {
        const [, { kind, grants, account, shownAs, expires }] = invitations.look(code);
        return { kind, grants, account: account === null ? null : (host.book.accounts.get(account)?.name ?? null), shownAs, expires };
      },
    }),
    route({
      method: 'POST', path: '/api/invitations/accept', summary: 'Makes an account or a new password by an invitation', needs: 'nobody', body: acceptRequest, answer: signedInAnswer,
      handle: async ({ body: { code, ...person }, request, reply }) => {
        const account = await invitations.accept(code, person);
        const begun = await signIn.begin(account, originOf(request), 'invitation');
        return reply.header('set-cookie', cookieOf(begun, request, sessionSeconds)).send({ name: begun.name });
      },
    }),
    route({
      method: 'POST', path: '/api/display/sign-in', summary: 'Signs in a screen by its token', needs: 'nobody', body: displaySignInRequest, answer: signedInAnswer,
      handle: ({ body: { token }, request, reply }) => {
        const hash = hashOfSecret(token);
        const found = host.book.displays.find((display) => display.hash === hash);
        if (found === undefined) throw new NotSignedIn('This display is not known, or was revoked.');
        return reply.header('set-cookie', sessionCookie(token, isSecure(request), displaySeconds)).send({ name: found[1].name });
      },
    }),
  ];
}
