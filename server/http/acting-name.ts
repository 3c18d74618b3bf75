import type { Caller } from '../access/caller.ts';
import { NotAllowed } from './refusals.ts';
import { BadRequest } from './request-schemas.ts';

/**
 * Under which name an act goes on record: the caller's own, or where access is open the one that is given.
 *
 * @throws BadRequest where nobody is named, NotAllowed where somebody else is
 */
export function actingName(caller: Caller, given: string | undefined): string {
  if (caller.name === undefined) {
    if (given === undefined) throw new BadRequest('by', 'by: nobody is named; say who you are');
    return given;
  }
  if (given !== undefined && given !== caller.name) throw new NotAllowed(`by: got ${JSON.stringify(given)}; you act under your own name, ${JSON.stringify(caller.name)}`);
  return caller.name;
}
