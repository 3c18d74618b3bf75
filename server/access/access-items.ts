import * as v from 'valibot';
import { actions } from '../../core/access/action.ts';
import { roles, type Grant } from '../../core/access/role.ts';

const text = (most: number): v.GenericSchema<string> => v.pipe(v.string(), v.maxLength(most));
const moment = v.pipe(v.number(), v.safeInteger(), v.minValue(0));
const hash = v.pipe(v.string(), v.regex(/^[0-9a-f]{64}$/));

/** A role with the line it holds for; null: the whole plant. */
export const grantSchema = v.strictObject({ role: v.picklist(roles, `one of ${roles.join(', ')}`), line: v.nullable(text(64)) });
export type StoredGrant = v.InferOutput<typeof grantSchema>;
const grants = v.pipe(v.array(grantSchema), v.maxLength(200));

export const accountSchema = v.strictObject({
  /** What is typed to sign in; unique, also among disabled accounts. */
  name: text(64),
  /** Under which name acts are recorded; unique likewise. */
  shownAs: text(80),
  grants,
  made: moment,
  lastSeen: v.nullable(moment),
  disabled: v.boolean(),
  /** Argon2id in its own text form; null while only passkeys or a directory let in. */
  password: v.nullable(text(200)),
  pin: v.nullable(text(200)),
});
export const invitationSchema = v.strictObject({
  hash,
  kind: v.picklist(['first', 'account', 'new-password']),
  grants,
  account: v.nullable(text(64)),
  shownAs: v.nullable(text(80)),
  made: moment,
  by: text(80),
  expires: moment,
});
export const sessionSchema = v.strictObject({ hash, account: text(64), made: moment, lastSeen: moment, address: text(64), agent: text(200) });
export const displaySchema = v.strictObject({
  hash, name: text(80), line: v.nullable(text(64)), acting: v.boolean(), made: moment, by: text(80), lastSeen: v.nullable(moment),
});
export const tokenSchema = v.strictObject({
  hash, name: text(80), account: text(64), actions: v.array(v.picklist(actions)), grants: v.nullable(grants), made: moment, expires: moment, lastUsed: v.nullable(moment),
});

/** Its id is the credential's, base64url. */
export const passkeySchema = v.strictObject({
  account: text(64), name: text(80),
  /** COSE public key, base64url. */
  publicKey: text(4_096),
  counter: v.pipe(v.number(), v.safeInteger(), v.minValue(0)),
  transports: v.array(text(32)), made: moment, lastUsed: v.nullable(moment),
});
/** Somebody as a directory knows them; its id is made of issuer and subject. */
export const identitySchema = v.strictObject({ account: text(64), issuer: text(500), subject: text(300), made: moment });

export type Passkey = v.InferOutput<typeof passkeySchema>;
export type Identity = v.InferOutput<typeof identitySchema>;
export type Account = v.InferOutput<typeof accountSchema>;
export type Invitation = v.InferOutput<typeof invitationSchema>;
export type Session = v.InferOutput<typeof sessionSchema>;
export type Display = v.InferOutput<typeof displaySchema>;
export type ApiToken = v.InferOutput<typeof tokenSchema>;

/** As core decides with it. */
export const grantsOf = (stored: readonly StoredGrant[]): readonly Grant[] => stored.map(({ role, line }) => ({ role, line: line ?? undefined }));
