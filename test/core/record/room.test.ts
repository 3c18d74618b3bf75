import { describe, expect, it } from 'vitest';
import { newBytes, newColumn } from '../../../core/record/room.ts';

describe('columns and bytes cut from one block', () => {
  it('are zero, as long as asked for, and never share a byte with another', () => {
    const lengths = Array.from({ length: 4_000 }, (_, k) => (k * 37) % 700);
    const columns = lengths.map((length, k) => newColumn(length).fill(k + 1));
    const bytes = lengths.map((length, k) => {
      const made = newBytes(length);
      expect(made.every((byte) => byte === 0)).toBe(true);
      return made.fill((k % 250) + 1);
    });
    lengths.forEach((length, k) => {
      expect([columns[k]!.length, bytes[k]!.length]).toEqual([length, length]);
      expect(columns[k]!.every((value) => value === k + 1)).toBe(true);
      expect(bytes[k]!.every((value) => value === (k % 250) + 1)).toBe(true);
    });
    expect(newColumn(100).every((value) => value === 0)).toBe(true);
  });
});
