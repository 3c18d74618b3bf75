import type { RecordedChange } from '../../core/access/change.ts';

/** A line of CSV. @source IETF RFC 4180 section 2 */
export const csvLine = (cells: readonly string[]): string => `${cells.map(cell).join(',')}\r\n`;

export const changeCells = ({ id, at, kind, who, what, before, after, why, entry, hash }: RecordedChange): readonly string[] => [
  String(id), new Date(at).toISOString(), kind, who, what, JSON.stringify(before), JSON.stringify(after), why, entry === null ? '' : String(entry), hash,
];

/** A text that a spreadsheet would take for a formula is kept from being one by an apostrophe before it. @source OWASP, CSV injection (from memory) */
function cell(text: string): string {
  const plain = /^[=+\-@\t\r]/.test(text) ? `'${text}` : text;
  return /[",\r\n]/.test(plain) ? `"${plain.replaceAll('"', '""')}"` : plain;
}
