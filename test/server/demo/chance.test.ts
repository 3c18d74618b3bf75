import { describe, expect, it } from 'vitest';
import { Chance } from '../../../server/demo/chance.ts';

const many = 20_000;
const drawn = <T>(draw: (chance: Chance) => T): T[] => {
  const chance = new Chance(4, 'test');
  return Array.from({ length: many }, () => draw(chance));
};
const meanOf = (values: readonly number[]): number => values.reduce((sum, value) => sum + value, 0) / values.length;

// The limits are five standard errors of a law with these moments: a sound generator fails one of them about once in
// a million choices of words, and the words are fixed.
describe('the demo\'s source of chance', () => {
  it('gives the same numbers for the same words, others for others', () => {
    const course = (...words: (string | number)[]): number[] => {
      const chance = new Chance(...words);
      return Array.from({ length: 8 }, () => chance.share());
    };
    expect(course(1, 'A.cutting', 7)).toEqual(course(1, 'A.cutting', 7));
    const firsts = new Set(Array.from({ length: 2_000 }, (_, minute) => course(1, 'A.cutting', minute)[0]));
    expect(firsts.size).toBe(2_000);
  });

  it('gives even shares, also as the first draw of neighbouring words', () => {
    const firsts = Array.from({ length: many }, (_, minute) => new Chance(1, 'B.leak-test', minute).share());
    for (const shares of [drawn((chance) => chance.share()), firsts]) {
      expect(Math.abs(meanOf(shares) - 0.5)).toBeLessThan(5 * Math.sqrt(1 / 12 / many));
      const tenths = Array.from({ length: 10 }, (_, tenth) => shares.filter((share) => Math.floor(share * 10) === tenth).length);
      for (const count of tenths) expect(Math.abs(count - many / 10)).toBeLessThan(5 * Math.sqrt(many * 0.09));
      expect(Math.min(...shares)).toBeGreaterThan(0);
      expect(Math.max(...shares)).toBeLessThan(1);
    }
  });

  it('gives normal values with their mean and spread', () => {
    const values = drawn((chance) => chance.normal(250, 2));
    expect(Math.abs(meanOf(values) - 250)).toBeLessThan(5 * 2 / Math.sqrt(many));
    expect(Math.abs(meanOf(values.map((value) => (value - 250) ** 2)) - 4)).toBeLessThan(5 * 4 * Math.sqrt(2 / many));
    const beyond = values.filter((value) => value < 246).length / many; // Two spreads below: 2.275 %, tables of the normal law.
    expect(Math.abs(beyond - 0.02275)).toBeLessThan(5 * Math.sqrt(0.02275 / many));
  });

  it('gives Poisson counts with mean and variance alike', () => {
    const counts = drawn((chance) => chance.poisson(0.7));
    expect(Math.abs(meanOf(counts) - 0.7)).toBeLessThan(5 * Math.sqrt(0.7 / many));
    expect(Math.abs(counts.filter((count) => count === 0).length / many - Math.exp(-0.7))).toBeLessThan(5 * Math.sqrt(0.25 / many));
    expect(drawn((chance) => chance.poisson(0)).every((count) => count === 0)).toBe(true);
  });

  it('hits units one by one with the chance asked for, in rising places', () => {
    const hits = drawn((chance) => chance.places(40, 0.05));
    expect(Math.abs(meanOf(hits.map(({ length }) => length)) - 2)).toBeLessThan(5 * Math.sqrt(1.9 / many));
    for (const place of [0, 17, 39]) {
      const share = hits.filter((places) => places.includes(place)).length / many;
      expect(Math.abs(share - 0.05)).toBeLessThan(5 * Math.sqrt(0.0475 / many));
    }
    for (const places of hits) expect(places).toEqual([...new Set(places)].sort((a, b) => a - b));
    expect(new Chance(1).places(5, 1)).toEqual([0, 1, 2, 3, 4]);
    expect(new Chance(1).places(1_000, 0)).toEqual([]);
  });
});
