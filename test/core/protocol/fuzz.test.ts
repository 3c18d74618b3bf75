import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { BinaryFrameReader } from '../../../core/protocol/binary-frame-reader.ts';
import { binaryOfFrame } from '../../../core/protocol/binary-frame-writer.ts';
import { JsonFrameReader } from '../../../core/protocol/json-frame-reader.ts';
import { jsonOfFrame } from '../../../core/protocol/json-of-frame.ts';
import { sourceLimits } from '../../../core/protocol/limits.ts';
import { refusalTable } from '../../../core/protocol/refusals.ts';
import type { Frame } from '../../../core/record/part.ts';
import type { Refusal } from '../../../core/record/refusal.ts';
import type { Result } from '../../../core/result.ts';
import { arbitraryFrame } from '../record/arbitrary-frame.ts';
import { frameCases } from './frame-cases.ts';

const json = new JsonFrameReader(sourceLimits);
const binary = new BinaryFrameReader(sourceLimits);

/** A refusal with all it promises, or a frame that says itself again in both forms. */
function expectSound(read: Result<Frame, Refusal>): void {
  if (!read.ok) {
    expect(Object.keys(refusalTable)).toContain(read.fault.code);
    expect(read.fault.value.length).toBeLessThanOrEqual(70);
    expect(read.fault.sentence.length).toBeLessThan(400);
    return;
  }
  expect(binary.read(binaryOfFrame(read.value))).toEqual({ ok: true, value: read.value });
  expect(json.read(jsonOfFrame(read.value))).toMatchObject({ ok: true });
}

const someBinary = fc.oneof(arbitraryFrame, fc.constantFrom(...frameCases.map(({ frame }) => frame))).map(binaryOfFrame);
const someJson = fc.oneof(arbitraryFrame, fc.constantFrom(...frameCases.map(({ frame }) => frame))).map(jsonOfFrame);

describe('hostile input is a refusal or a frame, never a throw', () => {
  it('random bytes, alone and behind a good head', () =>
    fc.assert(
      fc.property(fc.uint8Array({ maxLength: 200 }), fc.nat(40), (noise, kept) => {
        expectSound(binary.read(noise));
        const head = binaryOfFrame(frameCases[0]!.frame).subarray(0, kept);
        expectSound(binary.read(Uint8Array.of(...head, ...noise)));
      }),
      { seed: 1, numRuns: 3000 },
    ));

  it('every truncation of every frame is refused', () => {
    for (const { frame } of frameCases) {
      const bytes = binaryOfFrame(frame);
      for (let size = 0; size < bytes.length; size += 1) expect(binary.read(bytes.subarray(0, size)).ok).toBe(false);
      expect(binary.read(Uint8Array.of(...bytes, 0))).toMatchObject({ fault: { code: 'trailing-bytes' } });
    }
  });

  it('every single bit of every frame turned over', () => {
    for (const { frame } of frameCases) {
      const bytes = binaryOfFrame(frame);
      for (let bit = 0; bit < bytes.length * 8; bit += 1) {
        const turned = bytes.slice();
        turned[bit >>> 3]! ^= 1 << (bit & 7);
        expectSound(binary.read(turned));
      }
    }
  });

  it('several 32-bit words overwritten, with huge lengths among them', () =>
    fc.assert(
      fc.property(someBinary, fc.array(fc.tuple(fc.nat(), fc.oneof(fc.constantFrom(0, 1, 0xffff, 0x7fffffff, 0xffffffff, 0xfffffff8), fc.nat())), { maxLength: 4 }), (bytes, words) => {
        const view = new DataView(bytes.buffer, bytes.byteOffset);
        for (const [place, word] of words) view.setUint32((place % (bytes.length / 4)) * 4, word, true);
        expectSound(binary.read(bytes));
      }),
      { seed: 2, numRuns: 3000 },
    ));

  it('huge lengths are refused before memory is spent on them', () => {
    for (const { frame } of frameCases) {
      for (const place of [4, 16, 18, 20]) {
        const bytes = binaryOfFrame(frame);
        new DataView(bytes.buffer, bytes.byteOffset).setUint16(place, 0xffff, true);
        expect(new BinaryFrameReader(sourceLimits).read(bytes).ok).toBe(false);
      }
    }
    const bytes = binaryOfFrame(frameCases.find(({ name }) => name === 'times that fall')!.frame);
    const part = bytes.length - 16 - 24 - 8;
    new DataView(bytes.buffer, bytes.byteOffset).setUint32(part + 4, 0xffffffff, true);
    const unlimited = { ...sourceLimits, records: 0xffffffff };
    expect(new BinaryFrameReader(unlimited).read(bytes)).toMatchObject({ fault: { code: 'truncated', field: 'parts[0].time' } });
  });

  it('text cut, with characters put in and fields made into something else', () =>
    fc.assert(
      fc.property(someJson, fc.nat(), fc.nat(), fc.constantFrom('', '0', '-', '"', '[', '{}', 'null', '1e999', '"\\ud800"', '{"valueOf":1,"toString":1}'), (text, from, length, put) => {
        const at = from % text.length;
        expectSound(json.read(text.slice(0, at) + put + text.slice(at + (length % 12))));
      }),
      { seed: 3, numRuns: 3000 },
    ));

  it('any JSON value anywhere in a frame', () =>
    fc.assert(
      fc.property(someJson, fc.jsonValue(), fc.nat(), (text, value, place) => {
        let left = place % 40;
        const changed: unknown = JSON.parse(text, (_, old: unknown) => ((left -= 1) === 0 ? value : old));
        expectSound(json.read(JSON.stringify(changed)));
      }),
      { seed: 4, numRuns: 3000 },
    ));

  it('depth, size and keys meant for prototypes', () => {
    expectSound(json.read('['.repeat(1_000_000)));
    expectSound(json.read('{"type":"records","first":1,"parts":' + '['.repeat(50_000) + ']'.repeat(50_000) + '}'));
    const poisoned = frameCases[0]!.json.replace('"kind"', '"__proto__":{"polluted":true},"kind"');
    expect(json.read(poisoned)).toMatchObject({ fault: { code: 'unknown-field', field: 'parts[0].__proto__' } });
    expect(json.read(frameCases[0]!.json.replace('"a-leak"', '"__proto__"'))).toMatchObject({ fault: { code: 'bad-id' } });
    expect(({} as { polluted?: boolean }).polluted).toBeUndefined();
    expect(json.read('x'.repeat(sourceLimits.frameBytes + 1))).toMatchObject({ fault: { code: 'frame-too-large' } });
  });
});
