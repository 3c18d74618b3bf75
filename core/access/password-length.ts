/**
 * How long a password is, in characters (code points), both ends allowed. Length is all that is asked of it: no mixture
 * of kinds of characters.
 *
 * @source OWASP ASVS 4.0.3, 2.1.1 and 2.1.2 (from memory)
 */
export const passwordLength = { least: 12, most: 128 } as const;

/** Characters as a person counts them while typing. */
export const charactersIn = (text: string): number => [...text].length;

/** What is wrong with a new password, as a sentence without its full stop; undefined if nothing is. */
export function passwordFault(text: string): string | undefined {
  const length = charactersIn(text);
  if (length >= passwordLength.least && length <= passwordLength.most) return undefined;
  return `a password has ${passwordLength.least} to ${passwordLength.most} characters; this one has ${length}`;
}
