import type * as v from 'valibot';
import type { Account } from '../../access/access-items.ts';
import { changeAccount } from '../../access/accounts.ts';
import { route, type AnyRoute } from '../route.ts';
import { accountAnswer, accountsAnswer, invitationLinkAnswer, invitationsAnswer, newPasswordLinkAnswer } from './access-answers.ts';
import { nameOf, type AccessHost } from './access-host.ts';
import { accountRequest, idParams, inviteRequest, whyRequest } from './access-schemas.ts';

const manages = { action: 'manage-accounts', at: 'plant' } as const;

/** Accounts and invitations, for those who manage them. */
export function accountRoutes(host: AccessHost): readonly AnyRoute[] {
  const { book, invitations, signIn } = host;
  const shown = (id: string, { name, shownAs, grants, made, lastSeen, disabled, password, pin }: Account): v.InferOutput<typeof accountAnswer> => ({
    id, name, shownAs, grants, made, lastSeen, disabled, hasPassword: password !== null, hasPin: pin !== null, passkeys: book.passkeysOf(id).length, sessions: book.sessionsOf(id).length,
  });
  const link = (code: string): string => `/join#${code}`;
  return [
    route({
      method: 'GET', path: '/api/accounts', summary: 'All accounts', needs: manages, answer: accountsAnswer,
      handle: () => book.accounts.entries().map(([id, account]) => shown(id, account)),
    }),
    route({
      method: 'PUT', path: '/api/accounts/:id', summary: 'Changes roles, name shown, or whether an account may be used', needs: manages, params: idParams, body: accountRequest, answer: accountAnswer,
      handle: async ({ params: { id }, body: { why, ...change }, caller }) => shown(id, await changeAccount(book, nameOf(caller), id, change, why)),
    }),
    route({
      method: 'POST', path: '/api/accounts/:id/new-password-link', summary: 'A link by which somebody sets a new password', needs: manages, params: idParams, body: whyRequest, answer: newPasswordLinkAnswer,
      handle: async ({ params: { id }, body: { why }, caller }) => {
        const { code, expires } = await invitations.newPassword(nameOf(caller), id, why);
        return { link: link(code), expires };
      },
    }),
    route({
      method: 'POST', path: '/api/accounts/:id/sign-out-everywhere', summary: 'Ends all sessions of an account', needs: manages, params: idParams, body: whyRequest, answer: 'nothing',
      handle: async ({ params: { id }, body: { why }, caller, reply }) => {
        await signIn.end(id, nameOf(caller), why, () => true);
        return reply.status(204).send();
      },
    }),
    route({
      method: 'GET', path: '/api/invitations', summary: 'Invitations that were not used yet', needs: manages, answer: invitationsAnswer,
      handle: () => book.invitations.entries().filter(([, { expires }]) => expires > book.now()).map(([id, { kind, grants, shownAs, made, by, expires }]) => ({ id, kind, grants, shownAs, made, by, expires })),
    }),
    route({
      method: 'POST', path: '/api/invitations', summary: 'A link by which somebody makes an account', needs: manages, body: inviteRequest, answer: invitationLinkAnswer,
      handle: async ({ body: { grants, shownAs, days }, caller }) => {
        const { id, code, expires } = await invitations.invite(nameOf(caller), grants, shownAs, days);
        return { id, link: link(code), expires };
      },
    }),
    route({
      method: 'DELETE', path: '/api/invitations/:id', summary: 'Withdraws an invitation', needs: manages, params: idParams, answer: 'nothing',
      handle: async ({ params: { id }, caller, reply }) => {
        await invitations.withdraw(nameOf(caller), id);
        return reply.status(204).send();
      },
    }),
  ];
}
