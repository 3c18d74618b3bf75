import { makeDisplay, revokeDisplay } from '../../access/displays.ts';
import { BadRequest } from '../request-schemas.ts';
import { route, type AnyRoute } from '../route.ts';
import { displayLinkAnswer, displaysAnswer } from './access-answers.ts';
import { nameOf, type AccessHost } from './access-host.ts';
import { displayRequest, idParams } from './access-schemas.ts';

const manages = { action: 'manage-displays', at: 'plant' } as const;

/** Screens of the shop floor. */
export function displayRoutes({ book, lines }: AccessHost): readonly AnyRoute[] {
  return [
    route({
      method: 'GET', path: '/api/displays', summary: 'All displays', needs: manages, answer: displaysAnswer,
      handle: () => book.displays.entries().map(([id, { name, line, made, by, lastSeen, acting }]) => ({ id, name, line, made, by, lastSeen, acting })),
    }),
    route({
      method: 'POST', path: '/api/displays', summary: 'A link by which a screen becomes a display', needs: manages, body: displayRequest, answer: displayLinkAnswer,
      handle: async ({ body, caller }) => {
        if (body.line !== undefined && !lines().includes(body.line)) throw new BadRequest('line', `line: got ${JSON.stringify(body.line)}; expected one of ${lines().join(', ')}`);
        const { id, token } = await makeDisplay(book, nameOf(caller), body);
        return { id, link: `/display#${token}` };
      },
    }),
    route({
      method: 'DELETE', path: '/api/displays/:id', summary: 'Revokes a display at once', needs: manages, params: idParams, answer: 'nothing',
      handle: async ({ params: { id }, caller, reply }) => {
        await revokeDisplay(book, nameOf(caller), id);
        return reply.status(204).send();
      },
    }),
  ];
}
