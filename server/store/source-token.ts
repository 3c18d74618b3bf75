import { createHash, randomBytes } from 'node:crypto';

/** A new secret for a source: 256 random bits as 43 characters (base64url, RFC 4648 section 5), marked by its first letters. */
export function newToken(): string {
  return `vouchline_${randomBytes(32).toString('base64url')}`;
}

/**
 * What is stored of a token. One pass of SHA-256 without salt is right here, as it would not be for a password: the
 * token is 256 random bits, so there is no dictionary to try and no second source with the same token, and slow
 * hashing would only make every hello expensive. Looking the hash up by equality gives away nothing by its timing,
 * because nobody can choose a token for the beginning of its hash without knowing the hash.
 */
export function hashOfToken(token: string): Buffer {
  return createHash('sha256').update(token).digest();
}
