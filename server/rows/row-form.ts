/** The two forms in which rows come. */
export type RowForm = 'ndjson' | 'csv';

const openingBrace = 0x7b;

/**
 * The form of a text by its first character (a byte order mark aside): a row of NDJSON is an object, a CSV begins
 * with the name of a column.
 *
 * @returns undefined before that character
 */
export function formOf(text: Uint8Array): RowForm | undefined {
  const first = text.find((byte) => byte > 0x20 && byte < 0x80);
  if (first === undefined) return undefined;
  return first === openingBrace ? 'ndjson' : 'csv';
}
