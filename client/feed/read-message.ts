import type { LiveMessage } from '../../core/live/message.ts';
import { fault, ok, type Result } from '../../core/result.ts';

const types: ReadonlySet<unknown> = new Set(['snapshot', 'change', 'beat', 'stopping'] satisfies LiveMessage['type'][]);

/**
 * JSON knows no absence but null, and writes a number that is none as null: both are absence here, so that neither is
 * ever drawn as a zero. A shift keeps its null: a change says with it that no shift is on.
 */
const withoutNull = (key: string, value: unknown): unknown => (value === null && key !== 'shift' ? undefined : value);

/** A text of the live socket as a message; what cannot be read is a fault with the reason, never a picture. */
export function readMessage(text: string): Result<LiveMessage, string> {
  let value: unknown;
  try {
    value = JSON.parse(text, withoutNull);
  } catch (cause) {
    return fault(`live message is no JSON: ${String(cause)}`);
  }
  const type = typeof value === 'object' && value !== null && 'type' in value ? value.type : undefined;
  return types.has(type)
    ? ok(value as LiveMessage)
    : fault(`live message of type ${JSON.stringify(type)}; expected snapshot, change, beat or stopping`);
}
