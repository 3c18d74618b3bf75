import type { Uniform } from './seeded-uniform.ts';

/** Standard normal numbers, two from each pair of uniform ones. @source G. E. P. Box, M. E. Muller 1958 (memory) */
export function normalDeviates(uniform: Uniform): () => number {
  let spare: number | undefined;
  return () => {
    if (spare !== undefined) {
      const value = spare;
      spare = undefined;
      return value;
    }
    const radius = Math.sqrt(-2 * Math.log(uniform()));
    const angle = 2 * Math.PI * uniform();
    spare = radius * Math.sin(angle);
    return radius * Math.cos(angle);
  };
}
