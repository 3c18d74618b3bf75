/** The next of a stream of numbers spread evenly over (0, 1), both ends excluded. */
export type Uniform = () => number;

/**
 * Chance with a fixed seed, so that a simulated figure comes out the same wherever it is computed.
 *
 * @param seed whole; only its last 32 bits count
 * @source D. Blackman, S. Vigna 2018, xoshiro128** (memory), seeded by a 32-bit mix
 */
export function seededUniform(seed: number): Uniform {
  let state = seed | 0;
  const mixed = (): number => {
    state = (state + 0x9e3779b9) | 0;
    let z = Math.imul(state ^ (state >>> 16), 0x85ebca6b);
    z = Math.imul(z ^ (z >>> 13), 0xc2b2ae35);
    return z ^ (z >>> 16);
  };
  let a = mixed();
  let b = mixed();
  let c = mixed();
  let d = mixed() | 1;
  return () => {
    const five = Math.imul(b, 5);
    const out = Math.imul((five << 7) | (five >>> 25), 9);
    const shifted = b << 9;
    c ^= a;
    d ^= b;
    b ^= c;
    a ^= d;
    c ^= shifted;
    d = (d << 11) | (d >>> 21);
    return ((out >>> 0) + 0.5) / 4_294_967_296;
  };
}
