import type { Frame, Part } from './part.ts';

/** The frame these parts make, numbered on from `first`. */
export function frameOf(first: number, parts: readonly Part[]): Frame {
  let records = 0;
  for (const part of parts) records += part.records;
  return { first, records, parts };
}
