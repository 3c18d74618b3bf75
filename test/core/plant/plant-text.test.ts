import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { mostPlantBytes, plantTreeOfText } from '../../../core/plant/plant-text.ts';
import { readPlant } from '../../../core/plant/read-plant.ts';
import { leak, smallPlant } from './small-plant.ts';

const firstFault = (text: string): readonly [line: number, says: string] => {
  const read = plantTreeOfText(text);
  if (read.ok) throw new Error('no fault');
  return [read.fault[0]!.line, read.fault[0]!.sentence];
};

const bomb = ['a: &a [x, x, x, x, x, x, x, x, x, x]', ...'bcdefgh'.split('').map((name, at) => `${name}: &${name} [${Array(10).fill(`*${'abcdefgh'[at]}`).join(', ')}]`)].join('\n');

describe('text of a plant file', () => {
  it.each([
    ['', 1, 'an empty file'],
    ['# only a remark\n', 1, 'an empty file'],
    ['a: 1\n---\nb: 2\n', 2, 'one document'],
    ['a:\n\tb: 1\n', 2, 'Tabs are not allowed'],
    ['a: [1, 2\nb: 3\n', 2, 'well-formed YAML 1.2 or JSON'],
    ['a: 1\nb: 2\na: 3\n', 3, 'a second time'],
    ['{"a": 1,\n"a": 2}', 2, 'a second time'],
    ['a: *b\n', 1, 'an alias whose anchor stands further up'],
    ['a: &a [*a]\n', 1, 'aliases that do not contain themselves'],
    ['a: !!binary aGk=\n', 1, 'no other type of value'],
    ['a: !ours x\n', 1, 'well-formed'],
    ['1: 2\n', 1, 'plain words'],
    ['[a]: 2\n', 1, 'plain words'],
    [bomb, 6, 'at most 250000 values'],
    ['['.repeat(200_000), 1, 'at most 32 levels'],
    ['- '.repeat(100_000), 1, 'at most 32 levels'],
    ['? '.repeat(100_000), 1, 'at most 32 levels'],
    [`{"a": ${'{"a": '.repeat(5000)}`, 1, 'at most 32 levels'],
    [`a: "${'x'.repeat(mostPlantBytes)}"`, 1, 'at most 4194304 bytes'],
    [`a: "${'ø'.repeat(mostPlantBytes / 2)}"`, 1, 'at most 4194304 bytes'],
  ])('faulty text %#', (text, line, says) => {
    const [at, sentence] = firstFault(text);
    expect(sentence).toContain(says);
    expect(at).toBe(line);
  });

  it('follows aliases, which keep the place where they are used', () => {
    const read = plantTreeOfText('a: &x { n: 1 }\nb:\n  c: *x\nd: [*x]\n');
    expect(read.ok && JSON.stringify(read.value.value)).toBe('{"a":{"n":1},"b":{"c":{"n":1}},"d":[{"n":1}]}');
    expect(read.ok && read.value.placeOf(['b', 'c', 'n'], 'value')).toEqual({ line: 3, column: 3 });
    expect(read.ok && read.value.placeOf(['a', 'n'], 'value')).toEqual({ line: 1, column: 12 });
    expect(read.ok && read.value.placeOf(['d', 7, 'q'], 'value')).toEqual({ line: 4, column: 1 });
  });

  it('counts bytes as UTF-8', () => {
    const fits = `# ${'€𝄞'.repeat(Math.floor((mostPlantBytes - 7) / 7))}\na: 1`;
    expect(new TextEncoder().encode(fits).length).toBeLessThanOrEqual(mostPlantBytes);
    expect(plantTreeOfText(fits).ok).toBe(true);
    expect(plantTreeOfText(`${fits}${' '.repeat(8)}`).ok).toBe(false);
  });

  it('hurt files are refused in words, never by a throw, and always with a line that exists', () => {
    const sound = smallPlant(leak, 'shifts:\n  - { name: a, days: Mon-Fri, from: "06:00", to: "14:00" }\n');
    const hurt = fc.tuple(fc.nat(sound.length), fc.nat(12), fc.oneof(fc.string({ maxLength: 8 }), fc.constantFrom('[', '{', '- ', ': ', '*x', '&x', '"', '\n', '\t', '!!', 'null', '-1', '~'))).map(
      ([from, length, put]) => sound.slice(0, from) + put + sound.slice(from + length),
    );
    fc.assert(fc.property(hurt, (text) => {
      const read = readPlant(text, 'v');
      if (read.ok) return;
      expect(read.fault.length).toBeGreaterThan(0);
      for (const { line, column, sentence } of read.fault) {
        expect(line >= 1 && line <= text.split('\n').length + 1 && column >= 1).toBe(true);
        expect(sentence).toMatch(/^\S.*\.$/s);
        expect(sentence).not.toContain('undefined');
      }
    }), { seed: 20260605, numRuns: 250 });
  });
});
