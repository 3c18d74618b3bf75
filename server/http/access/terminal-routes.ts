import { mayDoSomewhere } from '../../../core/access/may-do.ts';
import type { Caller } from '../../access/caller.ts';
import type { AccessBook } from '../../access/access-book.ts';
import { grantsOf } from '../../access/access-items.ts';
import { NotAllowed } from '../refusals.ts';
import { route, type AnyRoute } from '../route.ts';
import { actingAnswer, terminalPeopleAnswer } from './access-answers.ts';
import { nameOf, type AccessHost } from './access-host.ts';
import { actAsRequest } from './access-schemas.ts';

const sees = { action: 'see', at: 'somewhere' } as const;

/** Whether several people share the screen that asks: a display made for it, or anybody's browser. */
export const isTerminal = (book: AccessBook, { kind, by }: Caller): boolean => kind === 'account' || (kind === 'display' && by !== undefined && book.displays.get(by)?.acting === true);

/** Acting by PIN at a screen that several people share. */
export function terminalRoutes({ book, acting }: AccessHost): readonly AnyRoute[] {
  const terminal = (caller: Caller): string => {
    if (!isTerminal(book, caller) || caller.by === undefined) throw new NotAllowed('Nobody acts here by PIN: this display only shows.');
    return caller.by;
  };
  return [
    route({
      method: 'GET', path: '/api/terminal/people', summary: 'Who can act here by PIN', needs: sees, answer: terminalPeopleAnswer,
      handle: ({ caller }) => {
        terminal(caller);
        return book.accounts.entries()
          .filter(([, { pin, disabled, grants }]) => pin !== null && !disabled && mayDoSomewhere({ grants: grantsOf(grants) }, 'acknowledge'))
          .map(([account, { shownAs }]) => ({ account, shownAs }));
      },
    }),
    route({
      method: 'POST', path: '/api/terminal/act-as', summary: 'Acts as somebody by their PIN for two minutes', needs: sees, body: actAsRequest, answer: actingAnswer,
      handle: async ({ body: { account, pin }, caller }) => {
        const { name, until } = await acting.actAs(terminal(caller), nameOf(caller), account, pin);
        return { name, until };
      },
    }),
    route({
      method: 'DELETE', path: '/api/terminal/act-as', summary: 'Ends acting by PIN', needs: sees, answer: 'nothing',
      handle: ({ caller, reply }) => {
        acting.end(terminal(caller));
        return reply.status(204).send();
      },
    }),
  ];
}
