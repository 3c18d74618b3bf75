import { describe, expect, it } from 'vitest';
import { windowProposal } from '../../../core/plant/window-proposal.ts';
import type { Fraction, Tail } from '../../../core/units.ts';

const proposal = (line: number, normalRate: number, tail: number, most = 1e9): number | undefined =>
  windowProposal(line as Fraction, normalRate as Fraction, tail as Tail, most);

/** P(Bin(n, p) <= x) for each x, summed term by term. */
function cumulative(n: number, p: number): number[] {
  const sums: number[] = [];
  let term = (1 - p) ** n;
  let sum = 0;
  for (let x = 0; x <= n; x += 1) {
    sum += term;
    sums.push(sum);
    term *= ((n - x) / (x + 1)) * (p / (1 - p));
  }
  return sums;
}

/** The first window, trying each from 1 up, in which the well line is demonstrated with chance 0.99. */
function triedProposal(line: number, normalRate: number, tail: number): number {
  for (let units = 1; ; units += 1) {
    const allowed = cumulative(units, line).filter((chance) => chance <= tail).length - 1;
    if (allowed >= 0 && 1 - cumulative(units, normalRate)[allowed]! <= 0.01) return units;
  }
}

describe('proposed window', () => {
  it.each([
    [0.02, 0.005, 0.05], [0.02, 0.01, 0.05], [0.05, 0.01, 0.01], [0.1, 0.04, 0.05], [0.2, 0.05, 0.1], [0.01, 0.0005, 0.05],
  ])('line %d, normal rate %d, tail %d: the same as trying each', (line, normalRate, tail) => {
    expect(proposal(line, normalRate, tail)).toBe(triedProposal(line, normalRate, tail));
  });

  // Window times line, figures of the project's method notes: those hold from there on over the whole sawtooth of the
  // critical count, the proposal is the first tooth that holds, so it may be a little less.
  it.each([[4, 16], [3, 23.5], [2, 48], [1 / 0.7, 150]])('a normal rate of 1/%d of the line needs about %d expected units', (part, expected) => {
    const units = proposal(1e-4, 1e-4 / part, 0.05)!;
    expect((units * 1e-4) / expected).toBeGreaterThan(0.92);
    expect((units * 1e-4) / expected).toBeLessThan(1.01);
  });

  it('a line that is never nonconforming needs the smallest window that can demonstrate anything', () => {
    // ln(0.05) / ln(1 - 0.001) = 2994.2…
    expect(proposal(0.001, 0, 0.05)).toBe(2995);
    expect(proposal(0.001, 0, 0.05, 2994)).toBeUndefined();
  });

  it('there is none where the normal rate is too near the line', () => {
    expect(proposal(0.001, 0.000999, 0.05)).toBeUndefined();
    expect(proposal(0.001, 0.0005, 0.05, 10_000)).toBeUndefined();
    expect(proposal(0.001, 0.0005, 0.05, 60_000)).toBeGreaterThan(10_000);
  });
});
