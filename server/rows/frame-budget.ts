import type { SourceLimits } from '../../core/protocol/limits.ts';

/** Bytes of a part with one record at most: its head, a correction, a reason of 500 characters, an origin and its four names. */
const partBytes = 16 + 32 + 1_504 + 8 + 4 * 65;
/** Bytes of a record in its part at most: an exposure with its own time. */
const recordBytes = 20;

/**
 * How large frames gathered from rows may become, so that they stay within the server's limits whatever the rows say.
 *
 * @param wanted records a frame, 1 or more
 */
export function frameBudget(limits: SourceLimits, wanted: number): { readonly records: number; readonly parts: number } {
  const parts = Math.max(1, Math.min(limits.parts, Math.floor(limits.frameBytes / 2 / partBytes)));
  const records = Math.max(1, Math.floor((limits.frameBytes - parts * partBytes) / recordBytes));
  return { parts, records: Math.min(wanted, limits.records, records) };
}
