import { fault, type Result } from '../result.ts';
import { parsedJson } from './json-text.ts';
import { settled, type Refusal } from './refusal.ts';
import { recordOfRow, type RowRecord } from './row.ts';

/** The record one line of NDJSON states. @param line 1-based, named in the refusal */
export function recordOfNdjson(text: string, line: number): Result<RowRecord, Refusal> {
  const row = settled(() => parsedJson(text, 'one JSON object in the line'), line);
  return row.ok ? recordOfRow(row.value, line) : fault(row.fault);
}
