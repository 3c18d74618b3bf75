import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { textOfUtf8, utf8Of } from '../../../core/protocol/utf8.ts';

/** The platform's own decoder, made as strict as RFC 3629 asks: the outside check. */
function platformText(bytes: Uint8Array): string | undefined {
  try {
    return new TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(bytes);
  } catch {
    return undefined;
  }
}

describe('UTF-8', () => {
  it('is written as the platform writes it and read back', () =>
    fc.assert(
      fc.property(fc.string({ unit: 'binary' }).filter((text) => !/\p{Cs}/u.test(text)), (text) => {
        expect(utf8Of(text)).toEqual(new TextEncoder().encode(text));
        expect(textOfUtf8(utf8Of(text))).toBe(text);
      }),
      { seed: 9, numRuns: 1000 },
    ));

  it('every sequence of up to two bytes, and many longer ones, is text exactly where the platform says so', () => {
    const leads = [0x00, 0x41, 0x7f, 0x80, 0x9f, 0xa0, 0xbf, 0xc0, 0xc1, 0xc2, 0xdf, 0xe0, 0xe1, 0xed, 0xef, 0xf0, 0xf1, 0xf4, 0xf5, 0xff, 0x8f, 0x90];
    const differing: number[][] = [];
    const compare = (...bytes: number[]): void => {
      const of = Uint8Array.from(bytes);
      if (textOfUtf8(of) !== platformText(of)) differing.push(bytes);
    };
    for (let a = 0; a < 256; a += 1) {
      compare(a);
      for (let b = 0; b < 256; b += 1) compare(a, b);
    }
    for (const a of leads) for (const b of leads) for (const c of leads) {
      compare(a, b, c);
      for (const d of leads) compare(a, b, c, d);
    }
    expect(differing).toEqual([]);
  });
});
