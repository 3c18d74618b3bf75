import { fault, type Result } from '../result.ts';
import { refuse, settled, type Refusal } from './refusal.ts';
import { recordOfRow, type RowRecord } from './row.ts';

/** The record one line of NDJSON states. @param line 1-based, named in the refusal */
export function recordOfNdjson(text: string, line: number): Result<RowRecord, Refusal> {
  const row = settled<unknown>(() => {
    try {
      return JSON.parse(text);
    } catch (cause) {
      return refuse('not-json', '', cause instanceof Error ? cause.message : text, 'one JSON object in the line');
    }
  }, line);
  return row.ok ? recordOfRow(row.value, line) : fault(row.fault);
}
