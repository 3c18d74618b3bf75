import { NotAllowed } from '../refusals.ts';
import { route, type AnyRoute } from '../route.ts';
import { ceremonyAnswer, passkeyMadeAnswer, passkeysAnswer, signedInAnswer } from './access-answers.ts';
import { accountOf, cookieOf, originOf, placeOf, type AccessHost } from './access-host.ts';
import { idParams, makePasskeyRequest, passkeyAnswerRequest, passkeyBeginRequest, passwordAgainRequest } from './access-schemas.ts';

const own = { action: 'keep-own-account', at: 'somewhere' } as const;

/** Passkeys: one's own, and signing in by them. */
export function passkeyRoutes(host: AccessHost): readonly AnyRoute[] {
  const { passkeys, book } = host;
  return [
    route({
      method: 'GET', path: '/api/own/passkeys', summary: 'Own passkeys', needs: own, answer: passkeysAnswer,
      handle: ({ caller }) => book.passkeysOf(accountOf(caller)).map(([id, { name, made, lastUsed }]) => ({ id, name, made, lastUsed })),
    }),
    route({
      method: 'POST', path: '/api/own/passkeys/begin', summary: 'What a device needs to make a passkey', needs: own, body: passwordAgainRequest, answer: ceremonyAnswer,
      handle: async ({ body: { password }, caller, request }) => {
        if (caller.kind !== 'account') throw new NotAllowed('Only the person signed in does this, no token and no display.');
        await host.own.again(accountOf(caller), password);
        return passkeys.beginMaking(accountOf(caller), placeOf(request));
      },
    }),
    route({
      method: 'POST', path: '/api/own/passkeys/finish', summary: 'Keeps the passkey that was made', needs: own, body: makePasskeyRequest, answer: passkeyMadeAnswer,
      handle: ({ body: { name, answer }, caller, request }) => passkeys.finishMaking(accountOf(caller), name, answer, placeOf(request)),
    }),
    route({
      method: 'DELETE', path: '/api/own/passkeys/:id', summary: 'Removes a passkey', needs: own, params: idParams, body: passwordAgainRequest, answer: 'nothing',
      handle: async ({ params: { id }, body: { password }, caller, reply }) => {
        if (caller.kind !== 'account') throw new NotAllowed('Only the person signed in does this, no token and no display.');
        await host.own.again(accountOf(caller), password);
        await passkeys.remove(accountOf(caller), id);
        return reply.status(204).send();
      },
    }),
    route({
      method: 'POST', path: '/api/sign-in/passkey/begin', summary: 'What a device needs to answer for somebody', needs: 'nobody', body: passkeyBeginRequest, answer: ceremonyAnswer,
      handle: ({ body: { ticket }, request }) => passkeys.beginSignIn(ticket, placeOf(request)),
    }),
    route({
      method: 'POST', path: '/api/sign-in/passkey/finish', summary: 'Signs in by a passkey, alone or after the password', needs: 'nobody', body: passkeyAnswerRequest, answer: signedInAnswer,
      handle: async ({ body: { ticket, answer }, request, reply }) => {
        const begun = await passkeys.finishSignIn(ticket, answer, placeOf(request), originOf(request));
        return reply.header('set-cookie', cookieOf(begun, request, host.sessionSeconds)).send({ name: begun.name });
      },
    }),
  ];
}
