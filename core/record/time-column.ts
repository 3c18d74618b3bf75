/**
 * Times of inspection of a part's records, in the records' order, milliseconds since 1970-01-01 UTC.
 * 'each': one time a record. 'steady': record i was inspected at floor(start + i * step), step 0 or more.
 * Times need not rise: a record may be late in time although it is in sequence.
 */
export type TimeColumn =
  | { readonly kind: 'each'; readonly times: Float64Array }
  | { readonly kind: 'steady'; readonly start: number; readonly step: number };

/** Time of inspection of record `index` of a part (0-based), milliseconds. */
export function timeAt(column: TimeColumn, index: number): number {
  return column.kind === 'each' ? (column.times[index] as number) : Math.floor(column.start + index * column.step);
}
