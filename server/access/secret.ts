import { createHash, randomBytes } from 'node:crypto';

/** A new secret: 256 random bits as 43 characters (base64url, RFC 4648 section 5) behind letters that tell what it is. */
export const newSecret = (prefix: string): string => `${prefix}${randomBytes(32).toString('base64url')}`;

/** A short name for something that is no secret: 80 random bits. */
export const newId = (): string => randomBytes(10).toString('hex');

/** What is kept of a secret. One pass of SHA-256 is right for 256 random bits: there is no dictionary to try. */
export const hashOfSecret = (secret: string): string => createHash('sha256').update(secret).digest('hex');
