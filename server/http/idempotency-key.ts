/** Longest key, characters. */
export const longestKey = 255;

const quoted = /^"((?:[\x20\x21\x23-\x5b\x5d-\x7e]|\\["\\])*)"$/;
const bare = /^[\x21\x23-\x7e]+$/;

/**
 * The key of an Idempotency-Key header: a string in quotes (RFC 8941 section 3.3.3), or, as many programs send it, without them.
 *
 * @returns undefined where the header is no such string, is empty or longer than 255 characters
 * @source draft-ietf-httpapi-idempotency-key-header, section 2.1
 */
export function idempotencyKeyOf(header: string): string | undefined {
  const text = header.trim();
  const inside = quoted.exec(text)?.[1]?.replaceAll(/\\(["\\])/g, '$1') ?? (bare.test(text) ? text : undefined);
  return inside === undefined || inside.length === 0 || inside.length > longestKey ? undefined : inside;
}
