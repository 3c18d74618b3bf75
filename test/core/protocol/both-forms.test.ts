import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { BinaryFrameReader } from '../../../core/protocol/binary-frame-reader.ts';
import { binaryOfFrame } from '../../../core/protocol/binary-frame-writer.ts';
import { JsonFrameReader } from '../../../core/protocol/json-frame-reader.ts';
import { jsonOfFrame } from '../../../core/protocol/json-of-frame.ts';
import { sourceLimits } from '../../../core/protocol/limits.ts';
import { arbitraryFrame } from '../record/arbitrary-frame.ts';
import { frameCases } from './frame-cases.ts';

const readJson = (text: string) => new JsonFrameReader(sourceLimits).read(text);
const readBinary = (bytes: Uint8Array) => new BinaryFrameReader(sourceLimits).read(bytes);

/** The same bytes at a place in memory that is no multiple of anything. */
function shifted(bytes: Uint8Array, by: number): Uint8Array {
  const room = new Uint8Array(bytes.length + by + 3).fill(0xa5);
  room.set(bytes, by);
  return room.subarray(by, by + bytes.length);
}

describe('both forms of a frame mean the same', () => {
  it.each(frameCases)('$name', ({ json, frame }) => {
    expect(readJson(json)).toStrictEqual({ ok: true, value: frame });
    expect(JSON.parse(jsonOfFrame(frame))).toStrictEqual(JSON.parse(json));
    expect(readBinary(binaryOfFrame(frame))).toStrictEqual({ ok: true, value: frame });
  });

  it('what is written is read back the same, in both forms', () =>
    fc.assert(
      fc.property(arbitraryFrame, fc.nat(7), (frame, by) => {
        const bytes = binaryOfFrame(frame);
        expect(bytes.length % 8).toBe(0);
        expect(readBinary(shifted(bytes, by))).toStrictEqual({ ok: true, value: frame });
        expect(readJson(jsonOfFrame(frame))).toStrictEqual({ ok: true, value: frame });
      }),
      { seed: 20_261_201, numRuns: 500 },
    ));

  it('a reader that has seen other frames reads the same', () => {
    const [json, binary] = [new JsonFrameReader(sourceLimits), new BinaryFrameReader(sourceLimits)];
    fc.assert(
      fc.property(fc.array(arbitraryFrame, { minLength: 1, maxLength: 4 }), (frames) => {
        for (const frame of [...frames, ...frames]) {
          expect(binary.read(binaryOfFrame(frame))).toStrictEqual({ ok: true, value: frame });
          expect(json.read(jsonOfFrame(frame))).toStrictEqual({ ok: true, value: frame });
        }
      }),
      { seed: 7, numRuns: 100 },
    );
  });

  it('equal origins of one reader are one object', () => {
    const frame = frameCases.at(-1)!.frame;
    for (const reader of [
      () => readJson(jsonOfFrame(frame)),
      () => readBinary(binaryOfFrame(frame)),
    ]) {
      const read = reader();
      if (!read.ok) throw new Error(read.fault.sentence);
      const [one, , other] = read.value.parts;
      expect((one as { origin: unknown }).origin).toBe((other as { origin: unknown }).origin);
    }
  });

  it('a frame read keeps nothing of the bytes it was read from', () => {
    const { frame } = frameCases.find(({ name }) => name === 'tallies')!;
    const bytes = binaryOfFrame(frame);
    const read = readBinary(bytes);
    bytes.fill(0xff);
    expect(read).toStrictEqual({ ok: true, value: frame });
  });
});
