import * as v from 'valibot';
import { keptName, personNameFault } from '../../../core/access/person-name.ts';
import { actions } from '../../../core/access/action.ts';
import { grantSchema } from '../../access/access-items.ts';

const words = (least: number, most: number, what: string) => v.pipe(v.string(what), v.trim(), v.minLength(least, what), v.maxLength(most, what));
const secret = v.pipe(v.string('a text'), v.maxLength(1_024, 'at most 1,024 characters'));

/** A name that stands on the record. */
const personName = <T extends v.GenericSchema<string>>(schema: T) =>
  v.pipe(schema, v.transform(keptName), v.rawCheck(({ dataset, addIssue }) => {
    const fault = dataset.typed ? personNameFault(dataset.value) : undefined;
    if (fault !== undefined) addIssue({ message: fault, expected: fault });
  }));

export const signInName = personName(v.pipe(v.string('a name'), v.trim(), v.regex(/^[\p{L}\p{M}\p{N}._@-]{1,64}$/u, 'a name of 1 to 64 letters, digits and . _ @ -')));
const shownAs = personName(words(1, 80, 'a name of 1 to 80 characters'));
const why = words(1, 500, 'a reason of 1 to 500 characters');
const grants = v.pipe(v.array(grantSchema, 'a list of roles'), v.maxLength(200, 'at most 200 roles'));
const days = (most: number) => v.pipe(v.number(`a whole number of days, 1 to ${most}`), v.integer(), v.minValue(1), v.maxValue(most));

export const signInRequest = v.strictObject({ name: v.pipe(v.string('a name'), v.maxLength(200)), password: secret });
export const codeRequest = v.strictObject({ code: secret });
export const acceptRequest = v.strictObject({ code: secret, name: v.optional(signInName), shownAs: v.optional(shownAs), password: secret });
export const inviteRequest = v.strictObject({ grants: v.pipe(grants, v.minLength(1, 'at least one role')), shownAs: v.optional(shownAs), days: v.optional(days(30), 7) });
export const accountRequest = v.strictObject({ grants: v.optional(grants), disabled: v.optional(v.boolean()), shownAs: v.optional(shownAs), why });
export const whyRequest = v.strictObject({ why });
export const passwordRequest = v.strictObject({ old: secret, new: secret });
export const pinRequest = v.strictObject({ password: v.optional(secret), pin: secret });
export const tokenRequest = v.strictObject({
  name: words(1, 80, 'a name of 1 to 80 characters'),
  actions: v.pipe(v.array(v.picklist(actions, `one of ${actions.join(', ')}`)), v.minLength(1, 'at least one action')),
  grants: v.optional(grants),
  days: days(366),
});
export const displayRequest = v.strictObject({ name: words(1, 80, 'a name of 1 to 80 characters'), line: v.optional(words(1, 64, 'the id of a line')), acting: v.optional(v.boolean(), false) });
export const displaySignInRequest = v.strictObject({ token: secret });
export const actAsRequest = v.strictObject({ account: v.pipe(v.string(), v.maxLength(64)), pin: v.pipe(v.string('a PIN'), v.maxLength(16)) });
const answer = v.looseObject({ id: v.pipe(v.string('what the device answered'), v.maxLength(2_000)) });

export const passwordAgainRequest = v.strictObject({ password: v.optional(secret) });
export const makePasskeyRequest = v.strictObject({ name: words(1, 80, 'a name of 1 to 80 characters'), answer });
export const passkeyBeginRequest = v.strictObject({ ticket: v.optional(secret) });
export const passkeyAnswerRequest = v.strictObject({ ticket: v.optional(secret), answer });
export const idParams = v.object({ id: v.pipe(v.string(), v.maxLength(1_400)) });
