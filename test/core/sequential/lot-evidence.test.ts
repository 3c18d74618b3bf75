import { describe, expect, it } from 'vitest';
import { seededUniform } from '../../../core/run-length/seeded-uniform.ts';
import { allLooksLotLower, allLooksLotUpper, logLotEvidenceAbove, logLotEvidenceBelow, type LotSample } from '../../../core/sequential/lot-evidence.ts';
import type { Tail } from '../../../core/units.ts';
import { mostMisses, paths } from './simulated-paths.ts';

const alpha = 0.05 as Tail;
const prior = { a: 1, b: 99 };

/** Chance of each evidence history: walks every order in which a lot can be drawn, unit by unit, exactly. */
function chanceEver(size: number, marked: number, reached: (sample: LotSample) => boolean): number {
  let open = new Map<number, number>([[0, 1]]);
  let ever = 0;
  for (let inspected = 1; inspected <= size; inspected++) {
    const next = new Map<number, number>();
    for (const [found, chance] of open) {
      const hit = (marked - found) / (size - inspected + 1);
      for (const [nonconforming, share] of [[found + 1, hit], [found, 1 - hit]] as const) {
        if (share <= 0) continue;
        if (reached({ nonconforming, inspected, size })) ever += chance * share;
        else next.set(nonconforming, (next.get(nonconforming) ?? 0) + chance * share);
      }
    }
    open = next;
  }
  return ever;
}

describe('evidence on a finite lot', () => {
  it('is expected to be exactly 1 with the tested number in the lot, less what only a worse lot could show', () => {
    const [size, marked, inspected] = [30, 4, 9];
    const choose = (n: number, k: number): number => (k < 0 || k > n ? 0 : k === 0 ? 1 : (choose(n - 1, k - 1) * n) / k);
    let below = 0;
    let above = 0;
    for (let found = 0; found <= marked; found++) {
      const chance = (choose(marked, found) * choose(size - marked, inspected - found)) / choose(size, inspected);
      const sample = { nonconforming: found, inspected, size };
      below += chance * Math.exp(logLotEvidenceBelow(sample, marked, { a: 1, b: 4 }));
      above += chance * Math.exp(logLotEvidenceAbove(sample, marked, { a: 1, b: 4 }));
    }
    expect(below).toBeCloseTo(1, 12);
    expect(above).toBeLessThan(1);
    expect(above).toBeGreaterThan(0.7);
  });

  it.each([[40, 4], [40, 2], [40, 8], [90, 9]])('of a lot of %i with %i nonconforming claims wrongly at most once in twenty, by every order of drawing', (size, marked) => {
    const own = { a: 1, b: 9 };
    const enough = -Math.log(alpha);
    const below = chanceEver(size, marked, (sample) => logLotEvidenceBelow(sample, marked, own) >= enough);
    const above = chanceEver(size, marked, (sample) => logLotEvidenceAbove(sample, marked, own) >= enough);
    expect(below).toBeLessThanOrEqual(0.05);
    expect(above).toBeLessThanOrEqual(0.05);
    expect(below + above).toBeGreaterThan(0);
  });

  it('knows the lot once it is all inspected, and nothing before', () => {
    const all = { nonconforming: 3, inspected: 50, size: 50 };
    expect(allLooksLotUpper(all, alpha, prior)).toBe(3);
    expect(allLooksLotLower(all, alpha, prior)).toBe(3);
    const none = { nonconforming: 0, inspected: 0, size: 50 };
    expect(allLooksLotUpper(none, alpha, prior)).toBe(50);
    expect(allLooksLotLower(none, alpha, prior)).toBe(0);
    expect(logLotEvidenceBelow(all, 4, prior)).toBe(Infinity);
    expect(logLotEvidenceBelow(all, 3, prior)).toBe(-Infinity);
  });

  /* 265: the project's statistical specification, section 3.5. */
  it('needs 265 faultless units of 500 to claim at most four', () => {
    expect(allLooksLotUpper({ nonconforming: 0, inspected: 264, size: 500 }, alpha, prior)).toBe(5);
    expect(allLooksLotUpper({ nonconforming: 0, inspected: 265, size: 500 }, alpha, prior)).toBe(4);
  });

  it('does not overflow in a large lot', () => {
    const sample = { nonconforming: 2, inspected: 3000, size: 100_000 };
    expect(logLotEvidenceBelow(sample, 90_000, prior)).toBeGreaterThan(1000);
    expect(logLotEvidenceAbove(sample, 10, prior)).toBeLessThan(0);
    const upper = allLooksLotUpper(sample, alpha, prior);
    expect(logLotEvidenceBelow(sample, upper, prior)).toBeLessThan(-Math.log(alpha));
    expect(logLotEvidenceBelow(sample, upper + 1, prior)).toBeGreaterThanOrEqual(-Math.log(alpha));
  });

  it('refuses what cannot be', () => {
    expect(() => logLotEvidenceBelow({ nonconforming: 2, inspected: 1, size: 5 }, 2, prior)).toThrow('nonconforming');
    expect(() => logLotEvidenceBelow({ nonconforming: 0, inspected: 6, size: 5 }, 2, prior)).toThrow('inspected');
    expect(() => logLotEvidenceBelow({ nonconforming: 0, inspected: 1, size: 5 }, 0, prior)).toThrow('count');
    expect(() => logLotEvidenceAbove({ nonconforming: 0, inspected: 1, size: 5 }, 5, prior)).toThrow('count');
    expect(() => allLooksLotUpper({ nonconforming: 0, inspected: 1, size: 5 }, 0 as Tail, prior)).toThrow('tail');
  });

  /* A lot of 500 with a guarantee of 5, half of it (2) and twice it in the lot; all orders of drawing by chance, looked at
   * after every unit. Chance of a false failure below 1e-8 a comparison. */
  it.each([['the guarantee', 5], ['half of it', 2], ['twice it', 10]] as const)('misses %s in the lot at most once in twenty samples', (_, marked) => {
    const size = 500;
    const found = Array.from({ length: marked + 1 }, (_, x) => x);
    const firstWhere = (holds: (inspected: number) => boolean): number => {
      for (let inspected = 0; inspected <= size; inspected++) if (holds(inspected)) return inspected;
      return Infinity;
    };
    const enough = -Math.log(alpha);
    const from = found.map((x) => firstWhere((n) => n >= x && logLotEvidenceBelow({ nonconforming: x, inspected: n, size }, marked, prior) >= enough));
    const beyond = found.map((x) => firstWhere((n) => n >= x && logLotEvidenceAbove({ nonconforming: x, inspected: n, size }, marked, prior) < enough));
    const uniform = seededUniform(11);
    let demonstrated = 0;
    let violated = 0;
    for (let path = 0; path < paths; path++) {
      const places = new Set<number>();
      while (places.size < marked) places.add(1 + Math.floor(uniform() * size));
      const drawn = [...places].sort((a, b) => a - b);
      demonstrated += Number(drawn.some((place, x) => place - 1 >= from[x]!) || size >= from[marked]!);
      violated += Number(drawn.some((place, x) => place < beyond[x + 1]!));
    }
    expect(demonstrated).toBeLessThanOrEqual(mostMisses(alpha));
    expect(violated).toBeLessThanOrEqual(mostMisses(alpha));
    expect(demonstrated / paths).toBeGreaterThan(0.02);
  });
});
