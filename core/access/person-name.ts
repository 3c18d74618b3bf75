/**
 * By what names are told apart: without regard to case, to how a keyboard composed their characters, and to how many
 * spaces stand between words.
 */
export function nameKey(name: string): string {
  return name.normalize('NFKC').toLowerCase().replace(/\s+/gu, ' ').trim();
}

/** A name as it is kept: composed, single spaces between words. */
export function keptName(name: string): string {
  return name.normalize('NFC').replace(/\s+/gu, ' ').trim();
}

/**
 * What is wrong with a name that stands on the record, undefined if nothing is: characters that nobody sees, or letters
 * of two alphabets that look alike, would let one person pass for another.
 */
export function personNameFault(name: string): string | undefined {
  if (/[\p{C}\p{Zl}\p{Zp}]/u.test(name)) return 'a name without control or invisible characters';
  if (/\p{Script=Latin}/u.test(name) && /[\p{Script=Cyrillic}\p{Script=Greek}]/u.test(name)) return 'a name in one alphabet: some letters look alike';
  return undefined;
}
