import { describe, expect, it } from 'vitest';
import { lotViolationUnits, violatedInLot } from '../../../core/bound/critical-lot.ts';
import type { Tail } from '../../../core/units.ts';

describe('the largest sample in which a count shows a lot broken', () => {
  it.each([[20, 0], [20, 3], [61, 2], [61, 30], [61, 60]])('is where the fewest such count says, in a lot of %d with %d allowed', (lotSize, allowed) => {
    for (const tail of [0.05, 0.001] as Tail[]) {
      for (let count = 0; count <= lotSize; count += 1) {
        const units = lotViolationUnits(count, { lotSize, allowed }, tail);
        for (let sampled = Math.max(1, count); sampled <= lotSize; sampled += 1) {
          expect([count, sampled, count >= violatedInLot(sampled, { lotSize, allowed }, tail)]).toEqual([count, sampled, sampled <= units]);
        }
      }
    }
  });
});
