/**
 * Fields of a row, in the order in which a CSV usually has them. A row says exactly one thing:
 * a `verdict`, a tally (`inspected`, `nonconforming`), a count (`count`, `exposure`), a `value`, or an `event`.
 * A row with `corrects` and `reason` is a correction that says one of the first four anew.
 */
export const rowFields = [
  'sequence', 'time', 'station', 'product', 'characteristic', 'lot',
  'verdict', 'inspected', 'nonconforming', 'count', 'exposure', 'value',
  'corrects', 'reason', 'event', 'line', 'size', 'records',
] as const;

export type RowField = (typeof rowFields)[number];

export function isRowField(name: string): name is RowField {
  return (rowFields as readonly string[]).includes(name);
}
