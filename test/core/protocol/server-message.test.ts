import { describe, expect, it } from 'vitest';
import { sourceLimits } from '../../../core/protocol/limits.ts';
import { serverMessageOf } from '../../../core/protocol/server-message.ts';
import { gapMessage, sourceProtocol, type ServerMessage } from '../../../core/protocol/source-messages.ts';

const messages: readonly ServerMessage[] = [
  { type: 'welcome', protocol: sourceProtocol, source: 'leak-tester-a', next: 41, window: 64, limits: sourceLimits, at: 1_764_547_200_000 },
  { type: 'ack', next: 1041, setAside: [{ sequence: 41, records: 2, code: 'unknown-product', sentence: 'No such product.' }] },
  gapMessage(50, 42),
  { type: 'stopping', reason: 'maintenance' },
];

describe('a message of the server', () => {
  it.each(messages)('$type is read as it was said', (message) => {
    expect(serverMessageOf(JSON.stringify(message))).toStrictEqual({ ok: true, value: message });
  });

  it.each([
    ['{', 'not-json', ''],
    ['[]', 'wrong-type', ''],
    ['{"type":"hello"}', 'not-a-frame', 'type'],
    ['{"type":"ack"}', 'missing-field', 'next'],
    ['{"type":"ack","next":1.5}', 'bad-sequence', 'next'],
    ['{"type":"welcome","next":1,"window":0}', 'bad-sequence', 'window'],
    ['{"type":"welcome","next":1,"window":1,"limits":[]}', 'wrong-type', 'limits'],
    ['{"type":"refused","code":7}', 'wrong-type', 'code'],
    ['{"type":"refused","code":"x","next":0}', 'bad-sequence', 'next'],
  ])('%s is refused', (text, code, field) => {
    expect(serverMessageOf(text)).toMatchObject({ ok: false, fault: { code, field } });
  });
});
