import { NotAllowed, NotFound } from '../refusals.ts';
import { route, type AnyRoute } from '../route.ts';
import type { Caller } from '../../access/caller.ts';
import { changesAnswer } from '../answers/record-answers.ts';
import { sessionsAnswer, tokenAnswer, tokensAnswer } from './access-answers.ts';
import { accountOf, nameOf, type AccessHost } from './access-host.ts';
import { idParams, passwordRequest, passwordAgainRequest, pinRequest, tokenRequest } from './access-schemas.ts';

const own = { action: 'keep-own-account', at: 'somewhere' } as const;

/** A token changes nothing of its owner's account: who found one must not be able to make more of it. */
function person(caller: Caller): string {
  if (caller.kind !== 'account') throw new NotAllowed('Only the person signed in does this, no token and no display.');
  return accountOf(caller);
}

/** What people do with their own account. */
export function ownRoutes(host: AccessHost): readonly AnyRoute[] {
  const { book, signIn } = host;
  return [
    route({
      method: 'GET', path: '/api/own/sessions', summary: 'Where one is signed in', needs: own, answer: sessionsAnswer,
      handle: ({ caller }) => book.sessionsOf(accountOf(caller)).map(([id, { made, lastSeen, address, agent }]) => ({ id, made, lastSeen, address, agent, current: id === caller.by })),
    }),
    route({
      method: 'DELETE', path: '/api/own/sessions/:id', summary: 'Ends one of the own sessions', needs: own, params: idParams, answer: 'nothing',
      handle: async ({ params: { id }, caller, reply }) => {
        if (!book.sessionsOf(person(caller)).some(([session]) => session === id)) throw new NotFound('there is no such session');
        await signIn.end(person(caller), nameOf(caller), '', (session) => session === id);
        return reply.status(204).send();
      },
    }),
    route({
      method: 'POST', path: '/api/own/sign-out-everywhere', summary: 'Ends all own sessions, this one too', needs: own, answer: 'nothing',
      handle: async ({ caller, reply }) => {
        await signIn.end(person(caller), nameOf(caller), '', () => true);
        return reply.status(204).send();
      },
    }),
    route({
      method: 'POST', path: '/api/own/password', summary: 'Sets a new password and ends the other sessions', needs: own, body: passwordRequest, answer: 'nothing',
      handle: async ({ body, caller, reply }) => {
        await host.own.changePassword(person(caller), caller.by ?? '', body.old, body.new);
        return reply.status(204).send();
      },
    }),
    route({
      method: 'PUT', path: '/api/own/pin', summary: 'Sets the PIN for shared terminals', needs: own, body: pinRequest, answer: 'nothing',
      handle: async ({ body: { password, pin }, caller, reply }) => {
        await host.own.setPin(person(caller), password, pin);
        return reply.status(204).send();
      },
    }),
    route({
      method: 'DELETE', path: '/api/own/pin', summary: 'Takes the PIN away', needs: own, body: passwordAgainRequest, answer: 'nothing',
      handle: async ({ body: { password }, caller, reply }) => {
        await host.own.setPin(person(caller), password, undefined);
        return reply.status(204).send();
      },
    }),
    route({
      method: 'GET', path: '/api/own/changes', summary: 'What happened to the own account lately, newest first', needs: own, answer: changesAnswer,
      handle: ({ caller }) => host.own.lately(accountOf(caller)),
    }),
    route({
      method: 'GET', path: '/api/own/tokens', summary: 'Own API tokens', needs: own, answer: tokensAnswer,
      handle: ({ caller }) =>
        book.tokens.entries().filter(([, token]) => token.account === accountOf(caller))
          .map(([id, { name, actions, grants, made, expires, lastUsed }]) => ({ id, name, actions, grants, made, expires, lastUsed })),
    }),
    route({
      method: 'POST', path: '/api/own/tokens', summary: 'Makes an API token; it is shown this once', needs: own, body: tokenRequest, answer: tokenAnswer,
      handle: ({ body: { name, actions, grants = null, days }, caller }) => host.own.makeToken(person(caller), { name, actions, grants, days }),
    }),
    route({
      method: 'DELETE', path: '/api/own/tokens/:id', summary: 'Revokes an API token', needs: own, params: idParams, answer: 'nothing',
      handle: async ({ params: { id }, caller, reply }) => {
        await host.own.revokeToken(person(caller), id);
        return reply.status(204).send();
      },
    }),
  ];
}
