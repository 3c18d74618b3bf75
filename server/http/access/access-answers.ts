import * as v from 'valibot';
import { actions } from '../../../core/access/action.ts';
import { grantSchema } from '../../access/access-items.ts';
import { moment, text, whole } from '../answers/answer-parts.ts';

const grants = v.array(grantSchema);
const actionList = v.array(v.picklist(actions));
const maybeMoment = v.nullable(moment);
const maybeText = v.nullable(text);
const link = v.pipe(text, v.description('Path and secret part, to be put behind the address of this server; shown this once.'));

export const accountAnswer = v.strictObject({
  id: text, name: text, shownAs: text, grants, made: moment, lastSeen: maybeMoment, disabled: v.boolean(), hasPassword: v.boolean(), hasPin: v.boolean(), passkeys: whole, sessions: whole,
});
export const accountsAnswer = v.array(accountAnswer);
export const newPasswordLinkAnswer = v.strictObject({ link, expires: moment });

const invitationKind = v.picklist(['first', 'account', 'new-password']);
export const invitationsAnswer = v.array(v.strictObject({ id: text, kind: invitationKind, grants, shownAs: maybeText, made: moment, by: text, expires: moment }));
export const invitationLinkAnswer = v.strictObject({ id: text, link, expires: moment });
export const invitationLookAnswer = v.strictObject({ kind: invitationKind, grants, account: maybeText, shownAs: maybeText, expires: moment });

export const displaysAnswer = v.array(v.strictObject({ id: text, name: text, line: maybeText, made: moment, by: text, lastSeen: maybeMoment, acting: v.boolean() }));
export const displayLinkAnswer = v.strictObject({ id: text, link });

export const sessionsAnswer = v.array(v.strictObject({ id: text, made: moment, lastSeen: moment, address: text, agent: text, current: v.boolean() }));
export const tokensAnswer = v.array(v.strictObject({ id: text, name: text, actions: actionList, grants: v.nullable(grants), made: moment, expires: moment, lastUsed: maybeMoment }));
export const tokenAnswer = v.strictObject({ id: text, token: v.pipe(text, v.description('Shown this once; only its hash is kept.')) });

export const passkeysAnswer = v.array(v.strictObject({ id: text, name: text, made: moment, lastUsed: maybeMoment }));
export const passkeyMadeAnswer = v.strictObject({ id: text });
/** @source W3C Web Authentication Level 2, sections 5.4 and 5.5, in their JSON forms (by a library) */
export const ceremonyAnswer = v.pipe(v.looseObject({ challenge: text }), v.description("Options of Web Authentication, for the device's own call."));

export const signedInAnswer = v.strictObject({ name: text });
export const signInAnswer = v.union([signedInAnswer, v.strictObject({ second: v.literal('passkey'), ticket: v.pipe(text, v.description('For /api/sign-in/passkey/begin and finish.')) })]);

export const terminalPeopleAnswer = v.array(v.strictObject({ account: text, shownAs: text }));
export const actingAnswer = v.strictObject({ name: text, until: moment });

const may = v.strictObject({ plant: v.boolean(), lines: v.union([v.literal('all'), v.array(text)]) });
const caller = v.strictObject({
  kind: v.picklist(['account', 'token', 'display', 'open']),
  name: maybeText,
  account: maybeText,
  grants,
  until: maybeMoment,
  may: v.pipe(v.record(v.picklist(actions), may), v.description('By action: for the plant as a whole, and on which lines.')),
  pin: v.nullable(actingAnswer),
  terminal: v.boolean(),
  hasPassword: v.boolean(),
});
export const meAnswer = v.strictObject({ access: v.picklist(['open', 'accounts']), firstAccount: v.boolean(), passkeys: v.boolean(), directory: maybeText, caller: v.nullable(caller) });
