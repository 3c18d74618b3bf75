/** Which record: the source's index in this process's list of sources, and the sequence the source gave it. */
export interface RecordIdentity {
  readonly source: number;
  readonly sequence: number;
}

/** Records of one source without a hole, both ends included. */
export interface RecordRange {
  readonly source: number;
  readonly first: number;
  readonly last: number;
}

/** Joins ranges that continue each other, source by source; the sequences of a source must rise. By source, then sequence. */
export function joinedRanges(ranges: Iterable<RecordRange>): RecordRange[] {
  const bySource = new Map<number, RecordRange[]>();
  for (const range of ranges) {
    const known = bySource.get(range.source) ?? [];
    const before = known.at(-1);
    if (before !== undefined && before.last + 1 === range.first) known[known.length - 1] = { ...before, last: range.last };
    else known.push(range);
    bySource.set(range.source, known);
  }
  return [...bySource].sort((a, b) => a[0] - b[0]).flatMap(([, known]) => known);
}
