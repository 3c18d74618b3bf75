import { checkedSequence } from '../record/checked-words.ts';
import { parsedJson } from '../record/json-text.ts';
import { refuse, settled, type Refusal } from '../record/refusal.ts';
import type { Result } from '../result.ts';
import { objectAt } from './json-object.ts';
import type { ServerMessage } from './source-messages.ts';

/**
 * A message of the server, as a source reads it. What a source acts on is checked; fields it does not know
 * are passed over, so that a newer server can say more.
 */
export function serverMessageOf(text: string): Result<ServerMessage, Refusal> {
  return settled(() => {
    const json = objectAt(parsedJson(text, 'one JSON object'), '', 'a message of the server, an object');
    switch (json.type) {
      case 'welcome':
        checkedSequence(json.next, 'next');
        checkedSequence(json.window, 'window');
        objectAt(json.limits, 'limits', 'the limits of the server');
        break;
      case 'ack':
        checkedSequence(json.next, 'next');
        break;
      case 'refused':
        if (json.next !== undefined) checkedSequence(json.next, 'next');
        if (typeof json.code !== 'string') refuse('wrong-type', 'code', json.code, 'the code of a refusal');
        break;
      case 'stopping':
        break;
      default:
        refuse('not-a-frame', 'type', json.type, 'welcome, ack, refused or stopping');
    }
    return json as unknown as ServerMessage;
  });
}
