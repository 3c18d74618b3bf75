import { describe, expect, it } from 'vitest';
import { evidencePath, evidenceScale } from '../../client/guarantee/evidence-scale.ts';
import { oddsWords, powerLabel } from '../../client/guarantee/odds-words.ts';
import { runBeginning } from '../../client/words.ts';
import { english } from './made-up.ts';

describe('evidence in words', () => {
  it.each([
    [0, '1 to 1'],
    [1.301, '20 to 1'],
    [3, '1,000 to 1'],
    [-1.6, '1 to 40'],
    [24.7, '10²⁴ to 1'],
    [-1e6, '1 to more than 10¹⁰⁰⁰⁰⁰⁰'],
    [undefined, 'not known'],
  ])('%s is %s', (power, words) => {
    expect(oddsWords(english, power)).toBe(words);
  });

  it('labels powers as an axis does', () => {
    expect([-2, 0, 1, 3].map(powerLabel)).toEqual(['10⁻²', '1', '10', '10³']);
  });

  it('tells what began a run', () => {
    const of = { number: 3, detail: 'new seal (Jonas)', begunAt: undefined } as const;
    expect(runBeginning(english, { ...of, cause: 'restart' } as never)).toBe('Run 3, begun by a restart: new seal (Jonas).');
    expect(runBeginning(english, { ...of, cause: 'first' } as never)).toBe('Run 3.');
  });
});

describe('the scale of evidence', () => {
  const scale = evidenceScale({ enoughKept: 1.3, enoughBroken: 3 }, 10, 110);

  it('holds both thresholds, and what lies beyond on its edge', () => {
    expect([scale.yOf(4.5), scale.yOf(1e6), scale.yOf(-2), scale.yOf(-Infinity)]).toEqual([10, 10, 110, 110]);
    expect(scale.yOf(3)).toBeLessThan(scale.yOf(1.3));
    expect(scale.ticks).toEqual([-2, -1, 0, 1, 2, 3, 4]);
  });

  it('draws a path from two marks on', () => {
    expect(evidencePath([1], [0], (at) => at, scale.yOf)).toBe('');
    expect(evidencePath([0, 10], [-2, 9], (at) => at, scale.yOf)).toBe('M0.0 110.0L10.0 10.0');
  });
});
